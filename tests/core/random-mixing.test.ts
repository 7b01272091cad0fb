import { describe, expect, it } from "vitest";
import {
  clopperPearsonInterval,
  criticalWindow,
  largestSmallGroup,
  meanDegreeIntervals,
  randomMixingGroups,
  threshold,
  wilsonInterval,
} from "../../shared/core/index.ts";

describe("groups under random mixing", () => {
  // Source: methods C.2.1, computed with mpmath 1.2.1 at 30 digits.
  it.each([
    [0.5, 0, 2, 1.33333333333, 0.5, 0.19314718056, null],
    [1, 0, null, 2, 1, 0, null],
    [
      1.1, 0.17613414363181, 10.6669445198, 1.82857551121, 0.906252442005, 0.00468982019568,
      4.06340457003,
    ],
    [
      1.25, 0.371370203503053, 4.66825611248, 1.64715779239, 0.785787245621, 0.0268564486858,
      2.25556674808,
    ],
    [
      1.5, 0.582811643865811, 2.67224299076, 1.45537373071, 0.625782534201, 0.0945348918918,
      1.31766844527,
    ],
    [
      2, 0.79681213002002, 1.68456727145, 1.25500097492, 0.40637573996, 0.30685281944,
      0.677821306103,
    ],
    [
      3, 0.94047979070736, 1.21737529748, 1.09803270458, 0.178560627878, 0.901387711332,
      0.288025834558,
    ],
    [
      4, 0.980172598718222, 1.08614144947, 1.04129223811, 0.0793096051271, 1.61370563888,
      0.151415579992,
    ],
  ])("c %d", (c, share, met, perGroup, dual, rate, spread) => {
    const groups = randomMixingGroups(c);
    expect(groups.giantShare).toBeCloseTo(share, 13);
    if (met === null) expect(groups.groupOfPerson.reason).toBe("at_threshold");
    else expect((groups.groupOfPerson.value ?? 0) / met).toBeCloseTo(1, 11);
    expect(groups.peoplePerGroup).toBeCloseTo(perGroup, 10);
    expect(groups.dual).toBeCloseTo(dual, 11);
    expect(groups.rate.value).toBeCloseTo(rate, 11);
    if (spread === null) expect(groups.spread.reason).toBe("not_above_threshold");
    else expect(groups.spread.value).toBeCloseTo(spread, 10);
  });

  it("has the dual on the same level of c·e^(−c), and joins its series for the rate", () => {
    for (const c of [1.001, 1.3, 2.7, 9]) {
      const { dual } = randomMixingGroups(c);
      expect(dual * Math.exp(-dual)).toBeCloseTo(c * Math.exp(-c), 14);
    }
    for (const c of [0.999000001, 0.998999999, 1.000999999, 1.001000001]) {
      const e = c - 1;
      expect((randomMixingGroups(c).rate.value ?? 0) / (e - Math.log1p(e))).toBeCloseTo(1, 9);
    }
  });

  it("nobody meets anybody at 0", () => {
    expect(randomMixingGroups(0)).toMatchObject({
      giantShare: 0,
      groupOfPerson: { value: 1 },
      peoplePerGroup: 1,
      dual: 0,
      rate: { value: null, reason: "no_pairs" },
    });
    expect(() => randomMixingGroups(-1)).toThrow(RangeError);
  });
});

describe("critical window", () => {
  // Source: methods C.2.3, last column.
  it.each([
    [34, 0.691321, 1.308679],
    [50, 0.728558, 1.271442],
    [100, 0.784557, 1.215443],
    [200, 0.829002, 1.170998],
    [10, 0.535841, 1.464159],
  ])("of %i people", (n, low, high) => {
    const { halfWidth } = criticalWindow(n, 1);
    expect([1 - halfWidth, 1 + halfWidth]).toEqual([
      expect.closeTo(low, 6),
      expect.closeTo(high, 6),
    ]);
  });

  it("places c in it", () => {
    expect(criticalWindow(1000, 1.2).position).toBeCloseTo(2, 12);
    expect(criticalWindow(1000, 0.9).position).toBeCloseTo(-1, 12);
    expect(() => criticalWindow(0, 1)).toThrow(RangeError);
  });
});

describe("largest group below the threshold", () => {
  it("is the published formula", () => {
    // Source: (ln n − 5/2 ln ln n)/(c − 1 − ln c) by hand for n = 1000, c = ½.
    const expected = (Math.log(1000) - 2.5 * Math.log(Math.log(1000))) / (Math.log(2) - 0.5);
    expect(largestSmallGroup(1000, 0.5).value).toBeCloseTo(expected, 12);
  });

  it("is of the size simulations give at c = ½", () => {
    // Source: methods C.2.2, simulated means (SE .08 and .24); leading order only, so 10 %.
    expect(Math.abs((largestSmallGroup(1000, 0.5).value ?? 0) / 11.43 - 1)).toBeLessThan(0.1);
    expect(Math.abs((largestSmallGroup(10_000, 0.5).value ?? 0) / 18.6 - 1)).toBeLessThan(0.1);
  });

  it("is undefined from the window on, and never beyond what there is", () => {
    expect(largestSmallGroup(1000, 0.95).reason).toBe("not_below_threshold");
    expect(largestSmallGroup(1000, 3).reason).toBe("not_below_threshold");
    expect(largestSmallGroup(2, 0.1).reason).toBe("too_few_people");
    expect(largestSmallGroup(1000, 0).value).toBe(1);
    expect(largestSmallGroup(30, 0.01).value).toBe(2);
  });
});

describe("intervals for the mean degree of a complete network", () => {
  // Source: methods C.2.3, computed with scipy 1.10.1.
  it.each([
    [34, 78, 3.724189049823, 5.614304183473, 3.678810399744, 5.625221485741],
    [50, 20, 0.519080019784, 1.229096253725, 0.490022101883, 1.230039247287],
    [100, 50, 0.759385317366, 1.315833380831, 0.743113674378, 1.316252569767],
    [100, 60, 0.933464634455, 1.541443883544, 0.916953596884, 1.541944533898],
    [200, 80, 0.643080182666, 0.995018190092, 0.634598649565, 0.995179432072],
    [10, 0, 0, 0.707864388596, 0, 0.708345903662],
  ])("n %i, m %i", (n, m, wilsonLow, wilsonHigh, exactLow, exactHigh) => {
    const near = (value: number) => expect.closeTo(value, 11);
    expect(meanDegreeIntervals(n, m)).toEqual({
      wilson: [near(wilsonLow), near(wilsonHigh)],
      clopperPearson: [near(exactLow), near(exactHigh)],
    });
  });

  it("inside the window for n 1000, m 500", () => {
    // Source: methods C.2.4, computed with scipy 1.10.1.
    const { wilson } = meanDegreeIntervals(1000, 500) ?? { wilson: [0, 0] };
    expect(wilson).toEqual([expect.closeTo(0.916142, 6), expect.closeTo(1.091526, 6)]);
    expect(
      threshold({
        population: "complete",
        n: 1000,
        interviewed: 1000,
        countedPairs: 500,
        presetWindow: true,
        coverageRequired: false,
        recall: null,
      }),
    ).toMatchObject({ verdict: "inside_window", openVerdicts: [] });
  });

  it("has none without a possible pair, and refuses impossible counts", () => {
    expect(meanDegreeIntervals(1, 0)).toBeNull();
    expect(meanDegreeIntervals(0, 0)).toBeNull();
    expect(() => meanDegreeIntervals(3, 4)).toThrow(RangeError);
  });
});

describe("Clopper–Pearson interval", () => {
  it("is exact at the ends, mirrored between them and wider than Wilson's overall", () => {
    expect(clopperPearsonInterval(0, 20)?.[0]).toBe(0);
    expect(clopperPearsonInterval(20, 20)?.[1]).toBe(1);
    expect(clopperPearsonInterval(0, 0)).toBeNull();
    // No success in N trials: the upper limit is 1 − (α/2)^(1/N) in closed form.
    expect(clopperPearsonInterval(0, 20)?.[1]).toBeCloseTo(1 - 0.025 ** (1 / 20), 14);
    const [low, high] = clopperPearsonInterval(3, 10) ?? [0, 0];
    const [mirroredLow, mirroredHigh] = clopperPearsonInterval(7, 10) ?? [0, 0];
    expect([1 - high, 1 - low]).toEqual([
      expect.closeTo(mirroredLow, 14),
      expect.closeTo(mirroredHigh, 14),
    ]);
    for (let x = 1; x < 30; x++) {
      const exact = clopperPearsonInterval(x, 30) ?? [0, 0];
      const wilson = wilsonInterval(x, 30) ?? [0, 0];
      expect(exact[1] - exact[0]).toBeGreaterThan(wilson[1] - wilson[0]);
    }
  });

  it("takes another level", () => {
    const [low, high] = clopperPearsonInterval(7, 30, 0.9) ?? [0, 0];
    const [lower, higher] = clopperPearsonInterval(7, 30, 0.99) ?? [0, 0];
    expect([lower < low, higher > high]).toEqual([true, true]);
  });
});
