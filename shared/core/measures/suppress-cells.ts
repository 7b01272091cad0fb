import type { Interval } from "../stats/wilson-interval.ts";
import { complementaryCells } from "./complementary-cells.ts";
import { feasibleInterval } from "./feasible-interval.ts";
import { tableWithTotals } from "./published-table.ts";

export type SuppressionOptions = {
  /** t: counts of 1 … t − 1 are hidden. */
  readonly threshold: number;
  /** Whether the totals of rows, of columns and over all are published. Default: all of them. */
  readonly totals?: { readonly rows: boolean; readonly columns: boolean; readonly all: boolean };
  /** Hide counts of 0 as well, where a 0 would tell something. Default false. */
  readonly hideZeros?: boolean;
  /** How wide the interval of a hidden count must be at least. Default t. */
  readonly width?: number;
  /** The table as published before (null = hidden then), so that differences stay hidden too. */
  readonly previous?: readonly (readonly (number | null)[])[] | null;
};

/** `primary`: small itself; `difference`: would tell a small change; `complementary`: protects. */
export type CellState = "shown" | "primary" | "difference" | "complementary" | "not_published";

export type SuppressedCell = {
  /** Row and column; the number of rows (columns) stands for the totals. */
  readonly row: number;
  readonly column: number;
  readonly state: Exclude<CellState, "shown" | "not_published">;
  /** What a reader can work out: least and most. */
  readonly interval: Interval;
  readonly wideEnough: boolean;
};

export type SuppressedTable = {
  /** With totals as last row and last column; null = hidden. */
  readonly published: readonly (readonly (number | null)[])[];
  readonly suppressed: readonly SuppressedCell[];
  /**
   * False when some hidden count can still be narrowed down: withhold the whole table then. Checked
   * and not assumed, although hiding totals as a last resort should always get there.
   */
  readonly safe: boolean;
};

/**
 * Hides small counts of a table, and further ones until none of them can be worked out from the
 * totals.
 *
 * Primary: 0 < count < t, totals included; 0 only with `hideZeros`. Against `previous`: a count
 * that changed by 1 … t − 1 since. Complementary: while a hidden cell's feasible interval is
 * narrower than `width`, the cheapest round of cells that lets it grow so far is hidden too; where
 * there is none, one that lets it grow at all.
 *
 * This finds a cheap set, not the cheapest: minimising the loss over all cells together is hard
 * (NP). Cells of 0 are not used to protect others unless `hideZeros`, since a reader may know them.
 *
 * @param counts rows of counts, without totals
 * @throws RangeError for a table that is none, a threshold or width below 1, or a previous table
 *   of another shape
 *
 * Cost: a few maximum flows per hidden cell. Source: Cox 1980, *Suppression methodology and
 * statistical disclosure control*; Hundepool et al. 2012; methods C.12.1.
 */
export function suppressCells(
  counts: readonly (readonly number[])[],
  options: SuppressionOptions,
): SuppressedTable {
  const { threshold, hideZeros = false, width = threshold, previous = null } = options;
  for (const limit of [threshold, width]) {
    if (!Number.isSafeInteger(limit) || limit < 1) {
      throw new RangeError("threshold and width must be whole numbers >= 1");
    }
  }
  const table = tableWithTotals(counts);
  const { rows, columns, values } = table;
  const states = initialStates();
  const hidden = Uint8Array.from(states, (state) => (state === "shown" ? 0 : 1));

  // Hiding more never narrows an interval, so a cell that is wide enough need not be looked at again.
  const open = states.flatMap((state, cell) =>
    state === "shown" || state === "not_published" ? [] : [cell],
  );
  for (let cell = open.shift(); cell !== undefined; cell = open.shift()) {
    for (let more: number[] | null = []; more !== null && isNarrow(cell); ) {
      more =
        complementaryCells(table, hidden, cell, width, hideZeros) ??
        complementaryCells(table, hidden, cell, 1, hideZeros);
      if (more?.length === 0) more = null;
      for (const one of more ?? []) {
        hidden[one] = 1;
        states[one] = "complementary";
        open.push(one);
      }
    }
  }
  return answer();

  function isNarrow(cell: number): boolean {
    const [low, high] = feasibleInterval(table, hidden, cell, width);
    return high - low < width;
  }

  function initialStates(): CellState[] {
    const totals = options.totals ?? { rows: true, columns: true, all: true };
    if (previous && (previous.length !== counts.length || previous.some(unlike))) {
      throw new RangeError("the previous table has another shape");
    }
    return Array.from(values, (value, cell) => {
      const row = Math.floor(cell / columns);
      const column = cell % columns;
      const [inTotalRow, inTotalColumn] = [row === rows - 1, column === columns - 1];
      if (inTotalRow && inTotalColumn) {
        if (!totals.all) return "not_published";
      } else if (inTotalRow ? !totals.columns : inTotalColumn && !totals.rows) {
        return "not_published";
      }
      if (value === 0 ? hideZeros : value < threshold) return "primary";
      const before = previous?.[row]?.[column] ?? null;
      const change = before === null ? 0 : Math.abs(value - before);
      return change > 0 && change < threshold ? "difference" : "shown";
    });
  }

  function unlike(row: readonly (number | null)[]): boolean {
    return row.length !== columns - 1;
  }

  function answer(): SuppressedTable {
    const suppressed: SuppressedCell[] = [];
    const published: (number | null)[][] = [];
    for (let row = 0; row < rows; row++) {
      const line: (number | null)[] = [];
      for (let column = 0; column < columns; column++) {
        const cell = row * columns + column;
        const state = states[cell]!;
        line.push(state === "shown" ? values[cell]! : null);
        if (state === "shown" || state === "not_published") continue;
        const interval = feasibleInterval(table, hidden, cell);
        const wideEnough = interval[1] - interval[0] >= width;
        suppressed.push({ row, column, state, interval, wideEnough });
      }
      published.push(line);
    }
    return { published, suppressed, safe: suppressed.every((cell) => cell.wideEnough) };
  }
}

/**
 * A rate of two published counts: hidden as soon as one of them is, and none of 0.
 * @returns null when hidden or undefined
 *
 * Source: methods C.12.1 ("suppress rates whose numerator or denominator is suppressed").
 */
export function publishedRate(numerator: number | null, denominator: number | null): number | null {
  if (numerator === null || denominator === null || denominator === 0) return null;
  return numerator / denominator;
}
