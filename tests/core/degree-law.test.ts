import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  binomialDegrees,
  chiSquaredUpper,
  degreeCounts,
  degreeFit,
  degreeVariance,
  dispersion,
  poissonDegrees,
  poissonError,
} from "../../shared/core/index.ts";
import { graphOf, type Links, linksOf, randomLinks } from "./support/graphs.ts";
import { karate } from "./support/published-networks.ts";

const club = karate();
const clubGraph = graphOf(club.n, club.links);

// Every graph on five people: bit k of the mask is pair k.
const PAIRS = linksOf("01 02 03 04 12 13 14 23 24 34");
const graphsOnFive = (m: number): Links[] =>
  Array.from({ length: 1024 }, (_, mask) => PAIRS.filter((_pair, k) => (mask >> k) & 1)).filter(
    (links) => links.length === m,
  );

describe("degree law against its Poisson limit", () => {
  // Source: methods C.1.2, computed with scipy 1.10.1.
  it.each([
    [10, 1, 0.032797352936, 0.111111111111, 0.070235617648, 0.346439416115, 0.367879441171],
    [34, 156 / 34, 0.035862568267, 0.637936458006, 0.137623312481, 0.007152879245, 0.010170791001],
    [100, 2, 0.004619058745, 0.040404040404, 0.017467974076, 0.132592032271, 0.135335283237],
    [1000, 2, 0.000452172781, 0.004004004004, 0.001731060494, 0.135064251324, 0.135335283237],
  ])("n %i, c %d", (n, c, distance, leCam, barbourHall, binomialZero, poissonZero) => {
    const p = c / (n - 1);
    const error = poissonError(n, p);
    expect(error.totalVariation).toBeCloseTo(distance, 12);
    expect(error.leCam).toBeCloseTo(leCam, 12);
    expect(error.barbourHall).toBeCloseTo(barbourHall, 12);
    expect(binomialDegrees(n, p, 0)[0]).toBeCloseTo(binomialZero, 12);
    expect(poissonDegrees(c, 0)[0]).toBeCloseTo(poissonZero, 12);
  });

  it("is the plain sum over all k, and stays under both bounds", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 60 }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (n, p) => {
          const far = 400;
          const binomial = binomialDegrees(n, p, far);
          const poisson = poissonDegrees((n - 1) * p, far);
          const plain =
            binomial.reduce((sum, share, k) => sum + Math.abs(share - (poisson[k] ?? 0)), 0) / 2;
          const error = poissonError(n, p);
          expect(error.totalVariation).toBeCloseTo(plain, 13);
          expect(error.totalVariation).toBeLessThanOrEqual(error.barbourHall + 1e-14);
          expect(error.barbourHall).toBeLessThanOrEqual(error.leCam + 1e-14);
        },
      ),
      { seed: 12, numRuns: 200 },
    );
  });

  it("does not grow with n, and the laws add up to 1", () => {
    expect(poissonError(1_000_000, 2e-6).totalVariation).toBeGreaterThan(0);
    expect(binomialDegrees(40, 0.3, 39).reduce((a, b) => a + b)).toBeCloseTo(1, 13);
    expect(binomialDegrees(3, 0.3, 9).slice(3)).toEqual(new Float64Array(7));
    expect(() => poissonError(0, 0.1)).toThrow(RangeError);
    expect(() => binomialDegrees(5, 1.2, 3)).toThrow(RangeError);
    expect(() => poissonDegrees(-1, 3)).toThrow(RangeError);
  });
});

describe("variance of one degree with n and m fixed", () => {
  it("karate", () => {
    // Source: methods C.1.2, computed with scipy 1.10.1 (hypergeom.var).
    expect(degreeVariance(34, 78).value).toBeCloseTo(3.724567474048, 12);
  });

  it("is what all graphs on five people have", () => {
    for (let m = 0; m <= 10; m++) {
      const graphs = graphsOnFive(m);
      const mean = (2 * m) / 5;
      const squares = graphs.map(
        (links) => (links.filter((link) => link.includes(0)).length - mean) ** 2,
      );
      const exact = squares.reduce((a, b) => a + b, 0) / graphs.length;
      expect(degreeVariance(5, m).value).toBeCloseTo(exact, 13);
    }
  });

  it("knows nobody, one, two, and refuses what cannot be", () => {
    expect(degreeVariance(0, 0)).toEqual({ value: null, reason: "no_people" });
    expect([degreeVariance(1, 0).value, degreeVariance(2, 1).value]).toEqual([0, 0]);
    expect(() => degreeVariance(3, 4)).toThrow(RangeError);
  });
});

describe("index of dispersion", () => {
  it("karate", () => {
    // Source: methods C.1.3; tails computed with scipy 1.10.1, printed there with 5 digits.
    const club = dispersion(clubGraph);
    expect(club.index.value).toBeCloseTo(108.1538461538, 9);
    expect(club.corrected.value).toBeCloseTo(125.6196846632, 9);
    expect(club.expected.value).toBeCloseTo(32.0571428571, 9);
    expect(club.varianceToMean.value).toBeCloseTo(3.2773892774, 9);
    expect((club.guide.value ?? 0) / 6.3633e-10).toBeCloseTo(1, 4);
    expect((club.correctedGuide.value ?? 0) / 9.9203e-13).toBeCloseTo(1, 4);
  });

  it("the expectation of D′ is exact over all graphs on five people", () => {
    for (let m = 1; m <= 9; m++) {
      const values = graphsOnFive(m).map((links) => dispersion(graphOf(5, links)));
      const mean =
        values.reduce((sum, { corrected }) => sum + (corrected.value ?? Number.NaN), 0) /
        values.length;
      expect(mean).toBeCloseTo(20 / 6, 12);
      expect(values[0]?.expected.value).toBeCloseTo(20 / 6, 12);
    }
  });

  it("is undefined where there is nothing to compare", () => {
    const why = (n: number, links: Links) => dispersion(graphOf(n, links)).corrected.reason;
    expect([why(0, []), why(1, []), why(4, [])]).toEqual(["no_people", "one_person", "no_pairs"]);
    const complete = dispersion(graphOf(4, linksOf("01 02 03 12 13 23")));
    expect(complete.index).toEqual({ value: 0, reason: null });
    expect(complete.corrected).toEqual({ value: null, reason: "all_pairs" });
    expect(complete.expected.reason).toBe("all_pairs");
  });
});

describe("goodness of fit to the binomial law", () => {
  it("karate", () => {
    // Source: methods C.1.4, computed with scipy 1.10.1.
    const fit = degreeFit(degreeCounts(clubGraph));
    const near = (value: number) => expect.closeTo(value, 8);
    expect(fit.bins).toEqual([
      { from: 0, to: 3, expected: near(10.476301974), observed: 18 },
      { from: 4, to: 4, expected: near(6.76838919), observed: 6 },
      { from: 5, to: 5, expected: near(6.339584409), observed: 3 },
      { from: 6, to: 33, expected: near(10.415724427), observed: 7 },
    ]);
    expect(fit.statistic.value).toBeCloseTo(8.369863609279, 11);
    expect(fit.degreesOfFreedom).toBe(2);
    expect(fit.pValue.value).toBeCloseTo(0.015223244061, 11);
    expect(fit.pValueUpper.value).toBeCloseTo(0.039, 4);
    expect(fit.pValueUpper.value).toBeCloseTo(chiSquaredUpper(8.369863609279, 3), 11);
  });

  it("pools everybody, each bin holding five or more, whatever the network", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 5, max: 90 }),
        fc.double({ min: 0.02, max: 0.9, noNaN: true }),
        fc.nat(),
        (n, p, seed) => {
          const fit = degreeFit(degreeCounts(graphOf(n, randomLinks(n, p, seed))));
          if (fit.bins.length === 0) return;
          const total = (key: "expected" | "observed") =>
            fit.bins.reduce((sum, bin) => sum + bin[key], 0);
          expect(total("observed")).toBe(n);
          expect(total("expected")).toBeCloseTo(n, 9);
          expect([fit.bins[0]?.from, fit.bins.at(-1)?.to]).toEqual([0, n - 1]);
          fit.bins.forEach((bin, k) => {
            expect(bin.expected).toBeGreaterThanOrEqual(5 - 1e-9);
            if (k > 0) expect(bin.from).toBe((fit.bins[k - 1]?.to ?? 0) + 1);
          });
          expect(fit.degreesOfFreedom).toBe(fit.bins.length >= 3 ? fit.bins.length - 2 : null);
        },
      ),
      { seed: 14, numRuns: 150 },
    );
  });

  it("says why there is no test", () => {
    expect(degreeFit([]).pValue.reason).toBe("no_people");
    expect(degreeFit([1]).pValue.reason).toBe("one_person");
    expect(degreeFit([7]).pValue.reason).toBe("no_pairs");
    expect(degreeFit([0, 0, 3]).pValue.reason).toBe("all_pairs");
    const few = degreeFit([0, 2, 2]);
    expect([few.pValue.reason, few.bins.length]).toEqual(["too_few_people", 1]);
    expect(() => degreeFit([1, -1])).toThrow(RangeError);
    expect(() => degreeFit([1, 1])).toThrow(RangeError);
    expect(() => degreeFit([0, 0, 0, 2])).toThrow(RangeError);
  });
});
