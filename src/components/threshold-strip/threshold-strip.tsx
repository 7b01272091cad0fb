import type { ReactNode } from "react";
import { formatEstimate, formatInterval, formatNumber } from "../../lib/formatters.ts";
import { useWidth } from "../../lib/use-width.ts";
import { FigureWithTable } from "../ui/figure-with-table.tsx";
import { ThresholdDrawing } from "./threshold-drawing.tsx";
import { halfWidth, type ThresholdInput } from "./threshold-input.ts";
import { ThresholdTable } from "./threshold-table.tsx";

export type ThresholdStripProps = ThresholdInput & {
  /** Names the strip: "Threshold strip, people interviewed". */
  label?: string;
  /** The one sentence that says only what may be said. */
  sentence: ReactNode;
  /** Caution and the like, under the sentence. */
  notes?: ReactNode;
  /** Few words and half the height, for heads of pages and lists. */
  size?: "normal" | "small";
};

/**
 * Pairs per person on one logarithmic axis: the giant-component threshold with its critical window
 * for this many people, the connectivity threshold, the observed value with its interval, and the
 * trail of past days. The sentence underneath is the finding; the picture only places it.
 */
export function ThresholdStrip({
  label = "Threshold strip",
  sentence,
  notes,
  size = "normal",
  ...input
}: ThresholdStripProps) {
  const [ref, width] = useWidth(860);
  const small = size === "small";
  return (
    <FigureWithTable
      label={label}
      table={<ThresholdTable label={label} input={input} />}
      notes={
        <div className="space-y-1 pt-1">
          <p className={small ? "text-sm" : undefined}>{sentence}</p>
          {notes}
        </div>
      }
    >
      <div ref={ref}>
        <ThresholdDrawing
          input={input}
          width={width}
          small={small}
          description={inWords(label, input)}
        />
      </div>
    </FigureWithTable>
  );
}

function inWords(label: string, input: ThresholdInput): string {
  const half = halfWidth(input);
  const observed =
    input.value === null
      ? (input.reason ?? "no value")
      : `${formatEstimate(input.value, input.interval)} pairs per person`;
  const window = half === null ? "" : `, critical window ${formatInterval([1 - half, 1 + half])}`;
  const n = input.n === null ? "" : `, n ${formatNumber(input.n)}`;
  return `${label}: ${observed}; threshold at 1${window}${n}.`;
}
