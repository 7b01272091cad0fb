import { describe, expect, it } from "vitest";
import {
  createStream,
  extinctionProbability,
  modelTopShare,
  negativeBinomialPmf,
  noOffspringProbability,
  observedTopShare,
  offspringFit,
} from "../../shared/core/index.ts";

const TWENTY = [12, 4, 2, 0, 0, 1, 0, 0, 0, 1];

/** Laxminarayan et al. 2020, Science 370:691, Fig. 2A; counts as openly re-published. */
const TWO_STATES: Record<number, number> = {
  0: 62044,
  1: 17366,
  2: 4776,
  3: 1653,
  4: 759,
  5: 416,
  6: 253,
  7: 139,
  8: 65,
  9: 41,
  10: 28,
  11: 21,
  12: 14,
  13: 16,
  14: 3,
  15: 3,
  16: 4,
  17: 4,
  18: 1,
  19: 1,
  21: 2,
  22: 1,
  23: 1,
  25: 1,
  28: 1,
  31: 1,
  37: 1,
  39: 1,
};
const frequencies = Array.from({ length: 40 }, (_, z) => TWO_STATES[z] ?? 0);

describe("offspring distribution", () => {
  it("fits twenty cases", () => {
    // [L] methods C.9.4 (MASS and scipy).
    const got = offspringFit(TWENTY);
    expect(got).toMatchObject({ cases: 20, offspring: 22, mean: { value: 1.1 } });
    expect(got.dispersion.value).toBeCloseTo(0.346070618944, 11);
    expect(got.standardError).toBeCloseTo(0.196933, 6);
    // [L] scipy 1.17.1. The sheet's 0.19688 "from expected information" is what MASS prints: the
    // observed information one Newton step before k has settled.
    expect(got.expectedStandardError).toBeCloseTo(0.2015499073241, 11);
    expect(got.logLikelihood).toBeCloseTo(-27.4912332664, 9);
    expect(got.interval?.[0]).toBeCloseTo(0.1130132574, 9);
    expect(got.interval?.[1]).toBeCloseTo(1.1306623217, 9);
    expect(got.poissonLogLikelihood).toBeCloseTo(-38.8787896283, 9);
    expect(got.likelihoodRatio).toBeCloseTo(22.7751127238, 9);
    expect(got.momentDispersion.value).toBeCloseTo(0.3153635117, 9);
    // 18 of 22 from the top 4 of 20; t20 of the fitted law; chance to die out.
    expect(observedTopShare(TWENTY).value).toBeCloseTo(18 / 22, 14);
    const k = got.dispersion.value ?? Number.NaN;
    expect(modelTopShare(k)).toBeCloseTo(0.726784660869, 11);
    expect(extinctionProbability(1.1, k)).toBeCloseTo(0.952528256503, 10);
  });

  it("fits the published outbreak", () => {
    const got = offspringFit(frequencies);
    // [L] methods C.9.4.
    expect(got).toMatchObject({ cases: 87616, offspring: 41763 });
    expect(got.mean.value).toBeCloseTo(0.4766595142, 10);
    expect(got.dispersion.value).toBeCloseTo(0.5151169, 7);
    expect(62044 / got.cases).toBeCloseTo(0.708136, 6);
    // [P] the paper prints k 0.51 and 70.7 % without offspring; its file gives these.
    expect(Math.abs((got.dispersion.value ?? 0) - 0.51)).toBeLessThan(0.01);
  });

  it("maximises the likelihood it reports", () => {
    const likelihood = (k: number) =>
      TWENTY.reduce((sum, count, z) => {
        return count === 0 ? sum : sum + count * Math.log(negativeBinomialPmf(z, 1.1, k));
      }, 0);
    const got = offspringFit(TWENTY);
    const k = got.dispersion.value ?? Number.NaN;
    expect(likelihood(k)).toBeCloseTo(got.logLikelihood ?? 0, 11);
    for (const factor of [0.9, 0.99, 1.01, 1.1]) {
      expect(likelihood(k * factor)).toBeLessThan(likelihood(k));
    }
    // At both limits it has fallen by half the 95 % point of χ² with one degree of freedom.
    for (const limit of got.interval ?? []) {
      expect(likelihood(k) - likelihood(limit)).toBeCloseTo(3.841458820694124 / 2, 9);
    }
  });

  it("says when there is no over-dispersion to be seen", () => {
    // [X] methods C.9.4: {0, 0, 2, 1}, Σ(z − mean)² = 2.75 <= Σz = 3.
    const got = offspringFit([2, 1, 1]);
    expect(got.dispersion).toEqual({ value: null, reason: "no_overdispersion" });
    expect(got.interval?.[1]).toBe(Number.POSITIVE_INFINITY);
    expect(got.interval?.[0]).toBeGreaterThan(0);
    expect(got.likelihoodRatio).toBe(0);
    expect(got.logLikelihood).toBe(got.poissonLogLikelihood);
    // [X] {0, 2}: Σ(z − mean)² = Σz = 2, yet s² = 2 > 1, so moments give k = 1 and likelihood none.
    const edge = offspringFit([1, 0, 1]);
    expect(edge.momentDispersion.value).toBe(1);
    expect(edge.dispersion.reason).toBe("no_overdispersion");
  });

  it("has an open upper limit where the Poisson law is not ruled out", () => {
    const got = offspringFit([6, 2, 1, 1]);
    expect(got.dispersion.value).toBeGreaterThan(0.5);
    expect(got.interval?.[1]).toBe(Number.POSITIVE_INFINITY);
  });

  it("is undefined without cases or offspring", () => {
    expect(offspringFit([])).toMatchObject({
      mean: { reason: "no_cases" },
      dispersion: { reason: "no_cases" },
      interval: null,
    });
    // [X] methods C.9.4: all zeros → k null.
    expect(offspringFit([7])).toMatchObject({
      mean: { value: 0 },
      dispersion: { value: null, reason: "no_offspring" },
      interval: null,
    });
    expect(offspringFit([0, 1])).toMatchObject({ dispersion: { reason: "no_overdispersion" } });
    expect(() => offspringFit([1.5])).toThrow(RangeError);
    expect(() => offspringFit([-1, 2])).toThrow(RangeError);
  });

  it("does not mind zeros at the end of the table", () => {
    expect(offspringFit([...TWENTY, 0, 0])).toEqual(offspringFit(TWENTY));
  });
});

describe("extinction", () => {
  it.each([
    // [P] R and k of SARS in Singapore 2003 (Lloyd-Smith et al. 2005); [L] the rest: methods C.9.4.
    [1.63, 0.16, 0.8801294942, 0.6795207332, 0.8825192056],
    [2.5, 0.1, 0.8606853922, 0.7219425934, 0.9510231053],
    [2.5, 0.5, 0.5582575695, 0.4082482905, 0.6498203241],
    [2.5, 1, 0.4, 0.2857142857, 0.5218875825],
  ])("R %d, k %d", (mean, k, q, nobody, top) => {
    expect(extinctionProbability(mean, k)).toBeCloseTo(q, 9);
    expect(noOffspringProbability(mean, k)).toBeCloseTo(nobody, 9);
    expect(modelTopShare(k)).toBeCloseTo(top, 9);
  });

  it.each([
    [1.5, 0.4171883561],
    [2.5, 0.1073552464],
    [3, 0.0595202093],
  ])("R %d with everyone alike", (mean, q) => {
    // [L] methods C.9.4, Poisson.
    expect(extinctionProbability(mean, Number.POSITIVE_INFINITY)).toBeCloseTo(q, 9);
    expect(extinctionProbability(mean, 1e9)).toBeCloseTo(q, 7);
    expect(noOffspringProbability(mean, Number.POSITIVE_INFINITY)).toBe(Math.exp(-mean));
  });

  it("is exact for a geometric law, certain up to R = 1, and close just above", () => {
    // [X] methods C.9.4: k = 1 gives q = 1/R.
    expect(extinctionProbability(3, 1)).toBeCloseTo(1 / 3, 14);
    for (const mean of [0, 0.5, 1]) expect(extinctionProbability(mean, 0.2)).toBe(1);
    for (const mean of [1.0001, 1.01, 7, 60]) {
      expect(extinctionProbability(mean, 1)).toBeCloseTo(1 / mean, 11);
    }
    expect(() => extinctionProbability(-1, 1)).toThrow(RangeError);
    expect(() => extinctionProbability(1, 0)).toThrow(RangeError);
  });

  it("agrees with letting chains run", () => {
    // [S] own simulation: R 2.5, k 1, dies out with chance 0.4; 4 standard errors of 4000 chains.
    const stream = createStream(11, 0);
    let died = 0;
    for (let chain = 0; chain < 4000; chain++) {
      let alive = 1;
      while (alive > 0 && alive < 200) {
        let next = 0;
        // A geometric number of offspring for each case.
        for (let k = 0; k < alive; k++) while (stream.next() < 2.5 / 3.5) next++;
        alive = next;
      }
      if (alive === 0) died++;
    }
    expect(Math.abs(died / 4000 - 0.4)).toBeLessThan(4 * Math.sqrt(0.24 / 4000));
  });
});

describe("top share", () => {
  it("takes the last case in part, and is the share itself when all are alike", () => {
    // [X] 6 cases with 1 offspring each: the top 20 % are 1.2 cases.
    expect(observedTopShare([0, 6]).value).toBeCloseTo(0.2, 14);
    expect(observedTopShare([5, 0, 0, 1]).value).toBe(1);
    expect(modelTopShare(Number.POSITIVE_INFINITY)).toBe(0.2);
    expect(modelTopShare(1e8)).toBeCloseTo(0.2, 3);
    expect(modelTopShare(1e-4)).toBeCloseTo(1, 12);
    // [X] k = 1: x = ln 5, share (1 + ln 5)/5.
    expect(modelTopShare(1)).toBeCloseTo((1 + Math.log(5)) / 5, 13);
  });

  it("says why it is undefined", () => {
    expect(observedTopShare([])).toEqual({ value: null, reason: "no_cases" });
    expect(observedTopShare([4])).toEqual({ value: null, reason: "no_offspring" });
    expect(() => observedTopShare([4], 1)).toThrow(RangeError);
    expect(() => modelTopShare(0)).toThrow(RangeError);
  });
});
