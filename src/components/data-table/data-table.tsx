import {
  type ColumnDef,
  columnVisibilityFeature,
  rowPaginationFeature,
  rowSortingFeature,
  tableFeatures,
  useTable,
} from "@tanstack/react-table";
import { type ReactNode, useMemo } from "react";
import { useNavigate } from "react-router-dom";
import { EmptyState } from "../ui/empty-state.tsx";
import { type ErrorKind, ErrorState } from "../ui/error-state.tsx";
import { LoadingState } from "../ui/loading-state.tsx";
import { Pagination } from "../ui/pagination.tsx";
import { Table } from "../ui/table.tsx";
import { ColumnChoice } from "./column-choice.tsx";
import { ColumnHead } from "./column-head.tsx";
import type { DataColumn, SortState } from "./data-column.ts";
import { RowCell } from "./row-cell.tsx";
import { useRowKeys } from "./use-row-keys.ts";

/** The server sorts and pages; the table only shows which order and page it is. */
const features = tableFeatures({
  columnVisibilityFeature,
  rowPaginationFeature,
  rowSortingFeature,
});

export type DataTableProps<Row extends object> = {
  /** What the rows are: "People on record". */
  caption: string;
  hideCaption?: boolean;
  /** Keep these at module scope or memoised. */
  columns: readonly DataColumn<Row>[];
  rows: readonly Row[];
  rowId: (row: Row) => string;
  /** Rows in all, over all pages. */
  total: number;
  page: number;
  pageSize: number;
  onPageChange: (page: number) => void;
  onPageSizeChange?: (pageSize: number) => void;
  sort: SortState;
  onSortChange: (sort: SortState) => void;
  /** Ids of columns that are not shown; give both to offer the choice. */
  hiddenColumns?: readonly string[];
  onHiddenColumnsChange?: (hidden: string[]) => void;
  /** Opens a row by a link in its first cell, by a click on it, and by Enter. */
  rowTo?: (row: Row) => string;
  /** Instead of `rowTo`, where opening is not going to another page. */
  onRowOpen?: (row: Row) => void;
  state?: "ready" | "loading" | "error";
  /** Rows of the page before are shown while new ones come. */
  updating?: boolean;
  errorKind?: ErrorKind;
  onRetry?: () => void;
  /** Shown instead of a table without rows. */
  empty?: ReactNode;
  /** What is counted, in the plural. */
  noun?: string;
  /** Filters and the like, on the line above the table. */
  tools?: ReactNode;
};

/** Table of server rows: sort, pages, column choice, sticky head, rows by keyboard. */
export function DataTable<Row extends object>(props: DataTableProps<Row>) {
  const { caption, columns, rows, hiddenColumns, onHiddenColumnsChange, noun = "rows" } = props;
  const columnDefs = useMemo(
    (): ColumnDef<typeof features, Row>[] =>
      columns.map((column) => ({ id: column.id, header: column.header })),
    [columns],
  );
  const byId = useMemo(() => new Map(columns.map((column) => [column.id, column])), [columns]);
  const columnVisibility = useMemo(
    () => Object.fromEntries((hiddenColumns ?? []).map((id) => [id, false])),
    [hiddenColumns],
  );
  const table = useTable({
    features,
    columns: columnDefs,
    data: rows,
    getRowId: props.rowId,
    manualSorting: true,
    manualPagination: true,
    rowCount: props.total,
    state: {
      columnVisibility,
      pagination: { pageIndex: props.page - 1, pageSize: props.pageSize },
      sorting: props.sort ? [{ id: props.sort.key, desc: props.sort.descending }] : [],
    },
  });

  const navigate = useNavigate();
  const { rowTo, onRowOpen } = props;
  const openRow = rowTo
    ? (row: Row) => {
        void navigate(rowTo(row));
      }
    : onRowOpen;
  const keys = useRowKeys(
    rows.length,
    openRow
      ? (index) => {
          const row = rows[index];
          if (row !== undefined) openRow(row);
        }
      : undefined,
  );

  const rowHeaderId = (columns.find((column) => column.rowHeader) ?? columns[0])?.id;
  const choice = onHiddenColumnsChange
    ? columns.filter((column) => column.hideable !== false && column.id !== rowHeaderId)
    : [];

  return (
    <div>
      {props.tools || choice.length > 0 ? (
        <div className="flex flex-wrap items-end gap-x-4 gap-y-2 pb-2" data-print="hide">
          {props.tools}
          {onHiddenColumnsChange && choice.length > 0 ? (
            <div className="ms-auto">
              <ColumnChoice
                columns={choice.map(({ id, header }) => ({
                  id,
                  header,
                  visible: columnVisibility[id] !== false,
                }))}
                onToggle={(id, visible) => {
                  const others = (hiddenColumns ?? []).filter((hidden) => hidden !== id);
                  onHiddenColumnsChange(visible ? others : [...others, id]);
                }}
              />
            </div>
          ) : null}
        </div>
      ) : null}
      {props.state === "loading" ? (
        <LoadingState label={`Loading ${noun}`} rows={8} />
      ) : props.state === "error" ? (
        <ErrorState kind={props.errorKind} onRetry={props.onRetry} />
      ) : rows.length === 0 ? (
        (props.empty ?? <EmptyState title={`No ${noun} to show`} />)
      ) : (
        <>
          <div
            // Positioned, or words for readers only would widen the page past the scrolled part.
            className="relative -mx-1 max-h-[70vh] overflow-auto px-1"
            aria-busy={props.updating || undefined}
            data-table-scroll=""
            // Where rows are no stops of the tab key, the scrolled part is one.
            {...(openRow ? {} : { role: "region", "aria-label": caption, tabIndex: 0 })}
          >
            <Table
              caption={caption}
              hideCaption={props.hideCaption ?? true}
              className={props.updating ? "opacity-60" : undefined}
            >
              <thead className="sticky top-0 z-10 bg-paper">
                {table.getHeaderGroups().map((group) => (
                  <tr key={group.id}>
                    {group.headers.map((header) => {
                      const column = byId.get(header.column.id);
                      if (!column) return null;
                      return (
                        <ColumnHead
                          key={header.id}
                          column={column}
                          sort={props.sort}
                          onSortChange={props.onSortChange}
                        />
                      );
                    })}
                  </tr>
                ))}
              </thead>
              <tbody>
                {table.getRowModel().rows.map((row, index) => (
                  <tr
                    key={row.id}
                    {...(openRow
                      ? {
                          tabIndex: index === keys.active ? 0 : -1,
                          onKeyDown: (event) => keys.onKeyDown(event, index),
                          onFocus: () => keys.setActive(index),
                          className:
                            "cursor-pointer hover:bg-paper-2 focus-visible:outline-offset-0",
                        }
                      : {})}
                    onClick={(event) => {
                      // A link, button or marked text inside the row keeps its own meaning.
                      const inner = (event.target as Element).closest(
                        "a,button,input,select,label",
                      );
                      if (inner || window.getSelection()?.toString()) return;
                      openRow?.(row.original);
                    }}
                  >
                    {row.getVisibleCells().map((cell) => {
                      const column = byId.get(cell.column.id);
                      if (!column) return null;
                      return (
                        <RowCell
                          key={cell.id}
                          column={column}
                          row={row.original}
                          to={column.id === rowHeaderId ? rowTo?.(row.original) : undefined}
                          head={column.id === rowHeaderId}
                        />
                      );
                    })}
                  </tr>
                ))}
              </tbody>
            </Table>
          </div>
          <Pagination
            page={props.page}
            pageSize={props.pageSize}
            total={props.total}
            onPageChange={props.onPageChange}
            onPageSizeChange={props.onPageSizeChange}
            noun={noun}
          />
        </>
      )}
    </div>
  );
}
