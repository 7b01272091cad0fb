import type { KeyboardEvent } from "react";

type ListName = "contacts" | "groupExposures";

export interface RowKeysOptions {
  list: ListName;
  /** Boxes of a row in the order of Tab. */
  boxes: readonly string[];
  rows: () => number;
  isBlank: (row: number) => boolean;
  /** Opens a row at the end, unless the last one is still blank, and goes to its first box. */
  openNext: () => void;
  remove: (row: number) => void;
  /** Takes setting, place and days over from the row above. */
  carry: (row: number) => void;
}

/** Puts the cursor into a box of a row; false when it is not there. */
export function focusBox(root: ParentNode, list: ListName, row: number, box: string): boolean {
  const found = root.querySelector<HTMLElement>(
    `[data-list="${list}"][data-row="${row}"][data-box="${box}"]`,
  );
  if (!found) return false;
  found.focus();
  if (found instanceof HTMLInputElement) found.select();
  return true;
}

/**
 * Keys of repeating rows. Enter goes to the next box and, in the last one, to the next row; Ctrl
 * with Enter opens the next row from anywhere in a row; Alt with up or down changes the row;
 * Ctrl with Backspace takes an empty row away (with Shift also a filled one); Ctrl with ' is
 * "same as above".
 */
export function createRowKeys(options: RowKeysOptions) {
  const { list, boxes } = options;
  return (event: KeyboardEvent<HTMLElement>) => {
    const target = event.target as HTMLElement;
    const at = target.closest<HTMLElement>(`[data-list="${list}"][data-row]`);
    if (!at) return;
    const root = event.currentTarget;
    const row = Number(at.dataset.row);
    const box = at.dataset.box ?? "";
    const mod = event.ctrlKey || event.metaKey;
    const take = () => {
      event.preventDefault();
      event.stopPropagation();
    };

    if (event.key === "Enter" && mod) {
      take();
      options.openNext();
    } else if (event.key === "Enter" && target.tagName !== "BUTTON") {
      take();
      const place = boxes.indexOf(box);
      const next = boxes.slice(place + 1).find((name) => focusBox(root, list, row, name));
      if (next !== undefined) return;
      if (row + 1 < options.rows()) focusBox(root, list, row + 1, boxes[0] ?? "");
      else options.openNext();
    } else if (event.altKey && (event.key === "ArrowUp" || event.key === "ArrowDown")) {
      take();
      const other = row + (event.key === "ArrowUp" ? -1 : 1);
      // A tied row has no telephone box: its first box stands in.
      if (!focusBox(root, list, other, box)) focusBox(root, list, other, boxes[0] ?? "");
    } else if (event.key === "Backspace" && mod && (event.shiftKey || options.isBlank(row))) {
      take();
      options.remove(row);
    } else if (mod && (event.key === "'" || event.key === '"' || event.code === "Quote")) {
      take();
      options.carry(row);
    }
  };
}
