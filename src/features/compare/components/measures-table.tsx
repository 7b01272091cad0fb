import type { NetworkSummary } from "../../../../shared/contracts/network.ts";
import { Answer } from "../../../components/ui/answer.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { formatInterval, formatNumber, formatShare } from "../../../lib/formatters.ts";
import { type MeasureRow, measureRows } from "../measure-rows.ts";

/** Every measure of the report with its people and, where it is missing, why. "—" is not 0. */
export function MeasuresTable({ summary }: { summary: NetworkSummary }) {
  return (
    <ScrollRegion label="Table of measures">
      <Table caption="Measures of the network" hideCaption>
        <thead>
          <tr>
            <HeadCell>measure</HeadCell>
            <HeadCell numeric>observed</HeadCell>
            <HeadCell numeric className="whitespace-nowrap">
              95 % interval
            </HeadCell>
            <HeadCell numeric>n</HeadCell>
            <HeadCell>people</HeadCell>
            <HeadCell>what to know</HeadCell>
          </tr>
        </thead>
        <tbody>
          {measureRows(summary).map((row) => (
            <tr key={row.id}>
              <HeadCell scope="row" className="min-w-44 align-baseline!">
                {row.label}
              </HeadCell>
              <Cell numeric>
                <Answer
                  kind="figure"
                  value={row.value}
                  format={() => written(row)}
                  reason={row.remark}
                />
              </Cell>
              <Cell numeric>{row.interval ? formatInterval(row.interval) : ""}</Cell>
              <Cell numeric>{formatNumber(row.n)}</Cell>
              <Cell className="min-w-36 text-sm text-ink-2">{row.population}</Cell>
              <Cell className="min-w-52 text-sm text-ink-2">{row.remark}</Cell>
            </tr>
          ))}
        </tbody>
      </Table>
    </ScrollRegion>
  );
}

function written({ value, unit }: MeasureRow): string {
  if (unit === "share") return formatShare(value, { decimals: 1 });
  if (unit === "decimal") return formatNumber(value, { decimals: 2 });
  if (unit === "small") return formatNumber(value, { decimals: value && value < 0.01 ? 5 : 3 });
  return formatNumber(value);
}
