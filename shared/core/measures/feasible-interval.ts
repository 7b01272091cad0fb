import type { Interval } from "../stats/wilson-interval.ts";
import { cellBetween, cellEnds, type PublishedTable } from "./published-table.ts";

/** The hidden part of a table as a network that flow is pushed through. */
type Residual = {
  readonly table: PublishedTable;
  readonly hidden: Uint8Array;
  /** The cell asked about, through which nothing flows. */
  readonly without: number;
  /** Counts as changed by the flow so far. */
  readonly values: Float64Array;
  /** Node before each node on a way, −1 = not reached; and the nodes in order of reaching. */
  readonly before: Int32Array;
  readonly queue: Int32Array;
};

/** How far the cell between two nodes can carry flow from one to the other. */
function capacity(net: Residual, from: number, to: number): number {
  const { rows, columns } = net.table;
  const row = from < rows ? from : to;
  const column = (from < rows ? to : from) - rows;
  const cell = row * columns + column;
  if (cell === net.without || net.hidden[cell] === 0) return 0;
  // Along the arc (see `cellEnds`) a hidden count may grow without end, against it only fall to 0.
  const backwards = (row === rows - 1) !== (column === columns - 1);
  return from < rows === backwards ? net.values[cell]! : Number.POSITIVE_INFINITY;
}

/** Finds a shortest way with room left and writes it to `before`; false when there is none. */
function findWay(net: Residual, source: number, target: number): boolean {
  const { before, queue } = net;
  const { rows } = net.table;
  before.fill(-1);
  before[source] = source;
  queue[0] = source;
  let tail = 1;
  for (let head = 0; head < tail; head++) {
    const at = queue[head]!;
    const first = at < rows ? rows : 0;
    const last = at < rows ? before.length : rows;
    for (let next = first; next < last; next++) {
      if (before[next]! >= 0 || !(capacity(net, at, next) > 0)) continue;
      before[next] = at;
      if (next === target) return true;
      queue[tail++] = next;
    }
  }
  return false;
}

/** Most that can flow from `source` to `target`, or at least `enough` when it can be that much. */
function mostFlow(net: Residual, source: number, target: number, enough: number): number {
  const { table, before, values } = net;
  values.set(table.values);
  let flow = 0;
  while (flow < enough && findWay(net, source, target)) {
    let room = Number.POSITIVE_INFINITY;
    for (let at = target; at !== source; at = before[at]!) {
      room = Math.min(room, capacity(net, before[at]!, at));
    }
    if (room === Number.POSITIVE_INFINITY) return room;
    for (let at = target; at !== source; at = before[at]!) {
      const cell = cellBetween(table, before[at]!, at);
      values[cell]! += cellEnds(table, cell)[0] === before[at] ? room : -room;
    }
    flow += room;
  }
  return flow;
}

/**
 * What a reader can work out about a hidden cell: the least and the most it can be, given that
 * counts are whole and not negative, that parts add up to their totals, and every cell that is not
 * hidden.
 *
 * @param hidden one flag per cell of the table with totals, non-zero = not published
 * @param cell the hidden cell
 * @param enough stop once the interval is known to be this wide; the limits then lie within the true
 *   ones. Default: the true ones
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
  enough = Number.POSITIVE_INFINITY,
): Interval {
  if (hidden[cell] === undefined || hidden[cell] === 0) throw new RangeError("the cell is shown");
  const nodes = table.rows + table.columns;
  const net: Residual = {
    table,
    hidden,
    without: cell,
    values: new Float64Array(table.values.length),
    before: new Int32Array(nodes),
    queue: new Int32Array(nodes),
  };
  const [tail, head] = cellEnds(table, cell);
  const value = table.values[cell]!;
  // More in this cell must flow back from its head to its tail through other hidden cells.
  const up = mostFlow(net, head, tail, enough);
  const known = up >= enough && Number.isFinite(enough);
  const down = known ? 0 : Math.min(value, mostFlow(net, tail, head, value));
  return [value - down, value + up];
}
