import { type KeyboardEvent, type ReactNode, useEffect, useMemo, useRef } from "react";
import { useNavigate } from "react-router-dom";
import { formatNumber } from "../../lib/formatters.ts";
import { useNarrow } from "../../lib/use-narrow.ts";
import { EmptyState } from "../ui/empty-state.tsx";
import { type ErrorKind, ErrorState } from "../ui/error-state.tsx";
import { LoadingState } from "../ui/loading-state.tsx";
import type { DataColumn, SortState } from "./data-column.ts";
import type { RowSelection } from "./row-selection.ts";
import { useVirtualKeys } from "./use-virtual-keys.ts";
import { useVirtualRows } from "./use-virtual-rows.ts";
import { VirtualCards } from "./virtual-cards.tsx";
import { VirtualRows } from "./virtual-rows.tsx";

const rowHeight = 36;
const cardHeight = 68;
const headHeight = 40;

export type VirtualTableProps<Row extends object> = {
  /** What the rows are: "People on record". */
  caption: string;
  /** Columns shown, in order. */
  columns: readonly DataColumn<Row>[];
  /** Rows in all. */
  total: number;
  /** A row, or nothing while its page is on the way. */
  rowAt: (index: number) => Row | undefined;
  rowId: (row: Row) => string;
  /** Told which rows are in view, so that their pages can be asked for. */
  onRange: (first: number, last: number) => void;
  /** Names what the rows answer: another question begins at its top. */
  question: string;
  /** Row at the top when the table opens: where it was left. */
  firstRow?: number;
  sort: SortState;
  onSortChange: (sort: SortState) => void;
  /** Opens a row by the link in its naming cell, by a click on it, and by Enter. */
  rowTo: (row: Row) => string;
  /** What stands on the two lines of a row where the page is too narrow for columns. */
  card: (row: Row) => { title: ReactNode; more: ReactNode };
  selection?: RowSelection<Row> | undefined;
  state?: "ready" | "loading" | "error";
  /** Rows of the question before are shown while the answer to a new one comes. */
  updating?: boolean;
  errorKind?: ErrorKind;
  onRetry?: () => void;
  empty?: ReactNode;
  noun: string;
};

/** A table of any number of rows: those in view are drawn, and asked for as they come into view. */
export function VirtualTable<Row extends object>(props: VirtualTableProps<Row>) {
  const { state = "ready", noun, total } = props;
  if (state === "loading") return <LoadingState label={`Loading ${noun}`} rows={8} />;
  if (state === "error") return <ErrorState kind={props.errorKind} onRetry={props.onRetry} />;
  if (total === 0) return props.empty ?? <EmptyState title={`No ${noun} to show`} />;
  return <Scrolled {...props} />;
}

function Scrolled<Row extends object>(props: VirtualTableProps<Row>) {
  const { total, rowAt, rowTo, selection, firstRow = 0 } = props;
  const narrow = useNarrow();
  const navigate = useNavigate();
  const scroller = useRef<HTMLDivElement>(null);
  const keys = useVirtualKeys({
    total,
    rowAt,
    open: (row) => void navigate(rowTo(row)),
    selection,
    scroller,
    firstRow,
  });
  const rows = useVirtualRows({
    count: total,
    rowHeight: narrow ? cardHeight : rowHeight,
    headHeight: narrow ? 0 : headHeight,
    scroller,
    active: keys.active,
    firstRow,
    onRange: props.onRange,
  });
  const asked = useRef(props.question);
  const { setActive } = keys;
  useEffect(() => {
    if (asked.current === props.question) return;
    asked.current = props.question;
    setActive(0);
    rows.scrollToOffset(0);
  }, [props.question, rows, setActive]);
  const scrollTo = (index: number) => rows.scrollToIndex(index, { align: "auto" });
  // What rows call stays the same from one drawing to the next, so that a row is drawn again only
  // when something in it changes.
  const latest = useRef<RowActions<Row>>(null as unknown as RowActions<Row>);
  latest.current = {
    onFocus: keys.setActive,
    onKeyDown: (event, index) => keys.onKeyDown(event, index, scrollTo),
    open: (row) => void navigate(rowTo(row)),
    rowTo,
    toggle: (row) => selection?.toggle(row),
  };
  const actions = useMemo(
    (): RowActions<Row> => ({
      onFocus: (index) => latest.current.onFocus(index),
      onKeyDown: (event, index) => latest.current.onKeyDown(event, index),
      open: (row) => latest.current.open(row),
      rowTo: (row) => latest.current.rowTo(row),
      toggle: (row) => latest.current.toggle(row),
    }),
    [],
  );
  const drawn: DrawnRows<Row> = {
    items: rows.getVirtualItems(),
    height: rows.getTotalSize(),
    active: keys.active,
    actions,
  };
  return (
    <>
      <div
        ref={scroller}
        // Positioned, or words for readers only would widen the page past the scrolled part.
        className={`relative -mx-1 max-h-[70vh] overflow-auto px-1 ${props.updating ? "opacity-60" : ""}`}
        aria-busy={props.updating || undefined}
        data-table-scroll=""
      >
        {narrow ? (
          <VirtualCards {...props} drawn={drawn} />
        ) : (
          <VirtualRows {...props} drawn={drawn} rowHeight={rowHeight} />
        )}
      </div>
      <p aria-live="polite" className="py-2 text-sm text-ink-2">
        {formatNumber(total)} {props.noun}
      </p>
    </>
  );
}

/** What a row can call. */
export interface RowActions<Row> {
  onFocus: (index: number) => void;
  onKeyDown: (event: KeyboardEvent<HTMLElement>, index: number) => void;
  open: (row: Row) => void;
  rowTo: (row: Row) => string;
  toggle: (row: Row) => void;
}

/** What the two ways of drawing rows share. */
export interface DrawnRows<Row> {
  items: readonly { index: number; start: number; end: number }[];
  /** Height of all rows together. */
  height: number;
  active: number;
  actions: RowActions<Row>;
}
