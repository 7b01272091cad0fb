import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { anonymiseRows, kAnonymity } from "../../shared/core/index.ts";

describe("k-anonymity", () => {
  const age = ["0–9", "0–9", "0–9", "10–19", "10–19", "10–19"];
  const area = [1, 1, 2, 1, 1, 1];

  it("is the size of the smallest class of rows that look alike", () => {
    expect(kAnonymity(6, [age])).toMatchObject({ k: { value: 3 }, classes: 2 });
    const both = kAnonymity(6, [age, area]);
    expect(both).toMatchObject({ k: { value: 1 }, classes: 3 });
    expect(Array.from(both.classSize)).toEqual([2, 2, 1, 3, 3, 3]);
    expect(kAnonymity(6, [])).toMatchObject({ k: { value: 6 }, classes: 1 });
  });

  it("tells when a class gives the outcome away", () => {
    const outcome = ["case", "case", "well", "well", "well", "well"];
    expect(kAnonymity(6, [age], outcome).diversity.value).toBe(1);
    expect(kAnonymity(6, [], outcome).diversity.value).toBe(2);
    expect(kAnonymity(6, [age]).diversity.reason).toBe("no_values");
  });

  it("is undefined for an empty table", () => {
    // [X] methods C.12.2.
    const none = { value: null, reason: "no_rows" };
    expect(kAnonymity(0, [[]])).toMatchObject({ k: none, classes: 0 });
    expect(kAnonymity(0, [], []).diversity).toEqual(none);
    expect(() => kAnonymity(2, [[1]])).toThrow(RangeError);
    expect(() => kAnonymity(2, [], [1])).toThrow(RangeError);
  });

  it("agrees with counting texts, and never rises with a column more", () => {
    const column = fc.array(fc.integer({ min: 0, max: 2 }), { minLength: 12, maxLength: 12 });
    fc.assert(
      fc.property(fc.array(column, { minLength: 1, maxLength: 4 }), (columns) => {
        const counts = new Map<string, number>();
        for (let row = 0; row < 12; row++) {
          const text = columns.map((one) => one[row]).join("|");
          counts.set(text, (counts.get(text) ?? 0) + 1);
        }
        const got = kAnonymity(12, columns);
        expect(got).toMatchObject({
          k: { value: Math.min(...counts.values()) },
          classes: counts.size,
        });
        const fewer = kAnonymity(12, columns.slice(1)).k.value ?? 0;
        expect(got.k.value).toBeLessThanOrEqual(fewer);
      }),
      { seed: 20260301, numRuns: 200 },
    );
  });
});

describe("anonymised rows", () => {
  const years = [1, 2, 3, 4, 5, 6, 7, 31, 32, 33, 34, 35];
  const ladder = [years, years.map((year) => Math.floor(year / 10)), years.map(() => "any")];

  it("generalises before it drops", () => {
    const got = anonymiseRows(12, [ladder], 5, 0);
    expect(got).toMatchObject({ levels: [1], dropped: 0 });
    expect(got.kept.every((flag) => flag === 1)).toBe(true);
    expect(anonymiseRows(12, [ladder], 6, 0)).toMatchObject({ levels: [2], dropped: 0 });
    expect(anonymiseRows(12, [ladder], 6, 5)).toMatchObject({ levels: [1], dropped: 5 });
  });

  it("drops what still stands out at the end of the ladders", () => {
    const got = anonymiseRows(4, [[["a", "a", "a", "b"]]], 2, 0);
    expect(got).toMatchObject({ levels: [0], dropped: 1 });
    expect(Array.from(got.kept)).toEqual([1, 1, 1, 0]);
    expect(anonymiseRows(0, [[[]]], 5, 0)).toMatchObject({ dropped: 0 });
  });

  it("leaves a table in which every class holds k rows", () => {
    const code = fc.array(fc.integer({ min: 0, max: 7 }), { minLength: 20, maxLength: 20 });
    fc.assert(
      fc.property(code, code, fc.integer({ min: 1, max: 6 }), (x, y, k) => {
        const coarse = (codes: number[]) => [
          codes,
          codes.map((c) => c >> 1),
          codes.map((c) => c >> 2),
        ];
        const ladders = [coarse(x), coarse(y)];
        const { levels, kept, dropped } = anonymiseRows(20, ladders, k, 3);
        const rows = Array.from(kept.keys()).filter((row) => kept[row] === 1);
        expect(rows.length).toBe(20 - dropped);
        const columns = ladders.map((one, at) =>
          rows.map((row) => one[levels[at] ?? 0]?.[row] ?? -1),
        );
        const after = kAnonymity(rows.length, columns);
        if (rows.length > 0) expect(after.k.value).toBeGreaterThanOrEqual(k);
        if (dropped > 3) expect(levels).toEqual([2, 2]);
      }),
      { seed: 20260301, numRuns: 200 },
    );
  });

  it("refuses settings that make no sense", () => {
    expect(() => anonymiseRows(1, [[[1]]], 0, 0)).toThrow(RangeError);
    expect(() => anonymiseRows(1, [[]], 2, 0)).toThrow(RangeError);
  });
});
