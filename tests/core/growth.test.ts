import { describe, expect, it } from "vitest";
import {
  curveBinDays,
  doublingTime,
  epidemicCurve,
  logLinearGrowth,
  MISSING_DAY,
  poissonGrowth,
} from "../../shared/core/index.ts";

const RISE = [1, 2, 3, 5, 8, 10, 12];

describe("growth by Poisson regression", () => {
  it("gives the worked series", () => {
    const got = poissonGrowth(RISE);
    // [L] mpmath, 30 digits. R's glm (methods C.9.6: 0.09089915686, limits 0.18599044003 and
    // 0.54230858740) stops before the weights behind its standard error have settled.
    expect(got.rate.value).toBeCloseTo(0.36414951371, 11);
    expect(got.standardError).toBeCloseTo(0.090899157044781, 13);
    expect(got.standardError).toBeCloseTo(0.09089915686, 8);
    expect(got.interval?.[0]).toBeCloseTo(0.185990439679532, 13);
    expect(got.interval?.[1]).toBeCloseTo(0.542308587745176, 13);
    expect(got.doubling).toMatchObject({ kind: "doubling", determined: true });
    expect(got.doubling?.days).toBeCloseTo(1.90346864257, 10);
    expect(got.doubling?.interval?.[0]).toBeCloseTo(1.278141626784725, 12);
    expect(got.doubling?.interval?.[1]).toBeCloseTo(3.726789300322436, 12);
    expect(got.doubling?.interval?.[1]).toBeCloseTo(3.72678929335, 7);
    expect(got.widened).toBe(false);
  });

  it("does not determine a halving time whose interval is unbounded", () => {
    // [L] mpmath, 30 digits, and to what R's glm had settled: methods C.9.6.
    const got = poissonGrowth([6, 5, 4, 3, 3, 1]);
    expect(got.rate.value).toBeCloseTo(-0.25954496107, 10);
    expect(got.standardError).toBeCloseTo(0.132593360301941, 13);
    expect(got.standardError).toBeCloseTo(0.13259334372, 7);
    expect(got.interval?.[0]).toBeCloseTo(-0.519423171855108, 13);
    expect(got.interval?.[1]).toBeCloseTo(0.000333249706789, 13);
    expect(got.interval?.[1]).toBeCloseTo(0.00033321722, 7);
    expect(got.doubling).toMatchObject({ kind: "halving", determined: false, interval: null });
    expect(got.doubling?.days).toBeCloseTo(2.6706246875, 9);
  });

  it("meets the two equations of the greatest likelihood", () => {
    const counts = [0, 3, 0, 7, 2, 0, 19, 44, 13];
    const r = poissonGrowth(counts).rate.value ?? 0;
    const total = counts.reduce((a, b) => a + b);
    const weights = counts.map((_, t) => Math.exp(r * t));
    const scale = total / weights.reduce((a, b) => a + b);
    const miss = counts.reduce((sum, x, t) => sum + t * (x - scale * (weights[t] ?? 0)), 0);
    expect(Math.abs(miss)).toBeLessThan(1e-10 * total);
  });

  it("widens the error when counts scatter more than chance", () => {
    const scattered = poissonGrowth([0, 30, 2, 40, 1, 60, 3]);
    expect(scattered.widened).toBe(true);
    expect(scattered.dispersion).toBeGreaterThan(10);
    expect(scattered.doubling?.determined).toBe(false);
    const steady = poissonGrowth([10, 10, 10, 10]);
    expect(steady.rate.value).toBeCloseTo(0, 14);
    expect(steady).toMatchObject({ widened: false, doubling: { determined: false } });
  });

  it("turns with the series", () => {
    const back = poissonGrowth([...RISE].reverse());
    expect(back.rate.value).toBeCloseTo(-0.36414951371, 10);
    expect(back.doubling).toMatchObject({ kind: "halving", determined: true });
    expect(back.doubling?.interval?.[0]).toBeCloseTo(1.278141626784725, 12);
    expect(back.doubling?.interval?.[1]).toBeCloseTo(3.726789300322436, 12);
  });

  it("says why there is no rate", () => {
    expect(poissonGrowth([5])).toMatchObject({ rate: { reason: "too_few_days" } });
    expect(poissonGrowth([0, 0, 0])).toMatchObject({ rate: { reason: "no_cases" } });
    for (const counts of [
      [0, 0, 4],
      [4, 0],
    ]) {
      expect(poissonGrowth(counts)).toMatchObject({
        rate: { value: null, reason: "growth_unbounded" },
        doubling: null,
        interval: null,
      });
    }
    // [X] two days: r = ln(I₁/I₀), variance 1/I₀ + 1/I₁.
    const two = poissonGrowth([4, 12]);
    expect(two.rate.value).toBeCloseTo(Math.log(3), 13);
    expect(two.standardError).toBeCloseTo(Math.sqrt(1 / 4 + 1 / 12), 13);
    expect(two.dispersion).toBeNull();
    expect(() => poissonGrowth([1, -1])).toThrow(RangeError);
  });

  it.each([
    [[1, 1_000_000]],
    [[...new Array<number>(199).fill(0), 1, 1_000_000]],
    [[1_000_000, 1, ...new Array<number>(99).fill(0)]],
    [[1, ...new Array<number>(400).fill(0), 1]],
  ])("stands extreme series %#", (counts) => {
    const got = poissonGrowth(counts);
    expect(Number.isFinite(got.rate.value)).toBe(true);
    expect(Number.isFinite(got.standardError)).toBe(true);
  });
});

describe("log-linear growth", () => {
  it("gives the worked series", () => {
    // [L] methods C.9.6, R lm.
    const got = logLinearGrowth(RISE);
    expect(got.rate.value).toBeCloseTo(0.41622946526, 10);
    expect(got.standardError).toBeCloseTo(0.03437618395, 10);
    expect(got.doubling?.days).toBeCloseTo(1.66530060559, 10);
    expect(got.interval?.[0]).toBeCloseTo(0.32786267121, 10);
    expect(got.interval?.[1]).toBeCloseTo(0.50459625931, 10);
    expect(got.rSquared).toBeCloseTo(0.96701966979, 10);
  });

  it("cannot take a zero or a single day", () => {
    expect(logLinearGrowth([1, 0, 2]).rate).toEqual({ value: null, reason: "zero_count" });
    expect(logLinearGrowth([3]).rate.reason).toBe("too_few_days");
    expect(logLinearGrowth([2, 2, 2])).toMatchObject({
      rate: { value: 0 },
      rSquared: null,
      doubling: { kind: "neither", days: null, determined: false },
    });
    const two = logLinearGrowth([2, 4]);
    expect(two).toMatchObject({ interval: null, doubling: { determined: false } });
    expect(two.rate.value).toBeCloseTo(Math.LN2, 14);
  });

  it("reads a clean doubling exactly", () => {
    expect(logLinearGrowth([1, 2, 4, 8, 16]).doubling?.days).toBeCloseTo(1, 12);
    expect(doublingTime(-0.1, [-0.2, -0.05]).interval?.[0]).toBeCloseTo(Math.LN2 / 0.2, 13);
  });
});

describe("epidemic curve", () => {
  const none = MISSING_DAY;
  const cases = {
    onset: Int32Array.of(10, 10, none, none, none, 13, 30),
    specimen: Int32Array.of(11, none, 12, none, none, 14, 31),
    report: Int32Array.of(12, 12, 13, 14, none, 15, 32),
  };

  it("stands each case on its onset, else specimen, else report, kept apart", () => {
    const got = epidemicCurve(cases, { binDays: 1, lastDay: 15, delayDays: 2 });
    expect(got).toMatchObject({ withoutOnset: 3, undated: 1, later: 1 });
    const counts = got.bins.map((bin) => [bin.day, bin.onset, bin.specimen, bin.report]);
    expect(counts).toEqual([
      [10, 2, 0, 0],
      [11, 0, 0, 0],
      [12, 0, 1, 0],
      [13, 1, 0, 0],
      [14, 0, 0, 1],
      [15, 0, 0, 0],
    ]);
    expect(got.bins.map((bin) => bin.provisional)).toEqual([
      false,
      false,
      false,
      false,
      true,
      true,
    ]);
  });

  it("ends its bins on the last day and loses nobody", () => {
    const got = epidemicCurve(cases, { binDays: 4, lastDay: 15, delayDays: 1 });
    expect(got.bins.map((bin) => [bin.day, bin.onset + bin.specimen + bin.report])).toEqual([
      [8, 2],
      [12, 3],
    ]);
    expect(got.bins.map((bin) => bin.provisional)).toEqual([false, true]);
  });

  it("is empty without a dated case and refuses what is no curve", () => {
    const nobody = {
      onset: new Int32Array(0),
      specimen: new Int32Array(0),
      report: new Int32Array(0),
    };
    const options = { binDays: 1, lastDay: 15, delayDays: 0 };
    expect(epidemicCurve(nobody, options)).toEqual({
      bins: [],
      withoutOnset: 0,
      undated: 0,
      later: 0,
    });
    expect(() => epidemicCurve({ ...cases, report: nobody.report }, options)).toThrow(RangeError);
    expect(() => epidemicCurve(cases, { ...options, binDays: 0 })).toThrow(RangeError);
    expect(() => epidemicCurve(cases, { ...options, delayDays: -1 })).toThrow(RangeError);
    expect(() => epidemicCurve(cases, { ...options, lastDay: 99999 })).toThrow(RangeError);
  });

  it.each([
    [4, 10, 1],
    [null, 10, 3],
    [5, 8, 2],
    [12, 21, 6],
    [6, 1, 1],
  ])("mean serial interval %o, incubation %d days: bins of %i", (serial, incubation, days) => {
    // Source: methods C.9.1, rule of thumb (recalled).
    expect(curveBinDays(serial, incubation)).toBe(days);
    if (days > 1) {
      expect(days).toBeGreaterThanOrEqual(incubation / 4);
      expect(days).toBeLessThanOrEqual(incubation / 3);
    }
  });
});
