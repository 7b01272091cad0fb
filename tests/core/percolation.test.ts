import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  degreeCounts,
  excessDegreeRatio,
  lambertGiantShare,
  meanExcessDegree,
  observedDegreeLaw,
  percolation,
  poissonDegreeLaw,
  removalThresholdDegrees,
  removalThresholdMixing,
  transmissibility,
} from "../../shared/core/index.ts";
import { graphOf, linksOf } from "./support/graphs.ts";
import { HAND_GRAPHS } from "./support/hand-graphs.ts";
import { karate } from "./support/published-networks.ts";

const club = karate();
const clubCounts = degreeCounts(graphOf(club.n, club.links));

describe("Molloy–Reed ratio and mean excess degree", () => {
  // Source: methods D.3, exact.
  it.each(HAND_GRAPHS)("$name", ({ n, links, sumOfSquares }) => {
    const counts = degreeCounts(graphOf(n, links));
    expect(excessDegreeRatio(counts).value).toBeCloseTo(sumOfSquares / (2 * links.length), 14);
    expect(meanExcessDegree(counts).value).toBeCloseTo(sumOfSquares / (2 * links.length) - 1, 14);
  });

  it("karate", () => {
    // Source: methods C.4.2 and C.8.4.
    expect(excessDegreeRatio(clubCounts).value).toBeCloseTo(7.769230769231, 12);
    expect(meanExcessDegree(clubCounts).value).toBeCloseTo(6.769230769231, 12);
  });

  it("a union of triangles has 2, no pair has none", () => {
    expect(excessDegreeRatio([0, 0, 9]).value).toBe(2);
    expect(excessDegreeRatio([4])).toEqual({ value: null, reason: "no_pairs" });
    expect(meanExcessDegree([])).toEqual({ value: null, reason: "no_pairs" });
    expect(() => excessDegreeRatio([0, -1])).toThrow(RangeError);
  });
});

describe("percolation with a chosen transmissibility", () => {
  // Source: methods C.4.2, computed with scipy 1.10.1.
  it.each([
    [4, 0.5, 2, 0.79681213002],
    [3, 0.5, 1.5, 0.582811643866],
    [2, 0.9, 1.8, 0.732429966637],
  ])("Poisson c %d, T %d", (c, T, reproduction, share) => {
    const answer = percolation(poissonDegreeLaw(c), T);
    expect(answer.reproduction).toBeCloseTo(reproduction, 14);
    expect(answer.share).toBeCloseTo(share, 11);
    expect(answer.meanOutbreak).toEqual({ value: null, reason: "not_below_threshold" });
    // For Poisson degrees S solves S = 1 − e^(−cTS).
    expect(answer.share).toBeCloseTo(lambertGiantShare(c * T), 13);
    expect(answer.critical.value).toBeCloseTo(1 / c, 14);
  });

  it("Poisson c 5, T 0.1: below", () => {
    // Source: methods C.4.2.
    expect(percolation(poissonDegreeLaw(5), 0.1)).toMatchObject({
      reproduction: 0.5,
      unreached: 1,
      share: 0,
      meanOutbreak: { value: 2, reason: null },
    });
  });

  // Source: methods C.4.2, computed with scipy 1.10.1.
  it.each([
    [0.05, 0.338461538462, 1, 0, 1.346785225718],
    [0.1, 0.676923076923, 1, 0, 2.420168067227],
    [0.2, 1.353846153846, 0.933814074381, 0.248212940519, null],
    [0.3, 2.030769230769, 0.818562245438, 0.519346562215, null],
    [0.5, 3.384615384615, 0.590158537551, 0.803011512081, null],
    [1, 6.769230769231, 0.007470257743, 0.999762157941, null],
  ])("karate degrees, T %d", (T, reproduction, unreached, share, outbreak) => {
    const answer = percolation(observedDegreeLaw(clubCounts), T);
    expect(answer.critical.value).toBeCloseTo(0.147727272727, 12);
    expect(answer.reproduction).toBeCloseTo(reproduction, 12);
    expect(answer.unreached).toBeCloseTo(unreached, 11);
    expect(answer.share).toBeCloseTo(share, 11);
    if (outbreak === null) expect(answer.meanOutbreak.reason).toBe("not_below_threshold");
    else expect(answer.meanOutbreak.value).toBeCloseTo(outbreak, 11);
  });

  it("takes the smallest root, as iterating from 0 does", () => {
    const degrees = fc.array(fc.integer({ min: 0, max: 30 }), { minLength: 2, maxLength: 12 });
    fc.assert(
      fc.property(degrees, fc.double({ min: 0, max: 1, noNaN: true }), (counts, T) => {
        fc.pre(counts.some((people) => people > 0));
        const law = observedDegreeLaw(counts);
        const { unreached, reproduction, share } = percolation(law, T);
        fc.pre(Math.abs(reproduction - 1) > 0.05);
        let u = 0;
        for (let step = 0; step < 3000; step++) u = 1 - T + T * law.reached(u);
        expect(unreached).toBeCloseTo(u, 9);
        expect(share).toBeCloseTo(1 - law.whole(u), 8);
      }),
      { seed: 42, numRuns: 150 },
    );
  });

  it("starts at the threshold without a step", () => {
    const law = poissonDegreeLaw(1);
    expect(percolation(law, 1)).toMatchObject({ share: 0, unreached: 1 });
    const just = percolation(poissonDegreeLaw(1.0001), 1);
    expect(just.share).toBeCloseTo(lambertGiantShare(1.0001), 8);
    // Everyone in a ring: R = 1 at T = 1, and no epidemic of a share of all.
    expect(percolation(observedDegreeLaw([0, 0, 9]), 1)).toMatchObject({ share: 0, unreached: 1 });
  });

  it("says why there is no critical value", () => {
    expect(percolation(observedDegreeLaw([5]), 0.4)).toMatchObject({
      critical: { reason: "no_pairs" },
      meanOutbreak: { value: 1 },
    });
    const pairs = percolation(observedDegreeLaw([0, 6]), 0.4);
    expect(pairs.critical.reason).toBe("no_further_pairs");
    expect(pairs.meanOutbreak.value).toBeCloseTo(1.4, 14);
    expect(() => percolation(poissonDegreeLaw(2), 1.2)).toThrow(RangeError);
    expect(() => poissonDegreeLaw(Number.NaN)).toThrow(RangeError);
    expect(() => observedDegreeLaw([])).toThrow(RangeError);
    expect(() => observedDegreeLaw([1, -2])).toThrow(RangeError);
  });

  it("T from rate and duration", () => {
    // Source: methods C.4.2, exact.
    expect(transmissibility(0.1, 5)).toBeCloseTo(0.393469340287, 12);
    expect([transmissibility(0, 9), transmissibility(3, 0)]).toEqual([0, 0]);
    expect(() => transmissibility(-1, 2)).toThrow(RangeError);
  });
});

describe("share removed at random that reaches the threshold", () => {
  it("mixing: what is left has mean degree 1", () => {
    // Source: methods C.10, φ* = 1 − 1/c.
    for (const c of [1.2, 2, 5])
      expect(c * (1 - (removalThresholdMixing(c).value ?? 0))).toBeCloseTo(1, 14);
    expect(removalThresholdMixing(1).reason).toBe("not_above_threshold");
  });

  it("recorded degrees: φ* = 1 − 1/(κ − 1), the same as for mixing when they are Poisson", () => {
    // Source: methods C.10; karate κ = 7.769230769231.
    expect(removalThresholdDegrees(clubCounts).value).toBeCloseTo(1 - 1 / 6.769230769231, 11);
    expect(removalThresholdDegrees(degreeCounts(graphOf(4, linksOf("01 12 23")))).reason).toBe(
      "not_above_threshold",
    );
    expect(removalThresholdDegrees([3]).reason).toBe("no_pairs");
  });
});
