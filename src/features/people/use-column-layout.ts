import { useMemo } from "react";
import type { Person } from "../../../shared/contracts/people.ts";
import type { DataColumn } from "../../components/data-table/data-column.ts";
import { isTextList, useRemembered } from "../../lib/remembered.ts";
import { HIDDEN_AT_FIRST } from "./people-columns.tsx";

/** Widths a column can have, in CSS pixels. */
export const WIDTHS = { narrow: 88, normal: 128, wide: 224 } as const;
export type ColumnWidth = keyof typeof WIDTHS;

/** Ids of columns and words of this program only: nothing about anybody. */
interface Layout {
  hidden: string[];
  order: string[];
  widths: Record<string, ColumnWidth>;
}

function isLayout(value: unknown): value is Layout {
  const { hidden, order, widths } = (value ?? {}) as Partial<Layout>;
  return (
    isTextList(hidden) &&
    isTextList(order) &&
    typeof widths === "object" &&
    widths !== null &&
    Object.values(widths).every((width) => width in WIDTHS)
  );
}

/**
 * Which columns of the line list are shown, in which order and how wide: kept on this device for
 * each account, so that two people at one computer do not rearrange each other's list.
 */
export function useColumnLayout(accountId: string, columns: readonly DataColumn<Person>[]) {
  const [layout, setLayout] = useRemembered<Layout>(
    `people-columns.${accountId}`,
    { hidden: [...HIDDEN_AT_FIRST], order: [], widths: {} },
    isLayout,
  );
  const ordered = useMemo(() => {
    const places = new Map(layout.order.map((id, place) => [id, place]));
    const placeOf = (column: DataColumn<Person>, own: number) =>
      column.rowHeader ? -1 : (places.get(column.id) ?? own);
    return columns
      .map((column, own) => ({ column, place: placeOf(column, own), own }))
      .sort((a, b) => a.place - b.place || a.own - b.own)
      .map(({ column }): DataColumn<Person> => {
        const width = layout.widths[column.id];
        return width ? { ...column, width: WIDTHS[width] } : column;
      });
  }, [columns, layout]);

  const shown = useMemo(
    () => ordered.filter((column) => !layout.hidden.includes(column.id)),
    [ordered, layout],
  );
  return {
    /** Every column in the chosen order. */
    ordered,
    shown,
    isShown: (id: string) => !layout.hidden.includes(id),
    widthOf: (id: string): ColumnWidth => layout.widths[id] ?? "normal",
    show(id: string, visible: boolean) {
      const others = layout.hidden.filter((hidden) => hidden !== id);
      setLayout({ ...layout, hidden: visible ? others : [...others, id] });
    },
    setWidth: (id: string, width: ColumnWidth) =>
      setLayout({ ...layout, widths: { ...layout.widths, [id]: width } }),
    move(id: string, by: -1 | 1) {
      const order = ordered.map((column) => column.id);
      const from = order.indexOf(id);
      const to = from + by;
      // The first column names the row and stays where it is.
      if (from < 1 || to < 1 || to >= order.length) return;
      [order[from], order[to]] = [order[to] as string, order[from] as string];
      setLayout({ ...layout, order });
    },
  };
}
export type ColumnLayout = ReturnType<typeof useColumnLayout>;
