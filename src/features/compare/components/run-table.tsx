import { clsx } from "clsx";
import { Fragment, lazy, Suspense, useState } from "react";
import type { CompareMeasure } from "../../../../shared/contracts/compare.ts";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { formatInterval, formatNumber } from "../../../lib/formatters.ts";
import {
  type BaselineFigure,
  type DrawnBaseline,
  isKept,
  isOpen,
  type RunResult,
  tableP,
  verdictWords,
} from "../run-verdict.ts";
import { baselineWords, monotoneWords, statisticWords } from "../run-words.ts";

// With the drawing library, which nobody needs before the first row is opened.
const RunRowDetail = lazy(() =>
  import("./run-row-detail.tsx").then(({ RunRowDetail: detail }) => ({ default: detail })),
);

export type RunTableProps = { result: RunResult; reached: number; fileStem: string };

/** Measures of the network on record beside those of the random networks; each row opens. */
export function RunTable({ result, reached, fileStem }: RunTableProps) {
  const [open, setOpen] = useState<ReadonlySet<string>>(new Set());
  const drawn = result.baselines.filter((one) => one.drawn);
  function toggle(id: string) {
    setOpen((current) => {
      const next = new Set(current);
      if (!next.delete(id)) next.add(id);
      return next;
    });
  }
  return (
    <ScrollRegion label="Table of measures">
      <Table caption="Measures against random networks" hideCaption>
        <thead>
          <tr>
            <HeadCell>measure</HeadCell>
            <HeadCell numeric>on record</HeadCell>
            {drawn.map(({ baseline, standing }) => (
              <HeadCell key={baseline} numeric className="min-w-36">
                {baselineWords[baseline].short}
                <span className="block text-xs">
                  {isOpen({ standing }) ? "" : "greyed · "}mean, 95 %, p
                </span>
              </HeadCell>
            ))}
            <HeadCell>what may be said</HeadCell>
            <HeadCell>one pair more</HeadCell>
          </tr>
        </thead>
        <tbody>
          {result.measures.map((measure) => {
            const id = `measure-${measure.statistic}`;
            const isShown = open.has(measure.statistic);
            return (
              <Fragment key={measure.statistic}>
                <tr>
                  <HeadCell scope="row" className="min-w-40 align-top!">
                    <button
                      type="button"
                      aria-expanded={isShown}
                      aria-controls={isShown ? id : undefined}
                      onClick={() => toggle(measure.statistic)}
                      className="min-h-6 text-start underline decoration-rule underline-offset-4 hover:decoration-kelp"
                    >
                      {statisticWords[measure.statistic].name}
                    </button>
                  </HeadCell>
                  <Cell numeric className="align-top!">
                    {formatNumber(measure.observed, {
                      decimals: statisticWords[measure.statistic].decimals,
                    })}
                  </Cell>
                  {drawn.map((one) => (
                    <FigureCell key={one.baseline} {...{ measure, one, reached }} />
                  ))}
                  <Cell className="min-w-56 align-top!">{verdictWords(measure, result)}</Cell>
                  <Cell className="whitespace-nowrap align-top! text-sm text-ink-2">
                    {monotoneWords[measure.monotone]}
                  </Cell>
                </tr>
                {isShown ? (
                  <tr>
                    <td id={id} colSpan={drawn.length + 4} className="border-b border-rule py-3">
                      <Suspense fallback={<LoadingState label="Opening the plot" rows={4} />}>
                        <RunRowDetail {...{ measure, result, reached, fileStem }} />
                      </Suspense>
                    </td>
                  </tr>
                ) : null}
              </Fragment>
            );
          })}
        </tbody>
      </Table>
    </ScrollRegion>
  );
}

type FigureCellProps = { measure: CompareMeasure; one: DrawnBaseline; reached: number };

/** Mean, envelope and p of one baseline; greyed ones stay to be read, without weight. */
function FigureCell({ measure, one, reached }: FigureCellProps) {
  const figure = measure.baselines[one.baseline];
  const { decimals } = statisticWords[measure.statistic];
  return (
    <Cell numeric className={clsx("align-top!", !isOpen(one) && "text-ink-2 italic")}>
      {figure && figure.mean !== null ? (
        <>
          {formatNumber(figure.mean, { decimals: Math.max(1, decimals) })}
          <span className="block text-sm">{envelopeWords(figure, decimals)}</span>
          <span className="block text-sm">p {tableP(figure, reached)}</span>
        </>
      ) : figure ? (
        "—"
      ) : isKept(one.baseline) ? (
        <span className="text-sm text-ink-2">kept</span>
      ) : (
        "—"
      )}
    </Cell>
  );
}

export function envelopeWords({ low, high }: BaselineFigure, decimals: number): string {
  if (low === null || high === null) return "—";
  const places =
    decimals === 0 && !(Number.isInteger(low) && Number.isInteger(high)) ? 1 : decimals;
  // An en dash between a minus and a figure cannot be read.
  if (low < 0 || high < 0) {
    return [low, high].map((end) => formatNumber(end, { decimals: places })).join(" to ");
  }
  return formatInterval([low, high], { decimals: places });
}
