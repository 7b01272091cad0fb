import { type ReactNode, useRef, useState } from "react";
import { FigureWithTable } from "../../../components/ui/figure-with-table.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { formatNumber } from "../../../lib/formatters.ts";
import { saveBlob } from "../../../lib/save-blob.ts";
import { saveText } from "../../../lib/save-text.ts";
import { type PlotTable, plotCsv } from "./plot-csv.ts";
import { plotPng, plotSvg } from "./plot-svg.ts";

export type PlotFrameProps = {
  /** Names the plot, for readers, for its table, and inside the files. */
  label: string;
  /** What the drawing says in one sentence, for those who do not see it. */
  summary: string;
  /** The same figures, as they are shown as a table and saved as CSV. */
  table: PlotTable;
  /** Name of the files without their ending. */
  fileStem: string;
  notes?: ReactNode;
  children: ReactNode;
};

const linkLook =
  "min-h-6 text-sm text-ink-2 underline decoration-rule underline-offset-4 hover:text-ink";

/** A plot with its table one key away, to be taken out as SVG, PNG or CSV. */
export function PlotFrame({ label, summary, table, fileStem, notes, children }: PlotFrameProps) {
  const place = useRef<HTMLDivElement>(null);
  const [failed, setFailed] = useState(false);
  const drawing = () => place.current?.querySelector("svg") ?? null;

  async function savePng() {
    const svg = drawing();
    if (!svg) return;
    setFailed(false);
    try {
      saveBlob(`${fileStem}.png`, await plotPng(svg, label));
    } catch {
      setFailed(true);
    }
  }
  function saveSvg() {
    const svg = drawing();
    if (svg) saveText(`${fileStem}.svg`, plotSvg(svg, label), "image/svg+xml;charset=utf-8");
  }

  return (
    <div className="min-w-0">
      <FigureWithTable
        label={label}
        keepDrawing
        table={<FiguresTable label={label} {...table} />}
        notes={
          <>
            {notes}
            <div className="mt-1 flex flex-wrap gap-x-4" data-print="hide">
              <button type="button" className={linkLook} onClick={saveSvg}>
                SVG<span className="sr-only"> of {label}</span>
              </button>
              <button type="button" className={linkLook} onClick={() => void savePng()}>
                PNG<span className="sr-only"> of {label}</span>
              </button>
              <button
                type="button"
                className={linkLook}
                onClick={() => saveText(`${fileStem}.csv`, plotCsv(table))}
              >
                CSV<span className="sr-only"> of {label}</span>
              </button>
            </div>
            {failed ? (
              <p role="alert" className="text-sm text-coral">
                This browser could not make a picture of it; take the SVG.
              </p>
            ) : null}
          </>
        }
      >
        <div ref={place} role="img" aria-label={`${label}: ${summary}`} className="plot">
          {children}
        </div>
      </FigureWithTable>
    </div>
  );
}

function FiguresTable({ label, head, rows }: PlotTable & { label: string }) {
  return (
    <Table caption={label}>
      <thead>
        <tr>
          {head.map((name, column) => (
            <HeadCell key={name} numeric={column > 0}>
              {name}
            </HeadCell>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={String(row[0])}>
            <HeadCell scope="row">{shown(row[0])}</HeadCell>
            {row.slice(1).map((value, column) => (
              <Cell key={head[column + 1]} numeric>
                {shown(value)}
              </Cell>
            ))}
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

/** Words as they are; figures with as many places as their size needs. */
function shown(value: string | number | null | undefined): string {
  if (typeof value === "string") return value;
  if (value === null || value === undefined) return "—";
  const places = Number.isInteger(value)
    ? 0
    : Math.abs(value) < 1
      ? 4
      : Math.abs(value) < 10
        ? 3
        : 1;
  return formatNumber(value, { decimals: places });
}
