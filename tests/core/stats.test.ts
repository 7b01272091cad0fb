import { describe, expect, it } from "vitest";
import { lambertGiantShare, recall, wilsonInterval, Z_95 } from "../../shared/core/index.ts";

describe("expected giant share", () => {
  // Source: methods C.2.1, computed with mpmath 1.2.1 at 30 digits.
  it.each([
    [0.5, 0],
    [1, 0],
    [1.1, 0.17613414363181],
    [1.25, 0.371370203503053],
    [1.5, 0.582811643865811],
    [2, 0.79681213002002],
    [3, 0.94047979070736],
    [4, 0.980172598718222],
  ])("S(%d)", (c, share) => {
    expect(lambertGiantShare(c)).toBeCloseTo(share, 13);
  });

  // Source: methods C.2.1, the derived columns of the same table (mpmath 1.2.1).
  it.each([
    [1.1, 10.6669445198, 1.82857551121, 0.906252442005, 4.06340457003],
    [1.25, 4.66825611248, 1.64715779239, 0.785787245621, 2.25556674808],
    [1.5, 2.67224299076, 1.45537373071, 0.625782534201, 1.31766844527],
    [2, 1.68456727145, 1.25500097492, 0.40637573996, 0.677821306103],
    [3, 1.21737529748, 1.09803270458, 0.178560627878, 0.288025834558],
    [4, 1.08614144947, 1.04129223811, 0.0793096051271, 0.151415579992],
  ])("what follows from S(%d)", (c, metSize, meanSize, dual, spread) => {
    const share = lambertGiantShare(c);
    expect(1 / (1 - c + c * share)).toBeCloseTo(metSize, 9);
    expect(2 / (2 - c + c * share)).toBeCloseTo(meanSize, 10);
    expect(c * (1 - share)).toBeCloseTo(dual, 11);
    expect(Math.sqrt(share * (1 - share)) / (1 - c * (1 - share))).toBeCloseTo(spread, 10);
  });

  it("is exactly 0 up to 1 and leaves 0 at once", () => {
    expect(lambertGiantShare(0)).toBe(0);
    expect(lambertGiantShare(1)).toBe(0);
    expect(lambertGiantShare(1 + Number.EPSILON)).toBeGreaterThan(0);
  });

  it("joins the series near 1 without a step", () => {
    const below = lambertGiantShare(1.0000099999);
    const above = lambertGiantShare(1.0000100001);
    expect(above).toBeGreaterThan(below);
    // Slope 2 over a width of 2e-10; what is left over is rounding.
    expect(Math.abs(above - below - 4e-10)).toBeLessThan(1e-13);
  });

  it("solves its own equation from just above 1 to far beyond", () => {
    let last = 0;
    for (let c = 1.001; c < 60; c *= 1.05) {
      const share = lambertGiantShare(c);
      expect(Math.abs(share + Math.expm1(-c * share))).toBeLessThan(1e-15 + 1e-16 * c);
      expect(share).toBeGreaterThanOrEqual(last);
      last = share;
    }
    expect(lambertGiantShare(1e6)).toBe(1);
  });

  it.each([-0.1, Number.NaN, Number.POSITIVE_INFINITY])("refuses %d", (c) => {
    expect(() => lambertGiantShare(c)).toThrow(RangeError);
  });
});

describe("Wilson interval", () => {
  it("uses the full normal point, not 1.96", () => {
    expect(Z_95).toBe(1.959963984540054);
    // One trial, no success: the upper limit is z²/(1 + z²) in closed form.
    expect(wilsonInterval(0, 1)?.[1]).toBeCloseTo(Z_95 ** 2 / (1 + Z_95 ** 2), 15);
  });

  it("solves the score equation (x/N − p)² = z² p(1 − p)/N at both ends", () => {
    for (const [x, trials] of [
      [1, 7],
      [20, 1225],
      [475, 94950],
      [3, 4],
    ] as const) {
      for (const limit of wilsonInterval(x, trials) ?? []) {
        const score = (x / trials - limit) ** 2;
        expect(score / ((Z_95 ** 2 * limit * (1 - limit)) / trials)).toBeCloseTo(1, 10);
      }
    }
  });

  it("is exact at the ends and mirrored between them", () => {
    for (let trials = 1; trials <= 2000; trials++) {
      expect(wilsonInterval(0, trials)?.[0]).toBe(0);
      expect(wilsonInterval(trials, trials)?.[1]).toBe(1);
    }
    const [lower, upper] = wilsonInterval(3, 10) ?? [0, 0];
    const [mirroredLower, mirroredUpper] = wilsonInterval(7, 10) ?? [0, 0];
    expect(1 - upper).toBeCloseTo(mirroredLower, 15);
    expect(1 - lower).toBeCloseTo(mirroredUpper, 15);
  });

  it("has no interval without a trial and refuses impossible counts", () => {
    expect(wilsonInterval(0, 0)).toBeNull();
    expect(() => wilsonInterval(2, 1)).toThrow(RangeError);
    expect(() => wilsonInterval(-1, 1)).toThrow(RangeError);
    expect(() => wilsonInterval(0.5, 1)).toThrow(RangeError);
  });
});

describe("recall from double reports", () => {
  // Source: methods C.8.2, exact.
  it.each([
    [6, 4, 0.75],
    [18, 12, 0.75],
    [5, 0, 1],
  ])("named by both %i, by one %i", (both, one, q) => {
    expect(recall(both, one)).toEqual({ value: q, reason: null });
  });

  it("is undefined when no pair was named twice", () => {
    expect(recall(0, 4)).toEqual({ value: null, reason: "no_double_reports" });
    expect(recall(0, 0)).toEqual({ value: null, reason: "no_double_reports" });
  });

  it("refuses counts that are none", () => {
    expect(() => recall(-1, 2)).toThrow(RangeError);
    expect(() => recall(1, 2.5)).toThrow(RangeError);
  });
});
