import { cellBetween, cellEnds, type PublishedTable } from "./published-table.ts";

/**
 * The cheapest set of further cells to hide so that `cell` can be `slack` more than it is: the
 * cheapest round through the table on which every cell that must fall can fall by that much.
 *
 * @param hidden one flag per cell of the table with totals
 * @param slack how much the cell must be able to grow, > 0
 * @param zerosMayHide whether cells of 0 may be hidden as well
 * @returns cells to hide, the hidden ones among them left out; null when there is no such round
 *
 * The loss is the sum of the counts hidden. Totals of rows and columns are taken only where no
 * round through inner cells exists. Ties: the lower row, then the lower column. Cost:
 * O((rows + columns)²). Source: methods C.12.1 (least loss); shortest paths by Dijkstra 1959.
 */
export function complementaryCells(
  table: PublishedTable,
  hidden: Uint8Array,
  cell: number,
  slack: number,
  zerosMayHide: boolean,
): number[] | null {
  const nodes = table.rows + table.columns;
  const [target, source] = cellEnds(table, cell);
  const grand = table.values[table.values.length - 1]!;
  const lossOf = (from: number, to: number): number => {
    const way = cellBetween(table, from, to);
    if (way < 0 || way === cell) return Number.POSITIVE_INFINITY;
    const value = table.values[way]!;
    const falls = cellEnds(table, way)[0] !== from;
    if (falls && value < slack) return Number.POSITIVE_INFINITY;
    if (hidden[way] !== 0) return 0;
    if (value === 0 && !zerosMayHide) return Number.POSITIVE_INFINITY;
    const isTotal =
      Math.floor(way / table.columns) === table.rows - 1 ||
      way % table.columns === table.columns - 1;
    // More than all inner cells together, so that a total is the last resort.
    return isTotal ? value + 2 * grand + 1 : value;
  };

  const loss = new Float64Array(nodes).fill(Number.POSITIVE_INFINITY);
  const before = new Int32Array(nodes).fill(-1);
  const done = new Uint8Array(nodes);
  loss[source] = 0;
  for (let step = 0; step < nodes; step++) {
    let at = -1;
    for (let u = 0; u < nodes; u++) {
      if (done[u] === 0 && Number.isFinite(loss[u]!) && (at < 0 || loss[u]! < loss[at]!)) at = u;
    }
    if (at < 0 || at === target) break;
    done[at] = 1;
    for (let next = 0; next < nodes; next++) {
      const through = loss[at]! + lossOf(at, next);
      if (through < loss[next]!) {
        loss[next] = through;
        before[next] = at;
      }
    }
  }
  if (!Number.isFinite(loss[target]!)) return null;
  const cells: number[] = [];
  for (let at = target; at !== source; at = before[at]!) {
    const way = cellBetween(table, before[at]!, at);
    if (hidden[way] === 0) cells.push(way);
  }
  return cells.sort((x, y) => x - y);
}
