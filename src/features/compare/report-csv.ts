import type { NetworkSummary } from "../../../shared/contracts/network.ts";
import { populationNames } from "../../lib/population-words.ts";
import { type CsvValue, toCsv } from "../../lib/to-csv.ts";
import { measureRows } from "./measure-rows.ts";

const head = [
  "figure",
  "item",
  "value",
  "low",
  "high",
  "n",
  "population",
  "exposures_from",
  "exposures_to",
  "as_of",
  "cut_off",
  "graph_version",
  "remark",
];

/** What Compare shows as one CSV: measures, degree counts, group sizes. Counts only, no person rows. */
export function reportCsv(summary: NetworkSummary): string {
  const { from, to, asOf, cutOff, graphVersion, people } = summary;
  const frame = [from, to, asOf, cutOff, graphVersion];
  const population = populationNames[summary.population];
  const rows: CsvValue[][] = measureRows(summary).map((row) => [
    row.label,
    null,
    row.value,
    row.interval?.[0] ?? null,
    row.interval?.[1] ?? null,
    row.n,
    row.population,
    ...frame,
    row.remark ?? null,
  ]);
  const count = (figure: string, item: number, value: number): CsvValue[] => [
    ...[figure, item, value, null, null, people, population],
    ...frame,
    null,
  ];
  summary.degreeCounts.forEach((value, degree) => {
    rows.push(count("people by number of contact pairs", degree, value));
  });
  for (const [size, value] of countBySize(summary.componentSizes)) {
    rows.push(count("connected groups by size", size, value));
  }
  return toCsv(head, rows);
}

function countBySize(sizes: readonly number[]): [number, number][] {
  const counts = new Map<number, number>();
  for (const size of sizes) counts.set(size, (counts.get(size) ?? 0) + 1);
  return [...counts].sort(([one], [other]) => one - other);
}
