import { Link } from "react-router-dom";
import type { ImportMatchList } from "../../../../shared/contracts/imports.ts";
import { paths } from "../../../app/paths.ts";
import { Button } from "../../../components/ui/button.tsx";
import { formatNumber } from "../../../lib/formatters.ts";
import { matchedWords } from "../import-words.ts";

type Item = ImportMatchList["items"][number];

export type MatchItemProps = {
  investigationId: string;
  item: Item;
  pending: boolean;
  onDecide: (decision: "same" | "other") => void;
};

const parts = [
  ["name", "Name"],
  ["phone", "Telephone"],
  ["born", "Born"],
] as const;

function Values({ of }: { of: Item["row"] }) {
  return (
    <dl className="grid grid-cols-[5.5rem_minmax(0,1fr)]">
      {parts.map(([key, word]) => (
        <div key={key} className="contents">
          <dt className="text-sm text-ink-2">{word}</dt>
          <dd className="break-words">
            {of[key] === null ? (
              <span className="text-ink-2">not asked</span>
            ) : (
              <bdi>{of[key]}</bdi>
            )}
          </dd>
        </div>
      ))}
    </dl>
  );
}

/** One doubtful row beside whom it looks like, and the two answers. */
export function MatchItem({ investigationId, item, pending, onDecide }: MatchItemProps) {
  const { line, matchedOn, row, other } = item;
  const name = `line ${formatNumber(line)}`;
  return (
    <li className="border-b border-rule py-3">
      <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
        <div className="min-w-0">
          <h3 className="mb-1 text-[0.9375rem]">Line {formatNumber(line)} of the file</h3>
          <Values of={row} />
        </div>
        <div className="min-w-0">
          {other ? (
            <>
              <h3 className="mb-1 text-[0.9375rem]">
                On record:{" "}
                <Link to={paths.person(investigationId, other.personId)}>{other.studyNumber}</Link>
              </h3>
              <Values of={other} />
            </>
          ) : (
            <p className="text-ink-2">An earlier row of the file, which is set aside itself.</p>
          )}
        </div>
      </div>
      <div className="mt-2 flex flex-wrap items-baseline gap-x-4 gap-y-2">
        <span className="min-w-0 flex-1 basis-60 text-sm text-ink-2">
          Looks alike: {matchedWords[matchedOn]}
        </span>
        <span className="flex flex-wrap gap-2">
          <Button
            size="small"
            aria-label={`Same person, ${name}`}
            disabled={other === null}
            pending={pending}
            onClick={() => onDecide("same")}
          >
            Same person
          </Button>
          <Button
            size="small"
            aria-label={`Another person, ${name}`}
            pending={pending}
            onClick={() => onDecide("other")}
          >
            Another person
          </Button>
        </span>
      </div>
    </li>
  );
}
