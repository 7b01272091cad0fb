import type { ReactNode } from "react";
import type { CompareRun } from "../../../../shared/contracts/compare.ts";
import { Answer } from "../../../components/ui/answer.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { formatCount, formatNumber, formatPart, formatShare } from "../../../lib/formatters.ts";
import { reasonWords } from "../../../lib/reason-words.ts";
import { cautionWords, observationWords } from "../comparison-words.ts";
import type { RunResult } from "../run-verdict.ts";

/** What the comparison rests on, before any figure: how much of the network was seen at all. */
export function RunSeen({ run, seen }: { run: CompareRun; seen: RunResult["seen"] }) {
  const complete = seen.state === "complete";
  return (
    <section aria-label="What was seen" className="mb-6">
      <p className="mb-3">How this network came about: {observationWords[seen.state]}.</p>
      <dl className="grid grid-cols-2 gap-x-8 gap-y-3 lg:grid-cols-4">
        <Seen
          term="interviewed"
          value={complete ? "taken as complete" : formatPart(seen.interviewed, seen.n)}
          remark={complete ? "pairs came without any word on interviews" : "of these people"}
        />
        <Seen
          term="double-named pairs"
          value={
            <Answer
              kind="figure"
              value={seen.doubleNamedShare}
              format={(value) => formatShare(Number(value))}
              reason={reasonWords("no_double_reports")}
            />
          }
          remark={
            seen.recall === null
              ? complete
                ? "not asked of a complete network"
                : "no estimate of how much was forgotten"
              : `of pairs with both people interviewed; ${formatShare(seen.recall)} of true pairs are named`
          }
        />
        <Seen
          term="group exposures that could not be named"
          value={formatNumber(seen.unresolvedGroupExposures)}
          remark="not in any figure here"
        />
        <Seen
          term="exposures without a day"
          value={formatNumber(seen.undated)}
          remark={run.window === "all" ? "counted" : "left out of a range of days"}
        />
      </dl>
      {seen.leftOutPeople || seen.leftOutPairs ? (
        <p className="mt-3 text-sm text-ink-2">
          On record but seen through no interview, and left out of the comparison:{" "}
          {formatCount(seen.leftOutPeople ?? 0, "person", "people")},{" "}
          {formatCount(seen.leftOutPairs ?? 0, "contact pair", "contact pairs")}.
        </p>
      ) : null}
      {seen.cautions.map((code) => {
        const words = cautionWords(code);
        return words ? (
          <Caution key={code} className="mt-2">
            {words}
          </Caution>
        ) : null;
      })}
      <Caution className="mt-2">
        These are contacts people told us about. Missing interviews, forgotten contacts and groups
        that could not be named make the true network larger. A line is a contact, not an infection.
      </Caution>
    </section>
  );
}

function Seen({ term, value, remark }: { term: string; value: ReactNode; remark: string }) {
  return (
    <div className="border-t border-rule pt-1.5">
      <dt className="text-sm text-ink-2">{term}</dt>
      <dd className="text-lg">{value}</dd>
      <dd className="text-sm text-ink-2">{remark}</dd>
    </div>
  );
}
