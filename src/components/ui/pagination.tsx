import { formatNumber } from "../../lib/formatters.ts";
import { Button } from "./button.tsx";
import { MenuSelect } from "./menu-select.tsx";

export type PaginationProps = {
  /** First page is 1. */
  page: number;
  pageSize: number;
  total: number;
  onPageChange: (page: number) => void;
  onPageSizeChange?: (pageSize: number) => void;
  pageSizes?: readonly number[];
  /** What is counted, in the plural: "people". */
  noun?: string;
};

/** Which rows are shown out of how many, with a step to either side. */
export function Pagination({
  page,
  pageSize,
  total,
  onPageChange,
  onPageSizeChange,
  pageSizes = [25, 50, 100],
  noun = "rows",
}: PaginationProps) {
  const last = Math.max(1, Math.ceil(total / pageSize));
  const from = total === 0 ? 0 : (page - 1) * pageSize + 1;
  const to = Math.min(total, page * pageSize);
  return (
    <nav
      aria-label={`Pages of ${noun}`}
      className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2 py-2 text-sm"
      data-print="hide"
    >
      <p aria-live="polite" className="text-ink-2">
        {formatNumber(from)}–{formatNumber(to)} of {formatNumber(total)} {noun}
      </p>
      <div className="flex flex-wrap items-center gap-2">
        {onPageSizeChange ? (
          <MenuSelect
            label="per page"
            size="small"
            options={pageSizes.map((size) => ({ value: String(size), label: String(size) }))}
            value={String(pageSize)}
            onValueChange={(value) => onPageSizeChange(Number(value))}
          />
        ) : null}
        <Button size="small" disabled={page <= 1} onClick={() => onPageChange(page - 1)}>
          Previous
        </Button>
        <span className="text-ink-2">
          page {formatNumber(page)} of {formatNumber(last)}
        </span>
        <Button size="small" disabled={page >= last} onClick={() => onPageChange(page + 1)}>
          Next
        </Button>
      </div>
    </nav>
  );
}
