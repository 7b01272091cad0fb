import { describe, expect, it } from "vitest";
import {
  chiSquaredUpper,
  digamma,
  gammaCdf,
  gammaQuantile,
  gammaUpper,
  gammaUpperQuantile,
  negativeBinomialPmf,
  normalQuantile,
  studentQuantile,
  Z_95,
} from "../../shared/core/index.ts";

describe("values of the outbreak measures that rest on the laws alone", () => {
  // Source: methods C.9.5, scipy 1.10.1 (last row also R 4.2.2 qgamma).
  it.each([
    [11, 0.322580645161, 1.771342053947, 3.441458839947, 5.93237291678],
    [24, 0.101010101010101, 1.55325786411, 2.390656795477, 3.485989181296],
    [34, 0.045662100456621, 1.075159286967, 1.537317529394, 2.116176678958],
    [33, 0.035714285714286, 0.811274341883, 1.16668828158, 1.613373288551],
    [28, 0.031847133757962, 0.592541294773, 0.881126794904, 1.251069504623],
  ])("gamma quantiles, shape %i", (shape, scale, low, median, high) => {
    expect(gammaQuantile(0.025, shape, scale)).toBeCloseTo(low, 10);
    expect(gammaQuantile(0.5, shape, scale)).toBeCloseTo(median, 10);
    expect(gammaQuantile(0.975, shape, scale)).toBeCloseTo(high, 10);
  });

  it("probability that R is above 1", () => {
    // Source: methods C.9.5.
    expect(gammaUpper(1, 34, 0.045662100456621)).toBeCloseTo(0.990116455937, 10);
    expect(gammaUpper(1, 33, 0.035714285714286)).toBeCloseTo(0.80506714767, 10);
    expect(gammaUpper(1, 28, 0.031847133757962)).toBeCloseTo(0.248041159841, 10);
  });

  // Source: methods C.9.4 (share of transmission from the top fifth), scipy 1.10.1.
  it.each([
    [0.346070618944, 1.1, 0.726784660869, 10],
    [0.16, 1.63, 0.8825192056, 10],
    [0.1, 2.5, 0.9510231053, 10],
    [0.5, 2.5, 0.6498203241, 10],
    [1, 2.5, 0.5218875825, 10],
  ])("top-fifth share for k %d", (k, R, expected, digits) => {
    const point = gammaUpperQuantile(0.2, k, R / k);
    expect(gammaUpper(point, k + 1, R / k)).toBeCloseTo(expected, digits);
  });

  it.each([
    [1.63, 0.16, 0.6795207332],
    [2.5, 0.1, 0.7219425934],
    [2.5, 0.5, 0.4082482905],
    [2.5, 1, 0.2857142857],
  ])("share without offspring, R %d, k %d", (R, k, expected) => {
    // Source: methods C.9.4.
    expect(negativeBinomialPmf(0, R, k)).toBeCloseTo(expected, 10);
  });

  it("t interval of the serial intervals", () => {
    // Source: methods C.9.3, scipy 1.10.1.
    const half = (studentQuantile(0.975, 9) * 1.7126976771554) / Math.sqrt(10);
    expect(4.4 - half).toBeCloseTo(3.174809888807, 11);
    expect(4.4 + half).toBeCloseTo(5.625190111193, 11);
  });

  it("the gamma likelihood equation holds at its printed root", () => {
    // Source: methods C.9.3: ln a − ψ(a) = ln mean − mean ln.
    const values = [2, 3, 3, 4, 4, 4, 5, 5, 6, 8];
    const meanLog = values.reduce((sum, value) => sum + Math.log(value), 0) / values.length;
    const a = 7.551438767272;
    expect(Math.log(a) - digamma(a)).toBeCloseTo(Math.log(4.4) - meanLog, 12);
  });

  it("the discretised serial interval", () => {
    // Source: methods C.9.5, mean 2.6, SD 1.5.
    const alpha = (1.6 / 1.5) ** 2;
    const theta = 1.5 ** 2 / 1.6;
    const share = (x: number) => gammaCdf(x, alpha, theta);
    const next = (x: number) => gammaCdf(x, alpha + 1, theta);
    const weights = [1, 2, 3, 4, 5, 6].map(
      (k) =>
        k * share(k) +
        (k - 2) * share(k - 2) -
        2 * (k - 1) * share(k - 1) +
        alpha * theta * (2 * next(k - 1) - next(k - 2) - next(k)),
    );
    const expected = [
      0.233172125408, 0.358579400316, 0.19811082854, 0.103342655428, 0.052905175248, 0.026821461952,
    ];
    weights.forEach((weight, k) => {
      expect(weight).toBeCloseTo(expected[k] ?? 0, 11);
    });
  });

  it("the normal point in use and the tails of the dispersion test", () => {
    expect(normalQuantile(0.975)).toBeCloseTo(Z_95, 14);
    // Source: methods C.1.3 and C.1.4.
    expect(chiSquaredUpper(8.369863609279, 2)).toBeCloseTo(0.015223244061, 12);
    expect(chiSquaredUpper(22.7751127238, 1)).toBeLessThan(1e-5);
  });
});
