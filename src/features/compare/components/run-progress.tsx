import { type ReactNode, useId } from "react";
import type { CompareRunItem } from "../../../../shared/contracts/compare.ts";
import { Button } from "../../../components/ui/button.tsx";
import { formatNumber, formatShare } from "../../../lib/formatters.ts";

export type RunProgressProps = {
  run: CompareRunItem;
  label: ReactNode;
  /** Undefined for those who may watch it only. */
  onCancel: (() => void) | undefined;
  cancelling: boolean;
};

/** How far a comparison is; it goes on when the page is left. */
export function RunProgress({ run, label, onCancel, cancelling }: RunProgressProps) {
  const id = useId();
  const detail =
    run.progress === 0
      ? "waiting"
      : `${formatShare(run.progress)}, ${formatNumber(run.reached)} of ${formatNumber(run.replicates)} networks of each kind`;
  return (
    <div>
      <div className="flex flex-wrap items-baseline justify-between gap-x-4">
        <span id={id}>{label}</span>
        <span className="text-sm text-ink-2">{detail}</span>
      </div>
      <div className="mt-1 flex items-center gap-3">
        <div
          role="progressbar"
          aria-labelledby={id}
          aria-valuemin={0}
          aria-valuemax={100}
          aria-valuenow={Math.round(run.progress * 100)}
          aria-valuetext={detail}
          className="relative h-2 flex-1 border-b border-ink-2"
        >
          <div className="h-full bg-seen" style={{ inlineSize: `${run.progress * 100}%` }} />
        </div>
        {onCancel ? (
          <Button size="small" pending={cancelling} onClick={onCancel}>
            Cancel<span className="sr-only"> {run.name}</span>
          </Button>
        ) : null}
      </div>
    </div>
  );
}
