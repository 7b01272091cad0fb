import { useId } from "react";
import { Button } from "./button.tsx";

export type ProgressProps = {
  label: string;
  /** Steps done, 0 … max; null while the total is not known. */
  value: number | null;
  max?: number;
  /** Plain words beside the bar, such as "420 of 1,036 rows". */
  detail?: string;
  onCancel?: () => void;
  cancelLabel?: string;
};

/** Long work: a tide line that fills from the start, with a way to stop it. */
export function Progress({
  label,
  value,
  max = 100,
  detail,
  onCancel,
  cancelLabel = "Stop",
}: ProgressProps) {
  const id = useId();
  const share = value === null || max <= 0 ? null : Math.min(1, Math.max(0, value / max));
  return (
    <div className="max-w-xl">
      <div className="flex items-baseline justify-between gap-4">
        <span id={id}>{label}</span>
        <span className="text-sm text-ink-2">{detail}</span>
      </div>
      <div className="mt-1 flex items-center gap-3">
        <div
          role="progressbar"
          aria-labelledby={id}
          aria-valuemin={0}
          aria-valuemax={max}
          aria-valuenow={share === null ? undefined : (value ?? 0)}
          aria-valuetext={detail}
          className="relative h-2 flex-1 border-b border-ink-2"
        >
          <div
            className={`h-full bg-seen ${share === null ? "w-1/3 motion-safe:animate-pulse" : ""}`}
            style={share === null ? undefined : { inlineSize: `${share * 100}%` }}
          />
        </div>
        {onCancel ? (
          <Button size="small" onClick={onCancel}>
            {cancelLabel}
          </Button>
        ) : null}
      </div>
    </div>
  );
}
