import { csvRecord } from "../../../../shared/csv-cells.ts";

export type PlotCell = string | number | null;

/** The figures of a plot: a head, and rows of figures and words. */
export type PlotTable = {
  head: readonly string[];
  rows: readonly (readonly PlotCell[])[];
};

/**
 * A plot's figures as CSV. Words are guarded, so that no spreadsheet runs them; figures stand as
 * they are, since a minus in front of one is part of it.
 */
export function plotCsv({ head, rows }: PlotTable): string {
  return csvRecord(head) + rows.map((row) => `${row.map(cell).join(",")}\r\n`).join("");
}

function cell(value: PlotCell): string {
  if (typeof value === "number") return Number.isFinite(value) ? String(value) : "";
  return csvRecord([value]).trimEnd();
}
