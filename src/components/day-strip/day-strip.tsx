import type { ReactNode } from "react";
import { formatDay } from "../../lib/formatters.ts";
import { useWidth } from "../../lib/use-width.ts";
import { MarkShape } from "../person-mark/mark-shape.tsx";
import { FigureWithTable } from "../ui/figure-with-table.tsx";
import { DayAxis, dayAxisHeight } from "./day-axis.tsx";
import { createDayScale, type DayScale } from "./day-scale.ts";
import { DayStripLegend } from "./day-strip-legend.tsx";
import type { DayStripRow } from "./day-strip-row.ts";
import { DayStripTable, dayStripLines } from "./day-strip-table.tsx";
import { DueShape } from "./due-marks.tsx";
import { OnsetShape, onsetRowHeight } from "./onset-stacks.tsx";
import { ExposureShape, GroupShape, WindowShape } from "./window-bars.tsx";

export type DayStripProps = {
  /** Names the strip: "Windows and contacts of D-4417". */
  label: string;
  /** First and last day of the scale, both shown. Strips on one page share them. */
  from: string;
  to: string;
  /** The investigation's day; no line when it is off the scale or undefined. */
  today?: string;
  rows: readonly DayStripRow[];
  /** Explain the shapes under the strip. */
  legend?: boolean;
  /** Sentence or caution under the strip. */
  notes?: ReactNode;
  /** Leave the axis out, for strips in the rows of a table under one common axis. */
  bare?: boolean;
};

const narrow = 620;
const markSize = 16;

/**
 * The recurring shape of the product: days left to right on one scale, today marked, rows of
 * windows, exposures, due days or onsets. Wide: labels beside the plot; narrow: above each row.
 */
export function DayStrip({
  label,
  from,
  to,
  today,
  rows,
  legend = false,
  notes,
  bare = false,
}: DayStripProps) {
  const [ref, width] = useWidth(860);
  const stacked = width < narrow;
  const labelWidth = stacked ? 0 : roomForLabels(rows, width);
  const scale = createDayScale(from, to, labelWidth + (stacked ? 1 : 10), width - 2);

  let y = bare ? 2 : dayAxisHeight + 2;
  const placed = rows.map((row) => {
    const labelHeight = stacked ? 20 : 0;
    const height = rowHeight(row);
    const top = y;
    y += labelHeight + height;
    return { row, top, labelHeight, height };
  });
  const height = y + 4;

  return (
    <FigureWithTable
      label={label}
      quiet={bare}
      table={<DayStripTable label={label} rows={rows} />}
      notes={
        legend || notes ? (
          <div className="space-y-1 pt-1">
            {legend ? <DayStripLegend rows={rows} /> : null}
            {notes}
          </div>
        ) : null
      }
    >
      <div ref={ref}>
        <svg
          width={width}
          height={height}
          role="img"
          aria-label={inWords(label, from, to, today, rows)}
          className="figure-svg max-w-full"
        >
          {placed.map(({ row, top, labelHeight, height: rowSpace }) => (
            <g key={row.id}>
              {row.type === "onsets" ? null : (
                <path
                  d={`M${scale.left} ${top + labelHeight + rowSpace - 0.5}H${scale.right}`}
                  className="hairline"
                />
              )}
              <RowLabel
                row={row}
                stacked={stacked}
                x={stacked ? 0 : labelWidth}
                y={stacked ? top + 15 : top + labelMiddle(row, rowSpace) + 4}
              />
              <RowShape row={row} scale={scale} y={top + labelHeight} height={rowSpace} />
            </g>
          ))}
          {bare ? null : <DayAxis scale={scale} today={today} bottom={height} todayLabel="today" />}
        </svg>
      </div>
    </FigureWithTable>
  );
}

/** Mean width of a letter at the size of labels, rather too much than too little. */
const letter = 6.9;

/** Width of the labels' column: as the longest needs, within what the plot can spare. */
function roomForLabels(rows: readonly DayStripRow[], width: number): number {
  const needed = rows.map((row) => row.label.length * letter + (row.mark ? markSize + 6 : 0));
  return Math.min(width * 0.4, 270, Math.max(150, width * 0.23, ...needed));
}

/** A label cut to its room; the whole of it stands in the table and in what is read. */
function fitted(label: string, room: number): string {
  const letters = Math.floor(room / letter);
  return label.length <= letters ? label : `${label.slice(0, Math.max(1, letters - 1)).trimEnd()}…`;
}

function RowLabel(props: { row: DayStripRow; stacked: boolean; x: number; y: number }) {
  const { row, stacked, x, y } = props;
  const mark = row.mark;
  const room = mark ? markSize + 6 : 0;
  const quiet = row.type === "window";
  return (
    <>
      {mark ? (
        <g
          transform={`translate(${stacked ? x : x - markSize} ${y - 4 - markSize / 2}) scale(${markSize / 24})`}
        >
          <MarkShape input={mark} />
        </g>
      ) : null}
      <text
        x={stacked ? x + room : x - room}
        y={y}
        textAnchor={stacked ? "start" : "end"}
        className={quiet ? "t-quiet" : undefined}
      >
        {fitted(row.label, stacked ? Number.POSITIVE_INFINITY : x - room)}
      </text>
    </>
  );
}

function RowShape(props: { row: DayStripRow; scale: DayScale; y: number; height: number }) {
  const { row, ...place } = props;
  switch (row.type) {
    case "window":
      return <WindowShape row={row} {...place} />;
    case "exposure":
      return <ExposureShape row={row} {...place} />;
    case "group":
      return <GroupShape row={row} {...place} />;
    case "due":
      return <DueShape row={row} {...place} />;
    case "onsets":
      return <OnsetShape row={row} scale={place.scale} y={place.y} />;
  }
}

function rowHeight(row: DayStripRow): number {
  if (row.type === "onsets") return onsetRowHeight(row);
  return row.type === "window" ? 34 : 27;
}

/** Labels of onset rows stand on the line of the plot, the others in the middle of the row. */
function labelMiddle(row: DayStripRow, height: number): number {
  if (row.type !== "onsets") return height / 2;
  return height - 12 - (row.joins?.length ?? 0) * 22;
}

function inWords(
  label: string,
  from: string,
  to: string,
  today: string | undefined,
  rows: readonly DayStripRow[],
): string {
  const lines = rows.map((row) => {
    const said = dayStripLines(row);
    return `${row.label}: ${said.length === 1 ? (said[0]?.what ?? "") : `${said.length} entries`}`;
  });
  const days = `${formatDay(from)} to ${formatDay(to)}${today ? `, today ${formatDay(today)}` : ""}`;
  return `${label}. Days ${days}. ${lines.join("; ")}.`;
}
