/**
 * A table of counts with its totals as a network: rows and columns are nodes, the row of totals and
 * the column of totals two more, and every cell an arc. Cells lead from their row to their column,
 * totals lead back, so that "parts add up to their total" reads "what flows in flows out" at every
 * node. What hidden cells can be is then a question of flows, whole numbers included.
 */
export type PublishedTable = {
  /** Rows and columns, those of totals included and standing last. */
  readonly rows: number;
  readonly columns: number;
  /** Count of each cell, row by row. */
  readonly values: Float64Array;
};

/** Node from which the arc of a cell starts, and the node to which it leads. */
export function cellEnds(table: PublishedTable, cell: number): [tail: number, head: number] {
  const row = Math.floor(cell / table.columns);
  const column = cell % table.columns;
  const across = row;
  const down = table.rows + column;
  // A total of one direction flows backwards; the grand total, one of both, forwards again.
  const backwards = (row === table.rows - 1) !== (column === table.columns - 1);
  return backwards ? [down, across] : [across, down];
}

/** The cell between two nodes, or −1 when both are rows or both are columns. */
export function cellBetween(table: PublishedTable, from: number, to: number): number {
  const across = Math.min(from, to);
  const down = Math.max(from, to) - table.rows;
  return across < table.rows && down >= 0 ? across * table.columns + down : -1;
}

/**
 * Adds the totals to a table of counts.
 * @throws RangeError for an empty table, rows of unequal length, or anything but whole counts >= 0
 */
export function tableWithTotals(counts: readonly (readonly number[])[]): PublishedTable {
  const width = counts[0]?.length ?? 0;
  if (width === 0) throw new RangeError("a table needs at least one row and one column");
  const rows = counts.length + 1;
  const columns = width + 1;
  const values = new Float64Array(rows * columns);
  counts.forEach((row, r) => {
    if (row.length !== width) throw new RangeError("rows differ in length");
    row.forEach((value, c) => {
      if (!Number.isSafeInteger(value) || value < 0) {
        throw new RangeError("counts must be whole numbers >= 0");
      }
      for (const cell of [r * columns + c, r * columns + width, (rows - 1) * columns + c]) {
        values[cell]! += value;
      }
      values[rows * columns - 1]! += value;
    });
  });
  return { rows, columns, values };
}
