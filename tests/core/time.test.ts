import { describe, expect, it } from "vitest";
import {
  dayNumber,
  dayString,
  type ExposureTable,
  exposureFilter,
  MISSING_DAY,
} from "../../shared/core/index.ts";

describe("day numbers", () => {
  it.each([
    ["1970-01-01", 0],
    ["1969-12-31", -1],
    ["2000-02-29", 11016],
    ["2000-03-01", 11017],
    ["0000-01-01", -719528],
    ["9999-12-31", 2932896],
  ])("%s is %i", (day, number) => {
    expect(dayNumber(day)).toBe(number);
    expect(dayString(number)).toBe(day);
  });

  // The engine's own UTC calendar is the independent check.
  it("agrees with the engine's calendar on every day of 1890 to 2110", () => {
    let wrong = 0;
    const from = dayNumber("1890-01-01") ?? Number.NaN;
    const to = dayNumber("2110-12-31") ?? Number.NaN;
    // 221 years, 53 of them leap: every fourth but 1900 and 2100.
    expect(to - from).toBe(221 * 365 + 53 - 1);
    for (let number = from; number <= to; number++) {
      const day = new Date(number * 86_400_000).toISOString().slice(0, 10);
      if (dayString(number) !== day || dayNumber(day) !== number) wrong++;
    }
    expect(wrong).toBe(0);
  });

  it.each([
    "2025-02-29",
    "1900-02-29",
    "2025-04-31",
    "2025-00-10",
    "2025-13-01",
    "2025-01-00",
    "2025-01-32",
    "2025-01",
    "2025",
    "",
    "unknown",
    "2025-1-2",
    "2025-01-02T00:00",
    " 2025-01-02",
    "2025-01-02\n",
    "02025-01-02",
  ])("%j is no calendar day", (text) => {
    expect(dayNumber(text)).toBeNull();
  });

  it.each([0.5, Number.NaN, -719529, 2932897, MISSING_DAY])("%d has no day string", (number) => {
    expect(() => dayString(number)).toThrow(RangeError);
  });
});

describe("exposure filter", () => {
  const NONE = MISSING_DAY;
  const NEVER = Number.POSITIVE_INFINITY;
  // pair, first day, last day, recorded, withdrawn
  const ROWS: [number, number, number, number, number][] = [
    [0, 10, 12, 100, NEVER],
    [0, 20, 20, 200, NEVER],
    [1, 15, NONE, 100, NEVER],
    [2, NONE, 18, 100, 300],
    [3, NONE, NONE, 100, NEVER],
    [3, 30, 30, 400, Number.NaN],
    [4, 14, 11, 100, NEVER],
  ];
  const column = (at: 0 | 1 | 2) => Int32Array.from(ROWS, (row) => row[at]);
  const instants = (at: 3 | 4) => Float64Array.from(ROWS, (row) => row[at]);
  const table: ExposureTable = {
    pairA: Int32Array.of(0, 1, 2, 3, 4),
    pairB: Int32Array.of(5, 6, 7, 8, 9),
    pair: column(0),
    firstDay: column(1),
    lastDay: column(2),
    recordedAt: instants(3),
    withdrawnAt: instants(4),
  };
  const pairs = (from: number | null, to: number | null, asOf: number | null) =>
    Array.from(exposureFilter(table, { from, to, asOf }).pair);

  it("without a range counts all that is on record now, undated too", () => {
    const found = exposureFilter(table, { from: null, to: null, asOf: null });
    expect(Array.from(found.pair)).toEqual([0, 1, 3, 4]);
    expect([Array.from(found.a), Array.from(found.b)]).toEqual([
      [0, 1, 3, 4],
      [5, 6, 8, 9],
    ]);
    expect(found).toMatchObject({ exposures: 6, undated: 1 });
  });

  it("with a range leaves undated exposures out, and still reports them", () => {
    const found = exposureFilter(table, { from: 0, to: 25, asOf: null });
    expect(Array.from(found.pair)).toEqual([0, 1, 4]);
    expect(found).toMatchObject({ exposures: 4, undated: 1 });
  });

  it("counts an exposure that touches either end of the range", () => {
    expect(pairs(12, 13, null)).toEqual([0, 4]);
    expect(pairs(8, 10, null)).toEqual([0]);
    expect(pairs(13, 13, null)).toEqual([4]);
    expect(pairs(21, 29, null)).toEqual([]);
  });

  it("takes one known day for both", () => {
    expect(pairs(15, 15, null)).toEqual([1]);
    expect(pairs(16, 19, null)).toEqual([]);
    expect(pairs(18, 18, 250)).toEqual([2]);
  });

  it("takes a range open on one side", () => {
    expect(pairs(19, null, null)).toEqual([0, 3]);
    expect(pairs(null, 11, null)).toEqual([0, 4]);
  });

  it("shows the record as it stood at an instant, the instant included", () => {
    expect(pairs(null, null, 99)).toEqual([]);
    expect(pairs(null, null, 100)).toEqual([0, 1, 2, 3, 4]);
    expect(pairs(20, 20, 199)).toEqual([]);
    expect(pairs(20, 20, 200)).toEqual([0]);
    expect(pairs(18, 18, 299)).toEqual([2]);
    expect(pairs(18, 18, 300)).toEqual([]);
    expect(pairs(30, 30, 399)).toEqual([]);
    expect(pairs(30, 30, 400)).toEqual([3]);
  });

  it("refuses columns that do not fit and a range the wrong way round", () => {
    const range = { from: null, to: null, asOf: null };
    expect(() => exposureFilter(table, { from: 2, to: 1, asOf: null })).toThrow(RangeError);
    expect(() => exposureFilter({ ...table, firstDay: new Int32Array(2) }, range)).toThrow(
      RangeError,
    );
    expect(() => exposureFilter({ ...table, pairB: new Int32Array(2) }, range)).toThrow(RangeError);
    const pair = Int32Array.from(ROWS, () => 7);
    expect(() => exposureFilter({ ...table, pair }, range)).toThrow(RangeError);
  });
});
