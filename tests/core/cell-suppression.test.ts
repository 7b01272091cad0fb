import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  feasibleInterval,
  publishedRate,
  suppressCells,
  tableWithTotals,
} from "../../shared/core/index.ts";

type Counts = number[][];
const A2 = 1;
// Rows A, B, C of methods C.12.1.
const WORKED: Counts = [
  [12, 3, 25],
  [8, 14, 9],
  [20, 7, 16],
];
const hide = (cells: readonly number[], size: number): Uint8Array =>
  Uint8Array.from({ length: size }, (_, cell) => (cells.includes(cell) ? 1 : 0));

describe("the worked table", () => {
  // [X] methods C.12.1.
  it("has its totals", () => {
    const { rows, columns, values } = tableWithTotals(WORKED);
    expect([rows, columns]).toEqual([4, 4]);
    expect(Array.from(values)).toEqual([
      ...[12, 3, 25, 40],
      ...[8, 14, 9, 31],
      ...[20, 7, 16, 43],
      ...[40, 24, 50, 114],
    ]);
  });

  it.each([
    ["A1, A2, B1, B2", [0, 1, 4, 5], 0, 15],
    ["A1, A2, C1, C2", [0, 1, 8, 9], 0, 10],
    ["A2 alone", [1], 3, 3],
    ["a row of two", [0, 1], 3, 3],
  ])("with %s hidden, A2 is %#", (_, cells, low, high) => {
    expect(feasibleInterval(tableWithTotals(WORKED), hide(cells, 16), A2)).toEqual([low, high]);
  });

  it("hides A2 as small and A1, B1, B2 at the least loss", () => {
    const got = suppressCells(WORKED, { threshold: 5 });
    expect(got.published).toEqual([
      [null, null, 25, 40],
      [null, null, 9, 31],
      [20, 7, 16, 43],
      [40, 24, 50, 114],
    ]);
    expect(got.safe).toBe(true);
    expect(got.suppressed).toEqual([
      { row: 0, column: 0, state: "complementary", interval: [0, 15], wideEnough: true },
      { row: 0, column: 1, state: "primary", interval: [0, 15], wideEnough: true },
      { row: 1, column: 0, state: "complementary", interval: [5, 20], wideEnough: true },
      { row: 1, column: 1, state: "complementary", interval: [2, 17], wideEnough: true },
    ]);
  });

  it.each([
    [3, []],
    [5, [3]],
    [10, [3, 8, 9, 7]],
    [11, [3, 8, 9, 7]],
  ])("at a threshold of %i the small counts are %o", (threshold, small) => {
    const { suppressed } = suppressCells(WORKED, { threshold });
    const primary = suppressed.filter((cell) => cell.state === "primary");
    expect(primary.map(({ row, column }) => WORKED[row]?.[column])).toEqual(small);
  });

  it("hides nothing more when no total is published", () => {
    const totals = { rows: false, columns: false, all: false };
    const { suppressed, safe } = suppressCells(WORKED, { threshold: 5, totals });
    expect(suppressed).toEqual([
      {
        row: 0,
        column: 1,
        state: "primary",
        interval: [0, Number.POSITIVE_INFINITY],
        wideEnough: true,
      },
    ]);
    expect(safe).toBe(true);
  });

  it("hides a second count of a list with its sum", () => {
    // One row: the totals of columns are the counts themselves and are not published.
    const totals = { rows: true, columns: false, all: false };
    const { published, suppressed } = suppressCells([[30, 2, 11, 40]], { threshold: 5, totals });
    expect(published[0]).toEqual([30, null, null, 40, 83]);
    expect(suppressed.map((cell) => cell.interval)).toEqual([
      [0, 13],
      [0, 13],
    ]);
  });

  it("protects a change since the report before", () => {
    const previous = WORKED.map((row) => row.map((value): number | null => value));
    previous[2] = [20, 7, 14];
    const got = suppressCells(WORKED, { threshold: 3, previous });
    const changed = got.suppressed.filter((cell) => cell.state === "difference");
    expect(changed.map(({ row, column }) => [row, column])).toEqual([[2, 2]]);
    expect(got.safe).toBe(true);
    previous[2] = [20, 7, null];
    expect(suppressCells(WORKED, { threshold: 3, previous }).suppressed).toEqual([]);
  });

  it("hides totals as the last resort", () => {
    // All of it is small, totals included: nothing bounds it any more.
    const [only] = suppressCells([[3]], { threshold: 5 }).suppressed;
    expect(only).toMatchObject({ state: "primary", interval: [0, Number.POSITIVE_INFINITY] });
    const counts = [
      [3, 0],
      [0, 9],
    ];
    const got = suppressCells(counts, { threshold: 5 });
    expect(got.published).toEqual([
      [null, 0, null],
      [0, 9, 9],
      [null, 9, null],
    ]);
    expect(got.suppressed[0]?.interval).toEqual([0, Number.POSITIVE_INFINITY]);
    expect(got.safe).toBe(true);
  });

  it("leaves zeros unless told otherwise", () => {
    const counts = [
      [0, 20],
      [20, 20],
    ];
    expect(suppressCells(counts, { threshold: 5 }).suppressed).toEqual([]);
    const [first] = suppressCells(counts, { threshold: 5, hideZeros: true }).suppressed;
    expect(first).toMatchObject({ row: 0, column: 0, state: "primary" });
  });

  it("refuses tables and settings that make no sense", () => {
    expect(() => suppressCells([], { threshold: 5 })).toThrow(RangeError);
    expect(() => suppressCells([[1, 2], [3]], { threshold: 5 })).toThrow(RangeError);
    expect(() => suppressCells([[1.5]], { threshold: 5 })).toThrow(RangeError);
    expect(() => suppressCells(WORKED, { threshold: 0 })).toThrow(RangeError);
    expect(() => suppressCells(WORKED, { threshold: 5, previous: [[1]] })).toThrow(RangeError);
    expect(() => feasibleInterval(tableWithTotals(WORKED), hide([], 16), 0)).toThrow(RangeError);
  });
});

/** All tables of whole counts with the same shown cells and totals, by trying every count. */
function bruteInterval(counts: Counts, hidden: Uint8Array, cell: number): [number, number] {
  const { rows, columns, values } = tableWithTotals(counts);
  const inner = Array.from(hidden.keys()).filter(
    (at) => hidden[at] === 1 && at % columns < columns - 1 && at < (rows - 1) * columns,
  );
  const found: number[] = [];
  const trial = counts.map((row) => [...row]);
  const tried = new Array<number>(inner.length).fill(0);
  const most = Math.max(...values);
  for (;;) {
    inner.forEach((at, k) => {
      const row = trial[Math.floor(at / columns)];
      if (row) row[at % columns] = tried[k] ?? 0;
    });
    const sums = tableWithTotals(trial).values;
    if (values.every((value, at) => hidden[at] === 1 || sums[at] === value)) {
      found.push(sums[cell] ?? -1);
    }
    let k = 0;
    while (k < tried.length && tried[k] === most) tried[k++] = 0;
    if (k === tried.length) break;
    tried[k] = (tried[k] ?? 0) + 1;
  }
  return [Math.min(...found), Math.max(...found)];
}

describe("properties", () => {
  const table = (rows: number, columns: number, max: number) =>
    fc.array(fc.array(fc.integer({ min: 0, max }), { minLength: columns, maxLength: columns }), {
      minLength: rows,
      maxLength: rows,
    });
  const SEED = 20260301;

  it("has intervals that trying every table confirms", () => {
    // Totals of one row and column may be hidden too, as long as the grand total bounds them.
    const hiding = fc.uniqueArray(fc.integer({ min: 0, max: 10 }), { minLength: 1, maxLength: 5 });
    fc.assert(
      fc.property(table(2, 3, 2), hiding, (counts, cells) => {
        const hidden = hide(cells, 12);
        const inner = cells.filter((at) => at % 4 < 3 && at < 8);
        for (const cell of inner) {
          const got = feasibleInterval(tableWithTotals(counts), hidden, cell);
          expect(got).toEqual(bruteInterval(counts, hidden, cell));
        }
      }),
      { seed: SEED, numRuns: 120 },
    );
  });

  it("never shows a small count, and tells the truth about every hidden one", () => {
    fc.assert(
      fc.property(table(4, 4, 30), fc.constantFrom(3, 5, 10), (counts, threshold) => {
        const got = suppressCells(counts, { threshold });
        const { values, columns } = tableWithTotals(counts);
        expect(got.safe).toBe(true);
        got.published.forEach((row, r) => {
          row.forEach((shown, c) => {
            const value = values[r * columns + c];
            if (shown !== null) {
              expect(shown).toBe(value);
              expect(shown === 0 || shown >= threshold).toBe(true);
            }
          });
        });
        for (const { row, column, interval, wideEnough } of got.suppressed) {
          const value = values[row * columns + column] ?? -1;
          expect(interval[0]).toBeLessThanOrEqual(value);
          expect(interval[1]).toBeGreaterThanOrEqual(value);
          expect(wideEnough).toBe(interval[1] - interval[0] >= threshold);
          // A row or column with its total shown holds no single hidden cell.
          if (wideEnough && column < columns - 1 && row < 4 && got.published[row]?.[4] !== null) {
            expect(got.published[row]?.filter((one) => one === null).length).toBeGreaterThan(1);
          }
        }
      }),
      { seed: SEED, numRuns: 100 },
    );
  });
});

describe("rates", () => {
  it("are hidden with their counts", () => {
    expect(publishedRate(6, 8)).toBe(0.75);
    for (const [x, n] of [
      [null, 8],
      [6, null],
      [0, 0],
    ] as const) {
      expect(publishedRate(x, n)).toBeNull();
    }
  });
});
