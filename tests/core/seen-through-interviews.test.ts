import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { seenThroughInterviews, unresolvedShare } from "../../shared/core/index.ts";
import { endsOf, linksOf } from "./support/graphs.ts";

describe("what was seen through interviews", () => {
  it("counts by hand", () => {
    // 0, 1, 2 interviewed. 0↔1 told by both; 1→2 by one; 0→3, 1→3; 2→4; 5 named by nobody.
    const seen = seenThroughInterviews({
      n: 10,
      isInterviewed: Uint8Array.of(1, 1, 1, 0, 0, 0),
      // 3→5 comes from someone not interviewed and is left out; 0→1 stands twice.
      named: endsOf([
        [0, 1],
        [0, 1],
        [1, 0],
        [1, 2],
        [0, 3],
        [1, 3],
        [2, 4],
        [3, 5],
      ]),
      unresolvedHeads: 3,
    });
    expect(seen).toMatchObject({
      interviewed: 3,
      coverage: { value: 0.3 },
      withoutPair: { value: 0 },
      namedByBoth: 1,
      namedByOne: 1,
      doubleNamedShare: { value: 0.5 },
      recall: { value: 2 / 3 },
      named: 5,
      namedOnce: 4,
      namedTwice: 1,
      unresolved: { value: 3 / 8 },
    });
    expect(seen.pairsOfInterviewed).toMatchObject({ count: 3, median: { value: 2 } });
    expect(seen.pairsOfInterviewed.mean.value).toBeCloseTo(7 / 3, 14);
    expect(seen.namedPerInterview).toMatchObject({ mean: { value: 2 }, most: { value: 3 } });
  });

  it("agrees with sets on random records", () => {
    const person = fc.integer({ min: 0, max: 9 });
    const naming = fc.tuple(person, person).filter(([a, b]) => a !== b);
    fc.assert(
      fc.property(
        fc.array(naming, { maxLength: 60 }),
        fc.uint8Array({ min: 0, max: 1, minLength: 10, maxLength: 10 }),
        (namings, flags) => {
          const told = new Set(
            namings.filter(([a]) => flags[a] === 1).map(([a, b]) => `${a} ${b}`),
          );
          let both = 0;
          let one = 0;
          for (const text of told) {
            const [a, b] = text.split(" ");
            if (flags[Number(b)] !== 1) continue;
            if (!told.has(`${b} ${a}`)) one++;
            else if (Number(a) < Number(b)) both++;
          }
          const times = Array.from(
            { length: 10 },
            (_, who) => [...told].filter((text) => text.endsWith(` ${who}`)).length,
          );
          const seen = seenThroughInterviews({
            n: 10,
            isInterviewed: flags,
            named: endsOf(namings),
            unresolvedHeads: 0,
          });
          expect([seen.namedByBoth, seen.namedByOne]).toEqual([both, one]);
          expect([seen.named, seen.namedOnce, seen.namedTwice]).toEqual([
            times.filter((t) => t > 0).length,
            times.filter((t) => t === 1).length,
            times.filter((t) => t === 2).length,
          ]);
        },
      ),
      { seed: 20260301, numRuns: 200 },
    );
  });

  it("says why a share is undefined", () => {
    const nobody = { n: 0, isInterviewed: new Uint8Array(0), named: endsOf([]) };
    expect(seenThroughInterviews({ ...nobody, unresolvedHeads: 0 })).toMatchObject({
      coverage: { reason: "no_people" },
      withoutPair: { reason: "no_one_interviewed" },
      doubleNamedShare: { reason: "no_pairs" },
      recall: { reason: "no_double_reports" },
      unresolved: { reason: "no_group_or_contact" },
      pairsOfInterviewed: { mean: { reason: "no_values" } },
    });
    const record = { n: 2, isInterviewed: Uint8Array.of(1, 0), unresolvedHeads: 0 };
    expect(() => seenThroughInterviews({ ...record, named: endsOf(linksOf("02")) })).toThrow();
    expect(() => seenThroughInterviews({ ...record, n: 1, named: endsOf([]) })).toThrow(RangeError);
  });

  it("gives the unresolved share of the worked example", () => {
    // [X] methods B.T1, B20: one group exposure of 3 beside 10 distinct people.
    expect(unresolvedShare(3, 10).value).toBeCloseTo(0.230769, 6);
    expect(() => unresolvedShare(-1, 10)).toThrow(RangeError);
  });
});
