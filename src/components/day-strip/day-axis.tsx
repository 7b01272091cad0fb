import { formatDay } from "../../lib/formatters.ts";
import type { DayScale } from "./day-scale.ts";

/** Height in pixels of the axis: the word "today", the labels, the line with its ticks. */
export const dayAxisHeight = 38;

const lineY = 34;

/** The axis of a day strip: Mondays labelled, days ticked, today marked down through all rows. */
export function DayAxis({
  scale,
  today,
  bottom,
  todayLabel,
}: {
  scale: DayScale;
  today?: string;
  /** Where the line of today ends. */
  bottom: number;
  todayLabel: string;
}) {
  const now = today === undefined ? null : scale.middle(today);
  return (
    <g>
      <path
        d={scale.dayEdges.map((x) => `M${x} ${lineY}v4`).join("")}
        stroke="var(--rule)"
        fill="none"
      />
      <path
        d={scale.ticks.map(({ x }) => `M${x} ${lineY - 4}v8`).join("")}
        stroke="var(--ink-2)"
        fill="none"
      />
      <path d={`M${scale.left} ${lineY}H${scale.right}`} className="axis" />
      {now === null ? null : (
        <>
          <path d={`M${now} 15V${bottom}`} stroke="var(--coral)" strokeWidth={1.25} fill="none" />
          <text
            x={now}
            y={11}
            textAnchor={now > scale.right - 24 ? "end" : "middle"}
            className="t-coral t-small"
          >
            {todayLabel}
          </text>
        </>
      )}
      {scale.ticks.map(({ day, x }) => (
        <text
          key={day}
          x={Math.min(x + 1, scale.right - 42)}
          y={lineY - 7}
          className="t-quiet t-small t-rim"
        >
          {formatDay(day, { style: "short" })}
        </text>
      ))}
    </g>
  );
}
