import type { Interval } from "../stats/wilson-interval.ts";
import { cellBetween, cellEnds, type PublishedTable } from "./published-table.ts";

/** How far the cell between two nodes can carry flow from one to the other. */
function capacity(
  table: PublishedTable,
  values: Float64Array,
  hidden: Uint8Array,
  from: number,
  to: number,
  without: number,
): number {
  const cell = cellBetween(table, from, to);
  if (cell < 0 || cell === without || hidden[cell] === 0) return 0;
  // Along the arc a hidden count may grow without end, against it only fall to 0.
  return cellEnds(table, cell)[0] === from ? Number.POSITIVE_INFINITY : values[cell]!;
}

/** A shortest way with room left, as the node before each node; null when there is none. */
function wayTo(
  table: PublishedTable,
  values: Float64Array,
  hidden: Uint8Array,
  source: number,
  target: number,
  without: number,
): Int32Array | null {
  const nodes = table.rows + table.columns;
  const before = new Int32Array(nodes).fill(-1);
  before[source] = source;
  const queue = [source];
  for (let head = 0; head < queue.length; head++) {
    const at = queue[head]!;
    const first = at < table.rows ? table.rows : 0;
    const last = at < table.rows ? nodes : table.rows;
    for (let next = first; next < last; next++) {
      if (before[next]! >= 0) continue;
      if (capacity(table, values, hidden, at, next, without) <= 0) continue;
      before[next] = at;
      if (next === target) return before;
      queue.push(next);
    }
  }
  return null;
}

/** Most that can flow from `source` to `target` through hidden cells other than `without`. */
function mostFlow(
  table: PublishedTable,
  hidden: Uint8Array,
  source: number,
  target: number,
  without: number,
): number {
  const values = table.values.slice();
  let flow = 0;
  for (;;) {
    const before = wayTo(table, values, hidden, source, target, without);
    if (before === null) return flow;
    let room = Number.POSITIVE_INFINITY;
    for (let at = target; at !== source; at = before[at]!) {
      room = Math.min(room, capacity(table, values, hidden, before[at]!, at, without));
    }
    if (room === Number.POSITIVE_INFINITY) return room;
    for (let at = target; at !== source; at = before[at]!) {
      const cell = cellBetween(table, before[at]!, at);
      values[cell]! += cellEnds(table, cell)[0] === before[at] ? room : -room;
    }
    flow += room;
  }
}

/**
 * What a reader can work out about a hidden cell: the least and the most it can be, given that
 * counts are whole and not negative, that parts add up to their totals, and every cell that is not
 * hidden.
 *
 * @param hidden one flag per cell of the table with totals, non-zero = not published
 * @param cell the hidden cell
 * @returns limits that are both reached; the upper one is Infinity when nothing bounds it
 * @throws RangeError when the cell is not hidden
 *
 * Cost: two maximum flows by shortest ways (Edmonds & Karp 1972), each of a few steps in tables of
 * a page. Source: bounds of a cell in a two-way table by network flow: Gusfield 1988, *A graph
 * theoretic approach to statistical data security*, from memory; methods C.12.1 ("feasible
 * interval", Cox 1980).
 */
export function feasibleInterval(
  table: PublishedTable,
  hidden: Uint8Array,
  cell: number,
): Interval {
  if (hidden[cell] === undefined || hidden[cell] === 0) throw new RangeError("the cell is shown");
  const [tail, head] = cellEnds(table, cell);
  const value = table.values[cell]!;
  // More in this cell must flow back from its head to its tail through other hidden cells.
  const up = mostFlow(table, hidden, head, tail, cell);
  const down = Math.min(value, mostFlow(table, hidden, tail, head, cell));
  return [value - down, value + up];
}
