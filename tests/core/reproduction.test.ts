import { describe, expect, it } from "vitest";
import {
  caseR,
  caseRByCase,
  infectiousness,
  instantaneousR,
  meanOfWeights,
  reproductionFromGrowth,
  serialIntervalWeights,
} from "../../shared/core/index.ts";

const SERIES = [1, 2, 3, 5, 8, 10, 12, 11, 9, 7];
const WEIGHTS = [0, 0.2, 0.5, 0.2, 0.1];
const cori = (changes: Partial<Parameters<typeof instantaneousR>[0]> = {}) =>
  instantaneousR({ local: SERIES, imported: null, weights: WEIGHTS, windowDays: 3, ...changes });

describe("serial interval by days", () => {
  it("gives the published weights", () => {
    // [L] methods C.9.5: mean 2.6, deviation 1.5.
    const published = [
      0, 0.233172125408, 0.358579400316, 0.19811082854, 0.103342655428, 0.052905175248,
      0.026821461952,
    ];
    const weights = serialIntervalWeights(2.6, 1.5, 6);
    expect(weights.length).toBe(7);
    published.forEach((weight, k) => {
      expect(weights[k]).toBeCloseTo(weight, 11);
    });
  });

  it.each([
    [2.6, 1.5],
    [4.7, 2.9],
    [15.3, 9.3],
    [1.2, 0.1],
    [8, 0.5],
  ])("sums to 1 with mean %d", (mean, deviation) => {
    const weights = serialIntervalWeights(mean, deviation);
    const total = weights.reduce((sum, weight) => sum + weight);
    expect(Math.abs(total - 1)).toBeLessThan(2e-6);
    // The day of onset is spread evenly over its day, which leaves the mean as it is.
    expect(Math.abs(meanOfWeights(weights) - mean)).toBeLessThan(1e-3);
    expect(weights.every((weight) => weight >= 0)).toBe(true);
  });

  it("refuses laws that are none", () => {
    expect(() => serialIntervalWeights(1, 1)).toThrow(RangeError);
    expect(() => serialIntervalWeights(3, 0)).toThrow(RangeError);
    expect(() => serialIntervalWeights(3, 1, 0)).toThrow(RangeError);
    expect(() => meanOfWeights([0, 0])).toThrow(RangeError);
  });
});

describe("instantaneous R", () => {
  it("has the pressure of earlier cases", () => {
    // [X] methods C.9.5.
    const expected = [0, 0.2, 0.9, 1.8, 3, 4.9, 7.3, 9.5, 11, 10.7];
    const got = infectiousness(SERIES, WEIGHTS);
    expected.forEach((value, t) => {
      expect(got[t]).toBeCloseTo(value, 13);
    });
  });

  it.each([
    // [L] methods C.9.5, scipy; the last row also R's qgamma.
    [
      3, 11, 0.322580645161, 3.548387096774, 1.069878964631, 1.771342053947, 3.441458839947,
      5.93237291678, 0.999617, 6,
    ],
    [
      5, 24, 0.10101010101, 2.424242424242, 0.494846412683, 1.55325786411, 2.390656795477,
      3.485989181296, 0.999896, 6,
    ],
    [
      7, 34, 0.045662100457, 1.552511415525, 0.26625351118, 1.075159286967, 1.537317529394,
      2.116176678958, 0.990116455937, 11,
    ],
    [
      8, 33, 0.035714285714, 1.178571428571, 0.205162951662, 0.811274341883, 1.16668828158,
      1.613373288551, 0.80506714767, 11,
    ],
    [
      9, 28, 0.031847133758, 0.891719745223, 0.168519191788, 0.592541294773, 0.881126794904,
      1.251069504623, 0.248041159841, 11,
    ],
  ])("day %i", (day, shape, scale, mean, sd, low, median, high, above, digits) => {
    const got = cori().find((window) => window.day === day);
    expect(got?.shape).toBe(shape);
    expect(got?.scale).toBeCloseTo(scale, 11);
    expect(got?.mean).toBeCloseTo(mean, 11);
    expect(got?.standardDeviation).toBeCloseTo(sd, 11);
    expect(got?.interval[0]).toBeCloseTo(low, 11);
    expect(got?.median).toBeCloseTo(median, 11);
    expect(got?.interval[1]).toBeCloseTo(high, 11);
    expect(got?.probabilityAboveOne).toBeCloseTo(above, digits);
  });

  it("hides windows that are too early or hold fewer than 11 cases", () => {
    // [X] methods C.9.5: 1/√(1 + ΣI) <= 0.3 if and only if ΣI >= 11; day 3 has 10.
    const got = cori();
    expect(got.map(({ day, hidden }) => [day, hidden]).slice(0, 3)).toEqual([
      [2, "too_early"],
      [3, "too_few_cases"],
      [4, null],
    ]);
    const eleven = cori({ local: [1, 2, 3, 6] });
    expect(eleven.at(-1)).toMatchObject({ day: 3, cases: 11, hidden: null });
    // A flat prior of shape 4 needs fewer: 1/√(4 + 8) < 0.3.
    const firm = cori({ local: [1, 2, 3, 3], prior: { shape: 4, scale: 1 } });
    expect(firm.at(-1)).toMatchObject({ cases: 8, hidden: null });
  });

  it("waits for a mean serial interval after the first case", () => {
    const weights = [0, 0, 0, 0, 0, 1];
    const local = [0, 20, 20, 20, 20, 20, 20, 20];
    const shown = cori({ local, weights }).filter((window) => window.hidden === null);
    expect(shown.map((window) => window.day)).toEqual([6, 7]);
  });

  it("leaves out days on which nobody could infect", () => {
    const got = cori({ local: [4, 0, 0, 0, 0, 0, 0, 9, 0, 0] });
    // Day 7 has 9 cases and no infector: they do not enter ΣI, of day 9 either.
    expect(got.find((window) => window.day === 7)).toMatchObject({
      cases: 0,
      infectiousness: 0,
      hidden: "no_infectiousness",
      mean: 5,
      standardDeviation: 5,
    });
    expect(got.find((window) => window.day === 9)).toMatchObject({ cases: 0 });
    expect(got.find((window) => window.day === 9)?.infectiousness).toBeCloseTo(9 * 0.7, 12);
  });

  it("lets imported cases infect without being explained", () => {
    const imported = [5, 0, 0, 0, 0, 0, 0, 0, 0, 0];
    const got = cori({ imported }).find((window) => window.day === 3);
    expect(got?.cases).toBe(10);
    // Λ grows by 5·(0.2 + 0.5 + 0.2) over days 1–3.
    expect(got?.infectiousness).toBeCloseTo(2.9 + 4.5, 12);
  });

  it("has no window in a short or empty series", () => {
    expect(cori({ local: [1, 2] })).toEqual([]);
    expect(cori({ local: [] })).toEqual([]);
    expect(cori({ local: [0, 0, 0] })[0]?.hidden).toBe("no_infectiousness");
  });

  it.each([
    { windowDays: 0 },
    { prior: { shape: 0, scale: 5 } },
    { weights: [0.1, 0.9] },
    { weights: [0, 0.9, 0.9] },
    { weights: [0, 0] },
    { local: [1.5, 2, 3] },
    { imported: [1] },
  ])("refuses %o", (changes) => {
    expect(() => cori(changes)).toThrow(RangeError);
  });
});

describe("case R", () => {
  it("gives the worked series", () => {
    // [L] methods C.9.5.
    const expected = [
      4.488888888889, 2.792970521542, 2.461435715839, 1.998298093571, 1.543478202712,
      1.136771416093, 0.771510977955, 0.490739167375, 0.130841121495, 0,
    ];
    const got = caseR(SERIES, null, WEIGHTS);
    expected.forEach((value, day) => {
      expect(got.r[day]).toBeCloseTo(value, 11);
    });
  });

  it("gives the worked line list", () => {
    // [X] methods C.9.5.
    const expected = [1.5, 0.985714285714, 1.114285714286, 0.4, 0];
    const shifted = caseRByCase([100, 102, 103, 105, 106], WEIGHTS);
    expected.forEach((value, k) => {
      expect(shifted[k]).toBeCloseTo(value, 11);
    });
    // In any order, and alike for cases of one day.
    const twice = caseRByCase([106, 100, 100], WEIGHTS);
    expect(twice[1]).toBe(twice[2]);
    expect(caseRByCase([], WEIGHTS).length).toBe(0);
    expect(() => caseRByCase([1.5], WEIGHTS)).toThrow(RangeError);
    expect(() => caseRByCase([0, 40000], WEIGHTS)).toThrow(RangeError);
  });

  it("gives every case with a possible infector exactly one", () => {
    const { r, withoutInfector } = caseR(SERIES, null, WEIGHTS);
    const given = r.reduce((sum, value, day) => sum + value * (SERIES[day] ?? 0), 0);
    expect(given).toBeCloseTo(68 - 1, 11);
    expect(withoutInfector).toBe(1);
    // Cases that appear when nobody can infect get none.
    expect(caseR([1, 0, 0, 0, 0, 0, 3], null, WEIGHTS).withoutInfector).toBe(4);
  });

  it("says from which day on offspring are still to come", () => {
    const { seen, incompleteFrom } = caseR(SERIES, null, WEIGHTS);
    expect(Array.from(seen.slice(5))).toEqual(
      [1, 0.9, 0.7, 0.2, 0].map((x) => expect.closeTo(x, 12)),
    );
    expect(incompleteFrom).toBe(6);
    expect(caseR([], null, WEIGHTS)).toMatchObject({ incompleteFrom: 0, withoutInfector: 0 });
  });

  it("shares infections with imported cases", () => {
    // Day 1: one local case, two who may have infected it.
    expect(caseR([1, 1], [1, 0], WEIGHTS).r[0]).toBeCloseTo(0.5, 14);
  });
});

describe("R from growth", () => {
  it("gives the worked value", () => {
    // [L] methods C.9.6.
    expect(reproductionFromGrowth(0.4, WEIGHTS)).toBeCloseTo(2.27709004556, 10);
    expect(reproductionFromGrowth(0, WEIGHTS)).toBeCloseTo(1, 14);
    expect(reproductionFromGrowth(-0.2, WEIGHTS)).toBeLessThan(1);
    expect(() => reproductionFromGrowth(Number.NaN, WEIGHTS)).toThrow(RangeError);
  });

  it("is the R at which cases grow so fast", () => {
    // [X] a series that grows by e^r a day has I_t = R Λ_t.
    const r = 0.25;
    const R = reproductionFromGrowth(r, WEIGHTS);
    const grown = Array.from({ length: 12 }, (_, t) => Math.exp(r * t));
    expect((grown[11] ?? 0) / (infectiousness(grown, WEIGHTS)[11] ?? 1)).toBeCloseTo(R, 12);
  });
});
