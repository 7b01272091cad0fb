import type { CompareMeasure } from "../../../../shared/contracts/compare.ts";
import { Caution } from "../../../components/ui/caution.tsx";
import { comparisonReason } from "../comparison-words.ts";
import { ReplicateHistogram } from "../plots/replicate-histogram.tsx";
import { isKept, isOpen, type RunResult, replicateSentence } from "../run-verdict.ts";
import { baselineWords, statisticWords } from "../run-words.ts";

const directionSentences = {
  up: "One more pair between people on record can only raise it, or leave it.",
  down: "One more pair between people on record can only lower it, or leave it.",
  either:
    "One more pair between people on record can move it either way, so it must not be read as " +
    "“more contact, more of it”.",
} as const;

export type RunRowDetailProps = {
  measure: CompareMeasure;
  result: RunResult;
  reached: number;
  fileStem: string;
};

/** An opened row: what the measure is, and its values over the random networks of each kind. */
export function RunRowDetail({ measure, result, reached, fileStem }: RunRowDetailProps) {
  const { name, meaning, decimals } = statisticWords[measure.statistic];
  return (
    <div className="max-w-[min(72rem,calc(100vw-3rem))]">
      <p className="mb-3 text-sm text-ink-2">
        {name}: {meaning}. {directionSentences[measure.monotone]}
      </p>
      <div className="grid grid-cols-1 gap-x-10 gap-y-4 lg:grid-cols-2">
        {result.baselines.map((one) => {
          const figure = measure.baselines[one.baseline];
          if (!one.drawn) return null;
          const { short, held } = baselineWords[one.baseline];
          const greyed = !isOpen(one);
          return (
            <div key={one.baseline} className="min-w-0">
              <h4 className="text-[0.9375rem]">{short}</h4>
              <p className="mb-2 text-sm text-ink-2">{held}.</p>
              {one.reasons.length > 0 ? (
                <Caution className="mb-2">
                  {greyed ? "Greyed: " : "Take care: "}
                  {one.reasons.map(comparisonReason).join("; ")}.
                </Caution>
              ) : null}
              {figure ? (
                <ReplicateHistogram
                  label={`${name}, ${short}`}
                  figure={figure}
                  observed={measure.observed}
                  decimals={decimals}
                  sentence={replicateSentence(figure, reached)}
                  fileStem={`${fileStem}-${measure.statistic}-${one.baseline}`}
                  greyed={greyed}
                />
              ) : (
                <p className="text-sm text-ink-2">
                  {isKept(one.baseline)
                    ? "Every random network of this kind keeps it as it is on record, so there is nothing to compare."
                    : "People drawn for these networks have no attributes, so there is nothing to compare."}
                </p>
              )}
            </div>
          );
        })}
      </div>
    </div>
  );
}
