import { type KeyboardEvent, useState } from "react";

/**
 * One row of a table is in the tab order; up, down, Home and End move it, Enter opens. Keys typed
 * in a control inside the row are left to that control.
 */
export function useRowKeys(count: number, open: ((index: number) => void) | undefined) {
  const [wanted, setActive] = useState(0);
  const active = Math.min(wanted, Math.max(0, count - 1));

  function onKeyDown(event: KeyboardEvent<HTMLTableRowElement>, index: number) {
    if (event.target !== event.currentTarget) return;
    const next = {
      ArrowDown: Math.min(count - 1, index + 1),
      ArrowUp: Math.max(0, index - 1),
      Home: 0,
      End: count - 1,
    }[event.key];
    if (next !== undefined) {
      event.preventDefault();
      setActive(next);
      const rows = event.currentTarget.parentElement?.children;
      const row = rows?.[next];
      if (row instanceof HTMLElement) row.focus();
    } else if (event.key === "Enter") {
      event.preventDefault();
      open?.(index);
    }
  }

  return { active, setActive, onKeyDown };
}
