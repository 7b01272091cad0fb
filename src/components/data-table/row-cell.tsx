import { Link } from "react-router-dom";
import { Cell, HeadCell } from "../ui/table.tsx";
import type { DataColumn } from "./data-column.ts";

export type RowCellProps<Row> = {
  column: DataColumn<Row>;
  row: Row;
  /** Whether this cell names the row. */
  head: boolean;
  /** Where the naming cell leads. */
  to?: string | undefined;
  /** Columns have set widths: what does not fit ends in dots. */
  clip?: boolean;
};

/** One cell of a row; the naming one is a row head and holds the link. */
export function RowCell<Row>({ column, row, head, to, clip = false }: RowCellProps<Row>) {
  const content = column.cell(row);
  if (!head) {
    return (
      <Cell
        numeric={column.numeric}
        pending={column.pending?.(row)}
        className={clip ? "truncate" : column.wrap ? "min-w-40" : "whitespace-nowrap"}
      >
        {content}
      </Cell>
    );
  }
  return (
    <HeadCell scope="row" className={`align-baseline ${clip ? "truncate" : "whitespace-nowrap"}`}>
      {to ? (
        // Not in the tab order: the row is, and Enter on it goes to the same place.
        <Link
          to={to}
          tabIndex={-1}
          className="-my-0.5 inline-block py-0.5 underline decoration-rule underline-offset-4 hover:decoration-kelp"
        >
          {content}
        </Link>
      ) : (
        content
      )}
    </HeadCell>
  );
}
