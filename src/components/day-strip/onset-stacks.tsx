import type { DayScale } from "./day-scale.ts";
import type { OnsetRow } from "./day-strip-row.ts";

const block = 7;
const gap = 2;
/** Above this many a day, blocks give way to plain bars of a common height. */
const mostBlocks = 8;
const barsHeight = 84;
const roomAbove = 14;
const roomForJoin = 22;

/** Height in pixels that a row of onsets takes, joins included. */
export function onsetRowHeight(row: OnsetRow): number {
  const most = highest(row);
  const stack = most > mostBlocks ? barsHeight : Math.max(1, most) * (block + gap);
  return roomAbove + stack + 6 + (row.joins?.length ?? 0) * roomForJoin;
}

/** Onsets as stacked blocks, one a case, with the joins of other groups below the line. */
export function OnsetShape({ row, scale, y }: { row: OnsetRow; scale: DayScale; y: number }) {
  const most = highest(row);
  const asBars = most > mostBlocks;
  const stack = asBars ? barsHeight : Math.max(1, most) * (block + gap);
  const base = y + roomAbove + stack;
  const width = Math.max(2, Math.min(22, scale.dayWidth - (scale.dayWidth > 8 ? 3 : 1)));
  const hollowFrom = row.incompleteFrom ?? "9999-12-31";

  return (
    <g>
      {asBars ? (
        <g>
          <path d={`M${scale.left} ${base - stack}H${scale.right}`} className="hairline" />
          <text x={scale.left + 2} y={base - stack - 3} className="t-quiet t-small">
            {most} a day
          </text>
        </g>
      ) : null}
      {row.counts.map(({ day, count }) => {
        const middle = scale.middle(day);
        if (middle === null || count <= 0) return null;
        const look =
          day >= hollowFrom
            ? { fill: "var(--paper)", stroke: "var(--ink)", strokeWidth: 1 }
            : { fill: "var(--ink)" };
        const x = middle - width / 2;
        if (asBars) {
          const height = (count / most) * stack;
          return <rect key={day} x={x} y={base - height} width={width} height={height} {...look} />;
        }
        return Array.from({ length: count }, (_, level) => (
          <rect
            // biome-ignore lint/suspicious/noArrayIndexKey: the blocks of a day differ by their level only.
            key={`${day} ${level}`}
            x={x}
            y={base - (level + 1) * (block + gap) + gap}
            width={width}
            height={block}
            {...look}
          />
        ));
      })}
      <path d={`M${scale.left} ${base + 1.5}H${scale.right}`} className="axis" />
      {row.joins?.map((join, index) => (
        <JoinCurve
          key={`${join.day} ${join.label}`}
          label={join.label}
          x={scale.middle(join.day)}
          base={base + 1.5}
          y={base + (index + 1) * roomForJoin - 2}
          left={scale.left}
          right={scale.right}
        />
      ))}
    </g>
  );
}

function JoinCurve(props: {
  label: string;
  x: number | null;
  base: number;
  y: number;
  left: number;
  right: number;
}) {
  const { label, x, base, y } = props;
  if (x === null) return null;
  // About 6.4 px a letter at 12 px; the words go to the side that has room for them.
  const toEnd = x - 40 - label.length * 6.4 < props.left && x < (props.left + props.right) / 2;
  const side = toEnd ? 1 : -1;
  return (
    <g>
      <path
        d={`M${x} ${base}C${x + side * 4} ${y} ${x + side * 16} ${y - 2} ${x + side * 32} ${y}`}
        stroke="var(--kelp)"
        strokeWidth={2}
        fill="none"
      />
      <text
        x={x + side * 37}
        y={y + 4}
        textAnchor={toEnd ? "start" : "end"}
        className="t-kelp t-small"
      >
        {label}
      </text>
    </g>
  );
}

function highest(row: OnsetRow): number {
  return row.counts.reduce((most, { count }) => Math.max(most, count), 0);
}
