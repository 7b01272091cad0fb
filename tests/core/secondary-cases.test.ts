import { describe, expect, it } from "vitest";
import {
  gammaByLikelihood,
  gammaByMoments,
  sampleQuantile,
  sampleSummary,
  secondaryAttackRate,
  serialInterval,
  wilsonInterval,
} from "../../shared/core/index.ts";

describe("secondary attack rate", () => {
  it.each([
    // [L] methods C.9.2; the first four also [P] Newcombe 1998, Table I, to four places.
    [81, 263, 0.255288519878, 0.366209576983],
    [15, 148, 0.062386399531, 0.160487241723],
    [0, 20, 0, 0.161125158053],
    [1, 29, 0.006113214293, 0.171755218793],
    // [P] Bi et al. 2020: household attack rate 11.2 % (9.1–13.8).
    [77, 686, 0.090749301504, 0.138059009163],
    [26, 66, 0.285030004946, 0.514515991996],
    [5, 40, 0.054595002509, 0.261121198389],
    [40, 40, 0.912378398803, 1],
  ])("%i of %i", (x, n, low, high) => {
    const { rate, interval } = secondaryAttackRate(x, n, 0);
    expect(rate.value).toBe(x / n);
    expect(interval?.[0]).toBeCloseTo(low, 11);
    expect(interval?.[1]).toBeCloseTo(high, 11);
  });

  it("agrees with the published percentages", () => {
    const { rate, interval } = secondaryAttackRate(77, 686, 0);
    const percent = [rate.value, ...(interval ?? [])].map((x) =>
      Number(((x ?? 0) * 100).toFixed(1)),
    );
    expect(percent).toEqual([11.2, 9.1, 13.8]);
  });

  it("bounds the rate by what those lost could have been", () => {
    expect(secondaryAttackRate(5, 40, 10).bounds).toEqual([0.1, 0.3]);
    expect(secondaryAttackRate(5, 40, 0).bounds).toEqual([0.125, 0.125]);
  });

  it("is undefined when nobody was followed, never 0", () => {
    expect(secondaryAttackRate(0, 0, 3)).toEqual({
      rate: { value: null, reason: "no_contacts_followed" },
      interval: null,
      bounds: [0, 1],
    });
    expect(secondaryAttackRate(0, 0, 0).bounds).toBeNull();
    expect(() => secondaryAttackRate(3, 2, 0)).toThrow(RangeError);
    expect(() => secondaryAttackRate(1, 2, -1)).toThrow(RangeError);
  });
});

describe("serial interval", () => {
  const DAYS = [4, 2, 3, 8, 3, 4, 6, 4, 5, 5];

  it("gives the worked example", () => {
    // [L] methods C.9.3.
    const got = serialInterval(DAYS);
    expect(got.days).toMatchObject({
      count: 10,
      mean: { value: 4.4 },
      median: { value: 4 },
      lowerQuartile: { value: 3.25 },
      upperQuartile: { value: 5 },
      least: { value: 2 },
      most: { value: 8 },
    });
    expect(got.days.standardDeviation.value).toBeCloseTo(1.7126976771554, 12);
    expect(got.meanInterval?.[0]).toBeCloseTo(3.174809888807, 11);
    expect(got.meanInterval?.[1]).toBeCloseTo(5.625190111193, 11);
    expect(got.moments.shape.value).toBeCloseTo(6.6, 12);
    expect(got.moments.rate.value).toBeCloseTo(1.5, 12);
    expect(got.likelihood.shape.value).toBeCloseTo(7.551438767272, 10);
    expect(got.likelihood.rate.value).toBeCloseTo(1.716236083471, 11);
  });

  it("allows negative days, without a gamma law for them", () => {
    const got = serialInterval([-2, 1, 3]);
    expect(got.days.mean.value).toBeCloseTo(2 / 3, 14);
    expect(got.meanInterval).not.toBeNull();
    const none = { value: null, reason: "values_not_positive" };
    expect(got.likelihood).toEqual({ shape: none, rate: none });
    expect(got.moments).toEqual({ shape: none, rate: none });
    expect(serialInterval([0, 3]).likelihood.shape.reason).toBe("values_not_positive");
  });

  it("says why a figure is missing", () => {
    expect(serialInterval([])).toMatchObject({
      days: { count: 0, mean: { reason: "no_values" }, median: { reason: "no_values" } },
      meanInterval: null,
      standardError: { reason: "no_values" },
      moments: { shape: { reason: "no_values" } },
    });
    expect(serialInterval([5])).toMatchObject({
      days: { mean: { value: 5 }, standardDeviation: { reason: "one_value" } },
      meanInterval: null,
      likelihood: { shape: { reason: "one_value" } },
    });
    expect(serialInterval([3, 3, 3])).toMatchObject({
      meanInterval: [3, 3],
      likelihood: { shape: { reason: "values_all_equal" } },
    });
    expect(() => serialInterval([Number.NaN])).toThrow(RangeError);
  });

  it("fits the same law whatever the unit", () => {
    const inHours = DAYS.map((day) => day * 24);
    for (const law of [gammaByMoments, gammaByLikelihood]) {
      const [days, hours] = [law(DAYS), law(inHours)];
      expect((hours.shape.value ?? 0) / (days.shape.value ?? 1)).toBeCloseTo(1, 11);
      expect((hours.rate.value ?? 0) * 24).toBeCloseTo(days.rate.value ?? 0, 11);
    }
  });

  it("finds the shape from very uneven and from nearly equal values", () => {
    // [L] mpmath, 40 digits: ln a − ψ(a) = ln mean − mean ln.
    expect(gammaByLikelihood([0.001, 0.1, 1, 40]).shape.value).toBeCloseTo(0.198576682175189, 11);
    expect((gammaByLikelihood([100, 101, 102]).shape.value ?? 0) / 15300.9166525969).toBeCloseTo(
      1,
      9,
    );
  });
});

describe("quantiles", () => {
  const sorted = [2, 3, 3, 4, 4, 4, 5, 5, 6, 8];

  it("are of type 7, with type 6 beside it", () => {
    // [L] methods C.9.3: IQR 3.25–5; type 6 gives 3–5.25.
    expect([0.25, 0.75].map((p) => sampleQuantile(sorted, p))).toEqual([3.25, 5]);
    expect([0.25, 0.75].map((p) => sampleQuantile(sorted, p, 6))).toEqual([3, 5.25]);
    expect([0, 1].map((p) => sampleQuantile(sorted, p, 6))).toEqual([2, 8]);
    expect(() => sampleQuantile([], 0.5)).toThrow(RangeError);
    expect(() => sampleQuantile(sorted, 1.1)).toThrow(RangeError);
  });
});

describe("the worked table of indicators", () => {
  it.each([
    // [X] shares, [L] intervals: methods B.T1.
    ["B1 interviewed within 24 h", 4, 6, 0.299993315138, 0.903228588894],
    ["B2 interviewed", 5, 6, 0.436497177814, 0.969946630252],
    ["B6 notified within 48 h", 9, 12, 0.467694665066, 0.911058331606],
    ["B8 seen on the day", 6, 7, 0.486872170726, 0.974320375655],
    ["B10 lost", 1, 10, 0.017876213095, 0.404150026795],
    ["B11 known contacts", 2, 6, 0.096771411106, 0.700006684862],
    ["B13 unlinked", 2, 6, 0.096771411106, 0.700006684862],
  ])("%s", (_, x, n, low, high) => {
    const interval = wilsonInterval(x, n);
    expect(interval?.[0]).toBeCloseTo(low, 11);
    expect(interval?.[1]).toBeCloseTo(high, 11);
  });

  it("B14 onset to isolation: delays 2, 2, 1, 2, 2", () => {
    // [X] methods B.T1.
    expect(sampleSummary([2, 2, 1, 2, 2])).toMatchObject({
      count: 5,
      median: { value: 2 },
      lowerQuartile: { value: 2 },
      upperQuartile: { value: 2 },
    });
  });

  it("B5 pairs named in each interview: 4, 3, 2, 2, 1", () => {
    expect(sampleSummary([4, 3, 2, 2, 1]).mean.value).toBeCloseTo(2.4, 14);
  });
});
