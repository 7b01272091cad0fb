import type { ReactNode } from "react";

/** One column of a DataTable. */
export type DataColumn<Row> = {
  id: string;
  header: string;
  /** What stands in the cell; use `Answer` for values that can be missing in several ways. */
  cell: (row: Row) => ReactNode;
  /** Figures are set to the end of the line. */
  numeric?: boolean;
  /** Name of the server's sort key; without it the column cannot be sorted. */
  sortKey?: string;
  /** False keeps the column out of the column choice; the one that names the row always stays. */
  hideable?: boolean;
  /** The cell that names the row; the first column by default. */
  rowHeader?: boolean;
  /** Long words may break over lines; other cells stay on one and the table scrolls sideways. */
  wrap?: boolean;
  /** Width in CSS pixels where columns have set widths. */
  width?: number;
  /** Whether this row's value is not final yet. */
  pending?: (row: Row) => boolean;
};

/** The server's order of rows; null is its own order. */
export type SortState = { key: string; descending: boolean } | null;

/** As the API takes it: `onsetDate` or `-onsetDate`; undefined for the server's own order. */
export function sortParameter(sort: SortState): string | undefined {
  return sort === null ? undefined : `${sort.descending ? "-" : ""}${sort.key}`;
}

/** The inverse of `sortParameter`, for an address bar. */
export function parseSortParameter(text: string | null | undefined): SortState {
  if (!text || text === "-") return null;
  return text.startsWith("-")
    ? { key: text.slice(1), descending: true }
    : { key: text, descending: false };
}
