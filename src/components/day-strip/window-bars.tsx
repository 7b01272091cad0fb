import type { DayScale } from "./day-scale.ts";
import type { ExposureRow, GroupRow, WindowRow } from "./day-strip-row.ts";

type Place<R> = { row: R; scale: DayScale; y: number; height: number };

const discRadius = 5.5;

/** A source window (dotted) or an infectious window (washed, with the disc of its reference day). */
export function WindowShape({ row, scale, y, height }: Place<WindowRow>) {
  const start = row.from === null ? null : scale.start(row.from);
  const end = row.to === null ? null : scale.end(row.to);
  const middle = y + height / 2;
  if (start === null || end === null || end <= start) {
    return (
      <text x={scale.left} y={middle + 4} className="t-quiet t-small" fontStyle="italic">
        {row.unknown ?? "not known"}
      </text>
    );
  }
  const disc = row.reference ? scale.middle(row.reference.day) : null;
  const source = row.window === "source";
  return (
    <g>
      <rect
        x={start + 0.5}
        y={y + 4.5}
        width={Math.max(2, end - start - 1)}
        height={height - 9}
        fill={source ? "none" : "var(--wash)"}
        stroke="var(--ink-2)"
        strokeWidth={source ? 1.25 : 1}
        strokeDasharray={source ? "2 3" : undefined}
      />
      {disc !== null && row.reference ? (
        <>
          <circle cx={disc} cy={middle} r={discRadius} fill="var(--ink)" />
          <text
            // Words go to the side with room; a disc at the far end would push them off the plot.
            x={disc + (disc > scale.right - 90 ? -discRadius - 5 : discRadius + 5)}
            y={middle + 4}
            textAnchor={disc > scale.right - 90 ? "end" : "start"}
            className="t-small"
          >
            {row.reference.label}
          </text>
        </>
      ) : null}
    </g>
  );
}

/** Exposures of one pair, laid on their days. */
export function ExposureShape({ row, scale, y, height }: Place<ExposureRow>) {
  const thickness = Math.min(14, height - 8);
  return (
    <g>
      {row.bars.map((bar) => {
        const start = scale.start(bar.from);
        const end = scale.end(bar.to);
        if (start === null || end === null || end <= start) return null;
        return (
          <rect
            key={`${bar.from} ${bar.to} ${bar.setting}`}
            x={start + 0.5}
            y={y + (height - thickness) / 2}
            width={Math.max(2, end - start - 1)}
            height={thickness}
            fill={bar.partial ? "none" : "var(--blue)"}
            fillOpacity={bar.household ? 1 : 0.55}
            stroke="var(--blue)"
            strokeWidth={1}
            strokeDasharray={bar.partial ? "4 3" : undefined}
          />
        );
      })}
    </g>
  );
}

/** People met who could not be named: dashed, with their number in words. */
export function GroupShape({ row, scale, y, height }: Place<GroupRow>) {
  const start = scale.start(row.from);
  const end = scale.end(row.to);
  if (start === null || end === null || end <= start) return null;
  const thickness = Math.min(14, height - 8);
  const flip = end > scale.right - 8 - row.count.length * 7;
  return (
    <g>
      <rect
        x={start + 0.5}
        y={y + (height - thickness) / 2}
        width={Math.max(6, end - start - 1)}
        height={thickness}
        fill="none"
        stroke="var(--ochre)"
        strokeWidth={1.5}
        strokeDasharray="4 2.5"
      />
      <text
        x={flip ? start - 6 : end + 7}
        y={y + height / 2 + 4}
        textAnchor={flip ? "end" : "start"}
        className="t-ochre t-small"
      >
        {row.count}
      </text>
    </g>
  );
}
