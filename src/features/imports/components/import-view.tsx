import type { Import } from "../../../../shared/contracts/imports.ts";
import { Notice } from "../../../components/ui/notice.tsx";
import { Progress } from "../../../components/ui/progress.tsx";
import { fieldWords } from "../../../lib/field-words.ts";
import { formatCount, formatInstant, formatShare } from "../../../lib/formatters.ts";
import { countOf, doneSentences, previewSentences } from "../import-words.ts";
import { CommitForm } from "./commit-form.tsx";
import { MatchDecisions } from "./match-decisions.tsx";
import { ProblemTable } from "./problem-table.tsx";
import { ReadingNote } from "./reading-note.tsx";

export type ImportViewProps = {
  investigationId: string;
  timeZone: string;
  one: Import;
  /** The same file had been put on record before it was brought again. */
  again: boolean;
};

function Sentences({ lines }: { lines: readonly string[] }) {
  return (
    <ul className="mb-5 max-w-[70ch]">
      {lines.map((line) => (
        <li key={line}>{line}</li>
      ))}
    </ul>
  );
}

/** One import in whatever state it is: what would happen, is happening, or has happened. */
export function ImportView({ investigationId, timeZone, one, again }: ImportViewProps) {
  const failure = one.problems.find(({ line }) => line === 0);
  const problems = one.problems.filter(({ line }) => line > 0);
  const listed = one.problemCount - (failure ? 1 : 0);
  const dropped = failure?.code === "stage_dropped";
  return (
    <>
      {one.state === "failed" ? (
        <Notice tone="error" title="Nothing was put on record." className="mb-4 max-w-3xl">
          {fieldWords(failure?.code ?? "commit_failed")}.
        </Notice>
      ) : null}
      {one.state === "committing" ? (
        <div className="mb-6">
          <Progress
            label="Putting rows on record"
            value={one.progress}
            max={1}
            detail={`${formatShare(one.progress)} of ${formatCount(one.rows, "row", "rows")}`}
          />
          <p className="mt-2 max-w-[70ch] text-sm text-ink-2">
            All rows arrive together or none does. You may close this page and come back; stay
            signed in until it is done.
          </p>
        </div>
      ) : null}
      {one.state === "committed" ? (
        <>
          <Notice
            tone={again ? "info" : "done"}
            title={again ? "This very file is on record already." : "On record."}
            className="mb-4 max-w-3xl"
          >
            {again
              ? `It was put there on ${formatInstant(one.committedAt, timeZone)}; bringing it again adds nothing.`
              : formatInstant(one.committedAt, timeZone)}
          </Notice>
          <Sentences lines={doneSentences(one)} />
        </>
      ) : dropped ? null : (
        <Sentences lines={previewSentences(one)} />
      )}
      {one.reading ? <ReadingNote reading={one.reading} /> : null}
      {(one.state === "ready" || one.state === "failed") && !dropped ? (
        <CommitForm investigationId={investigationId} staged={one} />
      ) : null}
      {one.state === "committed" && countOf(one, "setAside") > 0 ? (
        <MatchDecisions investigationId={investigationId} importId={one.id} />
      ) : null}
      {problems.length > 0 ? <ProblemTable problems={problems} problemCount={listed} /> : null}
    </>
  );
}
