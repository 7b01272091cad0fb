import { HeadCell } from "../ui/table.tsx";
import type { DataColumn, SortState } from "./data-column.ts";

export type ColumnHeadProps<Row> = {
  column: DataColumn<Row>;
  sort: SortState;
  onSortChange: (sort: SortState) => void;
};

/** The head cell of a column, with the state of its order for readers. */
export function ColumnHead<Row>({ column, sort, onSortChange }: ColumnHeadProps<Row>) {
  const { header, numeric = false, sortKey } = column;
  if (sortKey === undefined) {
    return (
      <HeadCell numeric={numeric} className="whitespace-nowrap">
        {header}
      </HeadCell>
    );
  }
  const order = sort?.key !== sortKey ? "none" : sort.descending ? "descending" : "ascending";
  return (
    <HeadCell numeric={numeric} aria-sort={order} className="whitespace-nowrap">
      <SortHeader {...{ label: header, sortKey, numeric, sort, onSortChange }} />
    </HeadCell>
  );
}

type SortHeaderProps = {
  label: string;
  sortKey: string;
  numeric: boolean;
  sort: SortState;
  onSortChange: (sort: SortState) => void;
};

/** The head of a column that can be sorted: first press upwards, then downwards, then as it came. */
function SortHeader({ label, sortKey, numeric, sort, onSortChange }: SortHeaderProps) {
  const active = sort?.key === sortKey ? sort : null;
  function press() {
    if (!active) onSortChange({ key: sortKey, descending: false });
    else if (!active.descending) onSortChange({ key: sortKey, descending: true });
    else onSortChange(null);
  }
  return (
    <button
      type="button"
      onClick={press}
      className={`-my-0.5 inline-flex items-baseline gap-1 py-0.5 hover:text-ink ${
        active ? "font-bold text-ink" : ""
      } ${numeric ? "flex-row-reverse" : ""}`}
    >
      {label}
      <svg viewBox="0 0 8 10" className="size-2.5 shrink-0 self-center" aria-hidden="true">
        <path
          d="M4 0 7.500 4H.5Z"
          fill={active && !active.descending ? "currentColor" : "var(--rule)"}
        />
        <path d="M4 10 .5 6h7Z" fill={active?.descending ? "currentColor" : "var(--rule)"} />
      </svg>
    </button>
  );
}
