import { type KeyboardEvent, type RefObject, useEffect, useRef, useState } from "react";
import type { RowSelection } from "./row-selection.ts";

const page = 15;

export interface VirtualKeysOptions<Row> {
  total: number;
  rowAt: (index: number) => Row | undefined;
  open: ((row: Row) => void) | undefined;
  selection: RowSelection<Row> | undefined;
  scroller: RefObject<HTMLElement | null>;
  /** Row in the tab order when the table opens. */
  firstRow: number;
}

/**
 * Keys of a table that shows a part of its rows. One row is in the tab order: arrows, Page up and
 * down, Home and End move it over the whole list, Enter opens, Space selects, Shift with an arrow
 * selects along the way, Ctrl or Cmd with A selects everything. Keys typed in a control inside a row
 * are left to that control.
 */
export function useVirtualKeys<Row>(options: VirtualKeysOptions<Row>) {
  const { total, rowAt, open, selection, scroller, firstRow } = options;
  const [wanted, setActive] = useState(firstRow);
  const active = Math.min(wanted, Math.max(0, total - 1));
  const toFocus = useRef<number | null>(null);

  /** Focuses the row that a key moved to, once it is drawn; every drawing is looked at. */
  useEffect(() => {
    if (toFocus.current === null) return;
    const row = scroller.current?.querySelector<HTMLElement>(`[data-row="${toFocus.current}"]`);
    if (!row) return;
    toFocus.current = null;
    row.focus({ preventScroll: true });
  });

  function move(index: number, scrollTo: (index: number) => void) {
    setActive(index);
    toFocus.current = index;
    scrollTo(index);
  }

  function onKeyDown(
    event: KeyboardEvent<HTMLElement>,
    index: number,
    scrollTo: (i: number) => void,
  ) {
    if (event.target !== event.currentTarget) return;
    const row = rowAt(index);
    const last = total - 1;
    const next = {
      ArrowDown: Math.min(last, index + 1),
      ArrowUp: Math.max(0, index - 1),
      PageDown: Math.min(last, index + page),
      PageUp: Math.max(0, index - page),
      Home: 0,
      End: last,
    }[event.key];
    if (next !== undefined) {
      event.preventDefault();
      if (event.shiftKey && selection && event.key.startsWith("Arrow")) {
        selection.add([row, rowAt(next)].filter((one) => one !== undefined));
      }
      move(next, scrollTo);
    } else if (event.key === "Enter" && row !== undefined) {
      event.preventDefault();
      open?.(row);
    } else if (event.key === " " && selection) {
      event.preventDefault();
      if (row !== undefined) selection.toggle(row);
    } else if (event.key === "a" && (event.ctrlKey || event.metaKey) && selection) {
      event.preventDefault();
      selection.selectAll();
    }
  }

  return { active, setActive, onKeyDown };
}
