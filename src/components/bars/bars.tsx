import type { ReactNode } from "react";
import { formatNumber } from "../../lib/formatters.ts";
import { useWidth } from "../../lib/use-width.ts";
import { FigureWithTable } from "../ui/figure-with-table.tsx";
import { Cell, HeadCell, Table } from "../ui/table.tsx";

export type BarItem = {
  /** The category: a degree, a size class. Unique. */
  label: string;
  value: number;
  /** What a baseline would give, from–to, drawn as a bracket beside the bar. */
  reference?: readonly [number, number];
};

export type BarsProps = {
  label: string;
  items: readonly BarItem[];
  /** What the categories are: "pairs of a person". */
  categoryLabel: string;
  /** What is counted: "people". */
  valueLabel: string;
  /** Name of the references in the table. */
  referenceLabel?: string;
  notes?: ReactNode;
  height?: number;
  /** Shown instead of an empty plot. */
  empty?: string;
};

const top = 34;
const bottom = 40;
const left = 4;
const bracketHalf = 4;

/** Counts by category as plain bars, each with its figure where there is room; a table one key away. */
export function Bars({
  label,
  items,
  categoryLabel,
  valueLabel,
  referenceLabel = "random mixing",
  notes,
  height = 180,
  empty = "Nothing to count yet",
}: BarsProps) {
  const [ref, width] = useWidth(560);
  const most = items.reduce(
    (max, { value, reference }) => Math.max(max, value, reference?.[1] ?? 0),
    0,
  );
  const slot = (width - left * 2) / Math.max(1, items.length);
  const withReference = items.some((item) => item.reference);
  const room = slot - (withReference ? bracketHalf * 4 + 4 : 3);
  const barWidth = Math.max(2, Math.min(34, room));
  const base = height - bottom;
  const y = (value: number) => base - (most === 0 ? 0 : (value / most) * (base - top));
  const longest = items.reduce((max, item) => Math.max(max, item.label.length), 1);
  const everyLabel = Math.max(1, Math.ceil((longest * 7 + 6) / slot));
  const withFigures = slot >= formatNumber(most).length * 7.5 + 2;

  return (
    <FigureWithTable
      label={label}
      notes={notes}
      table={<BarsTable {...{ label, items, categoryLabel, valueLabel, referenceLabel }} />}
    >
      <div ref={ref}>
        {items.length === 0 ? (
          <p className="border-y border-dashed border-rule py-6 text-ink-2">{empty}</p>
        ) : (
          <svg
            width={width}
            height={height}
            role="img"
            aria-label={`${label}: ${valueLabel} by ${categoryLabel}, ${items.length} bars, highest ${formatNumber(most)}`}
            className="figure-svg max-w-full"
          >
            <text x={0} y={11} className="t-quiet t-small">
              {valueLabel}
            </text>
            {items.map((item, index) => {
              const middle = left + slot * (index + 0.5);
              return (
                <g key={item.label}>
                  <title>{`${item.label}: ${formatNumber(item.value)}`}</title>
                  <rect
                    x={middle - barWidth / 2}
                    y={y(item.value)}
                    width={barWidth}
                    // One person among thousands must not vanish.
                    height={item.value > 0 ? Math.max(1, base - y(item.value)) : 0}
                    fill="var(--ink)"
                  />
                  {item.reference ? (
                    <Bracket
                      x={middle + barWidth / 2 + bracketHalf + 1}
                      from={y(item.reference[0])}
                      to={y(item.reference[1])}
                    />
                  ) : null}
                  {withFigures && item.value > 0 && !item.reference ? (
                    <text
                      x={middle}
                      y={y(item.value) - 4}
                      textAnchor="middle"
                      className="t-quiet t-small"
                    >
                      {formatNumber(item.value)}
                    </text>
                  ) : null}
                  {index % everyLabel === 0 ? (
                    <text x={middle} y={base + 16} textAnchor="middle" className="t-quiet t-small">
                      {item.label}
                    </text>
                  ) : null}
                </g>
              );
            })}
            <path d={`M0 ${base + 0.5}H${width}`} className="axis" />
            <text x={width} y={height - 4} textAnchor="end" className="t-quiet t-small">
              {categoryLabel}
            </text>
          </svg>
        )}
      </div>
    </FigureWithTable>
  );
}

function Bracket({ x, from, to }: { x: number; from: number; to: number }) {
  const half = bracketHalf;
  return (
    <path
      d={`M${x - half} ${to}h${half * 2}M${x} ${to}V${from}M${x - half} ${from}h${half * 2}`}
      stroke="var(--ochre)"
      strokeWidth={2}
      fill="none"
    />
  );
}

function BarsTable({
  label,
  items,
  categoryLabel,
  valueLabel,
  referenceLabel,
}: Pick<BarsProps, "label" | "items" | "categoryLabel" | "valueLabel" | "referenceLabel">) {
  const withReference = items.some((item) => item.reference);
  return (
    <Table caption={label}>
      <thead>
        <tr>
          <HeadCell>{categoryLabel}</HeadCell>
          <HeadCell numeric>{valueLabel}</HeadCell>
          {withReference ? <HeadCell numeric>{referenceLabel}</HeadCell> : null}
        </tr>
      </thead>
      <tbody>
        {items.map((item) => (
          <tr key={item.label}>
            <HeadCell scope="row">{item.label}</HeadCell>
            <Cell numeric>{formatNumber(item.value)}</Cell>
            {withReference ? (
              <Cell numeric>
                {item.reference ? item.reference.map((end) => formatNumber(end)).join("–") : "—"}
              </Cell>
            ) : null}
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
