import {
  defaultRangeExtractor,
  observeElementRect,
  type Range,
  useVirtualizer,
  type Virtualizer,
} from "@tanstack/react-virtual";
import { type RefObject, useEffect, useRef } from "react";

/** Assumed until the scrolled part has been measured (and where nothing has a size, as in tests). */
const firstRect = { width: 1000, height: 640 };

function observeRect<E extends Element>(
  instance: Virtualizer<E, Element>,
  report: (rect: { width: number; height: number }) => void,
) {
  return observeElementRect(instance, (rect) => report(rect.height > 0 ? rect : firstRect));
}

export interface VirtualRowsOptions {
  count: number;
  rowHeight: number;
  scroller: RefObject<HTMLElement | null>;
  /** The row in the tab order; it is kept even when scrolled away, so that focus is not lost. */
  active: number;
  /** Row at the top when the table opens. */
  firstRow: number;
  /** Height of a head that stays over the rows. */
  headHeight: number;
  /** Told which rows are in view, when that changes. */
  onRange: (first: number, last: number) => void;
}

/** The rows to draw out of a list of any length; all are equally high. */
export function useVirtualRows(options: VirtualRowsOptions) {
  const { count, rowHeight, scroller, active, firstRow, headHeight, onRange } = options;
  const rows = useVirtualizer<HTMLElement, Element>({
    count,
    getScrollElement: () => scroller.current,
    estimateSize: () => rowHeight,
    overscan: 8,
    useFlushSync: false,
    initialRect: firstRect,
    // The head takes its height from the part that is seen, at the foot as the rows are counted.
    scrollPaddingEnd: headHeight,
    initialOffset: firstRow * rowHeight,
    observeElementRect: observeRect,
    rangeExtractor: (range: Range) => {
      const wanted = defaultRangeExtractor(range);
      if (active >= count || wanted.includes(active)) return wanted;
      return [...wanted, active].sort((a, b) => a - b);
    },
  });
  // biome-ignore lint/correctness/useExhaustiveDependencies: rows of another height are measured anew
  useEffect(() => rows.measure(), [rowHeight]);
  const { startIndex = 0, endIndex = 0 } = rows.range ?? {};
  const told = useRef("");
  useEffect(() => {
    const range = `${startIndex}-${endIndex}-${count}`;
    if (told.current === range) return;
    told.current = range;
    onRange(startIndex, endIndex);
  }, [startIndex, endIndex, count, onRange]);
  return rows;
}

/** Rows with the blank heights before and after each, so that few elements stand for all. */
export function withGaps(
  items: readonly { index: number; start: number; end: number }[],
  totalHeight: number,
) {
  let end = 0;
  const parts = items.map((item) => {
    const before = Math.max(0, item.start - end);
    end = item.end;
    return { index: item.index, before };
  });
  return { parts, after: Math.max(0, totalHeight - end) };
}
