import type { NetworkSummary } from "../../../shared/contracts/network.ts";
import { reasonWords } from "../../lib/reason-words.ts";
import { thresholdSentence } from "../../lib/threshold-sentence.ts";
import { ThresholdStrip } from "../threshold-strip/threshold-strip.tsx";
import { Caution } from "../ui/caution.tsx";

export type ThresholdFigureProps = {
  summary: NetworkSummary;
  /** Population at risk declared for the investigation, or null. */
  populationAtRisk: number | null;
};

/** The threshold strip of a report with its sentence, what limits it, and its caution. */
export function ThresholdFigure({ summary, populationAtRisk }: ThresholdFigureProps) {
  const { threshold, trail, reasons } = summary;
  const { sentence, notes } = thresholdSentence(summary, { populationAtRisk });
  return (
    <ThresholdStrip
      label="Threshold strip"
      value={threshold.pairsPerPerson}
      interval={threshold.pairsPerPersonInterval}
      n={threshold.n}
      criticalHalfWidth={threshold.criticalHalfWidth ?? undefined}
      // The last day of the trail is the figure itself, which is the mark on the axis.
      trail={trail
        .slice(0, -1)
        .flatMap(({ day, pairsPerPerson: value }) => (value === null ? [] : [{ day, value }]))}
      hasVerdict={threshold.verdict !== null}
      reason={reasonWords(reasons["threshold.pairsPerPerson"])}
      sentence={<span className="text-base">{sentence}</span>}
      notes={
        <>
          {notes.map((note) => (
            <p key={note} className="text-sm text-ink-2">
              {note}
            </p>
          ))}
          <Caution className="pt-1">
            Comparison with random mixing describes recorded contacts. Above 1 does not mean the
            outbreak will grow; below 1 does not mean it is over.
          </Caution>
        </>
      }
    />
  );
}
