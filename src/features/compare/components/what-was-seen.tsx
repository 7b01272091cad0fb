import type { ReactNode } from "react";
import type { NetworkSummary } from "../../../../shared/contracts/network.ts";
import { Answer } from "../../../components/ui/answer.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { formatNumber, formatPart, formatShare } from "../../../lib/formatters.ts";
import { reasonWords } from "../../../lib/reason-words.ts";
import { peopleWords } from "../../../lib/threshold-sentence.ts";

export type WhatWasSeenProps = {
  summary: NetworkSummary;
  /** Population at risk declared for the investigation, or null. */
  populationAtRisk: number | null;
};

/** What the figures below rest on, before any of them: how much of the network was seen at all. */
export function WhatWasSeen({ summary, populationAtRisk }: WhatWasSeenProps) {
  const { threshold, window, undated, unresolvedGroupExposures } = summary;
  const complete = threshold.population === "complete";
  return (
    <section aria-label="What was seen" className="mb-6">
      <dl className="grid grid-cols-2 gap-x-8 gap-y-3 lg:grid-cols-4">
        <Seen
          term="interviewed"
          value={complete ? "taken as complete" : formatPart(threshold.interviewed, threshold.n)}
          remark={
            complete
              ? "pairs came without any word on interviews"
              : `of ${peopleWords(summary, { populationAtRisk })}`
          }
        />
        <Seen
          term="recall"
          value={
            <Answer
              kind="figure"
              value={threshold.recall}
              format={(value) => formatShare(Number(value))}
              reason={reasonWords(complete ? undefined : "no_double_reports")}
            />
          }
          remark={
            typeof threshold.recall === "number"
              ? "of true pairs named, from pairs with both people interviewed"
              : complete
                ? "not asked of a complete network"
                : `no estimate: ${reasonWords("no_double_reports")}`
          }
        />
        <Seen
          term="group exposures that could not be named"
          value={formatNumber(unresolvedGroupExposures)}
          remark="not in any figure here"
        />
        <Seen
          term="exposures without a day"
          value={formatNumber(undated)}
          remark={window === "all" ? "counted" : "left out of a range of days"}
        />
      </dl>
      <Caution className="mt-3">
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
