import type { DayScale } from "./day-scale.ts";
import type { DueRow, DueState } from "./day-strip-row.ts";

/**
 * One due day of `size` pixels: filled = seen, half filled = message left, cross = missed, frame =
 * due today, line = to come, dot = nothing recorded.
 */
export function DueMark({
  state,
  x,
  y,
  size,
}: {
  state: DueState;
  x: number;
  y: number;
  size: number;
}) {
  switch (state) {
    case "seen":
      return <rect x={x} y={y} width={size} height={size} fill="var(--seen)" />;
    case "message":
      return (
        <path
          d={`M${x} ${y + size}V${y}L${x + size} ${y + size}Z`}
          fill="var(--seen)"
          stroke="var(--seen)"
        />
      );
    case "missed":
      return (
        <path
          d={`M${x + 1} ${y + 1}l${size - 2} ${size - 2}m0 ${2 - size}l${2 - size} ${size - 2}`}
          stroke="var(--coral)"
          strokeWidth={2}
          fill="none"
        />
      );
    case "due":
      return (
        <rect
          x={x + 1}
          y={y + 1}
          width={size - 2}
          height={size - 2}
          fill="none"
          stroke="var(--coral)"
          strokeWidth={2}
        />
      );
    case "no_check":
      return (
        <circle
          cx={x + size / 2}
          cy={y + size / 2}
          r={Math.max(1.5, size / 6)}
          fill="var(--ink-2)"
        />
      );
    case "to_come":
      return (
        <path
          d={`M${x + 1} ${y + size / 2}h${size - 2}`}
          stroke="var(--ink-2)"
          strokeWidth={1.5}
          fill="none"
        />
      );
  }
}

/** The due days of one contact on the shared scale. */
export function DueShape({
  row,
  scale,
  y,
  height,
}: {
  row: DueRow;
  scale: DayScale;
  y: number;
  height: number;
}) {
  const size = Math.max(4, Math.min(14, scale.dayWidth - 3));
  return (
    <g>
      {row.days.map(({ day, state }) => {
        const middle = scale.middle(day);
        if (middle === null) return null;
        return (
          <DueMark
            key={day}
            state={state}
            x={middle - size / 2}
            y={y + (height - size) / 2}
            size={size}
          />
        );
      })}
    </g>
  );
}
