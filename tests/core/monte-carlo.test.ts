import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  benjaminiHochberg,
  createStream,
  holm,
  monteCarloP,
  pointwiseEnvelope,
  rankEnvelope,
  replicateSummary,
  sampleQuantile,
} from "../../shared/core/index.ts";

/** `atLeast` of N replicates at 2, the rest at 0. */
const replicates = (atLeast: number, n: number) =>
  Float64Array.from({ length: n }, (_, k) => (k < atLeast ? 2 : 0));

describe("Monte Carlo p-values", () => {
  it("are (r + 1)/(N + 1)", () => {
    // Source: methods C.7.4 (exact).
    expect(monteCarloP(1, replicates(0, 999))?.upper).toBe(0.001);
    expect(monteCarloP(1, replicates(49, 999))?.upper).toBe(0.05);
    expect(monteCarloP(1, replicates(12, 199))?.upper).toBe(0.065);
    expect(monteCarloP(1, replicates(12, 199))).toEqual({
      upper: 0.065,
      lower: 188 / 200,
      twoSided: 0.13,
      atLeast: 12,
      atMost: 187,
      replicates: 199,
    });
  });

  it("count ties on both sides, rounding included", () => {
    const tied = monteCarloP(0.3, [0.1 + 0.2, 0.3, 0.3 - 5e-13, 0.3 + 1e-9, 0.3 - 1e-9]);
    expect([tied?.atLeast, tied?.atMost]).toEqual([4, 4]);
    expect(tied?.twoSided).toBe(1);
    // Large figures differ by rounding too.
    expect(monteCarloP(1e6, [1e6 + 1e-7])?.atMost).toBe(1);
  });

  it("count an undefined replicate as extreme, and answer nothing for an undefined observation", () => {
    const p = monteCarloP(1, [Number.NaN, 0, 0]);
    expect([p?.upper, p?.lower]).toEqual([2 / 4, 4 / 4]);
    expect(monteCarloP(Number.NaN, [1])).toBeNull();
    expect(monteCarloP(1, [])).toBeNull();
  });
});

describe("quantile of type 7", () => {
  it("is linear between order statistics at (k − 1)p", () => {
    // Worked by hand from the definition (Hyndman & Fan 1996, type 7).
    const sorted = [1, 2, 4, 8, 16];
    expect([0, 0.025, 0.1, 0.5, 0.9, 1].map((p) => sampleQuantile(sorted, p))).toEqual([
      1, 1.1, 1.4, 4, 12.8, 16,
    ]);
    expect(sampleQuantile([7], 0.3)).toBe(7);
    expect(() => sampleQuantile([], 0.5)).toThrow(RangeError);
    expect(() => sampleQuantile(sorted, 1.1)).toThrow(RangeError);
  });
});

describe("adjusted p-values", () => {
  it("are those of the sheet, in any order", () => {
    // Source: methods C.7.4 (exact).
    const p = [0.001, 0.012, 0.021, 0.04, 0.3];
    const close = (found: number[], wanted: number[]) =>
      found.forEach((value, at) => {
        expect(value).toBeCloseTo(wanted[at] ?? 9, 14);
      });
    close(holm(p), [0.005, 0.048, 0.063, 0.08, 0.3]);
    close(benjaminiHochberg(p), [0.005, 0.03, 0.035, 0.05, 0.3]);
    const mixed = [0.3, 0.021, 0.001, 0.04, 0.012];
    close(holm(mixed), [0.3, 0.063, 0.005, 0.08, 0.048]);
    close(benjaminiHochberg(mixed), [0.3, 0.035, 0.005, 0.05, 0.03]);
    expect([holm([]), benjaminiHochberg([])]).toEqual([[], []]);
    expect(holm([0.9, 0.8])).toEqual([1, 1]);
    expect(() => holm([1.2])).toThrow(RangeError);
    expect(() => benjaminiHochberg([Number.NaN])).toThrow(RangeError);
  });
});

describe("summary of a figure", () => {
  it("gives mean, sd, envelope and p-values", () => {
    const values = Float64Array.from({ length: 199 }, (_, k) => k + 1);
    expect(replicateSummary(195, values)).toEqual({
      mean: 100,
      sd: Math.sqrt(3316.666666666667),
      low: 1 + 198 * 0.025,
      high: 1 + 198 * 0.975,
      pUpper: 6 / 200,
      pLower: 196 / 200,
      pTwoSided: 12 / 200,
      replicates: 199,
      undefinedReplicates: 0,
    });
  });

  it("answers null where nothing is defined", () => {
    expect(replicateSummary(Number.NaN, [Number.NaN, Number.NaN])).toEqual({
      mean: null,
      sd: null,
      low: null,
      high: null,
      pUpper: null,
      pLower: null,
      pTwoSided: null,
      replicates: 2,
      undefinedReplicates: 2,
    });
    expect(replicateSummary(1, [3, Number.NaN])).toMatchObject({ mean: 3, sd: null, pUpper: 1 });
  });
});

describe("pointwise envelope", () => {
  it("takes quantiles point by point", () => {
    const curves = Float64Array.from({ length: 2 * 41 }, (_, k) => (k % 2 === 0 ? k / 2 : -k));
    const { low, high } = pointwiseEnvelope(curves, 2, 0.05);
    expect([...low]).toEqual([1, -79]);
    expect([...high]).toEqual([39, -3]);
    expect(() => pointwiseEnvelope(curves, 3)).toThrow(RangeError);
  });
});

/** Extreme rank lengths by comparing every two curves: a slow twin. */
function slowP(curves: number[][]): number {
  const ranks = curves.map((curve) =>
    curve
      .map((value, at) => {
        const below = curves.filter((other) => (other[at] ?? 0) < value).length;
        const same = curves.filter((other) => (other[at] ?? 0) === value).length;
        const rank = below + (same + 1) / 2;
        return Math.min(rank, curves.length + 1 - rank);
      })
      .sort((x, y) => x - y),
  );
  const [mine = []] = ranks;
  const asExtreme = ranks.filter((other) => {
    const at = other.findIndex((rank, k) => rank !== mine[k]);
    return at < 0 || (other[at] ?? 0) < (mine[at] ?? 0);
  });
  return asExtreme.length / curves.length;
}

describe("global envelope by extreme rank length", () => {
  const flat = (curves: number[][]) => Float64Array.from(curves.flat());

  it("by hand: five curves over two points", () => {
    // Two-sided ranks among all five, observed first: (1,1) (2,2) (3,3) (2,2) (1,1): the observed
    // curve ties with the last as most extreme.
    const envelope = rankEnvelope(
      Float64Array.of(0, 0),
      flat([
        [1, 1],
        [2, 2],
        [3, 3],
        [4, 4],
      ]),
      0.4,
    );
    expect(envelope.p).toBe(2 / 5);
    expect([...envelope.low, ...envelope.high]).toEqual([1, 1, 3, 3]);
    expect([envelope.outside, envelope.quickLook, envelope.replicates]).toEqual([true, true, 4]);
  });

  it("orders by how often a curve is extreme, not only by how extreme it is", () => {
    // Every curve touches the edge somewhere; only the observed one does at all three points.
    const curves = [
      [1, 2, 2],
      [2, 1, 3],
      [3, 3, 1],
      [2.5, 2.5, 2.5],
    ];
    expect(rankEnvelope(Float64Array.of(9, 9, 9), flat(curves)).p).toBe(1 / 5);
  });

  it("agrees with a slow twin, and leaves the envelope exactly when p <= alpha", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 19, max: 60 }),
        fc.integer({ min: 1, max: 6 }),
        fc.nat(9999),
        (n, points, seed) => {
          const random = createStream(seed, 0);
          const curves = Array.from({ length: n }, () =>
            Array.from({ length: points }, () => random.next()),
          );
          const observed = Array.from({ length: points }, () => random.next() * 1.3 - 0.15);
          const envelope = rankEnvelope(Float64Array.from(observed), flat(curves), 0.1);
          expect(envelope.p).toBeCloseTo(slowP([observed, ...curves]), 12);
          // Extreme rank lengths may tie on few points; the picture is then on the safe side.
          if (envelope.outside) expect(envelope.p).toBeLessThanOrEqual(0.1 + 1e-9);
          if (points > 3 && envelope.p <= 0.1) expect(envelope.outside).toBe(true);
        },
      ),
      { seed: 20261204, numRuns: 60 },
    );
  });

  it("holds its level for whole curves, where pointwise limits do not", () => {
    let global = 0;
    let pointwise = 0;
    const sets = 400;
    for (let set = 0; set < sets; set++) {
      const random = createStream(90, set);
      const curves = Float64Array.from({ length: 199 * 12 }, () => random.next());
      const observed = Float64Array.from({ length: 12 }, () => random.next());
      if (rankEnvelope(observed, curves).p <= 0.05) global++;
      const { low, high } = pointwiseEnvelope(curves, 12);
      if (observed.some((value, k) => value < (low[k] ?? 0) || value > (high[k] ?? 1))) pointwise++;
    }
    expect(global / sets).toBeLessThan(0.05 + 4 * Math.sqrt((0.05 * 0.95) / sets));
    expect(pointwise / sets).toBeGreaterThan(0.3);
  });

  it("says quick look below 999 replicates and refuses broken curves", () => {
    const curve = Float64Array.of(0.5);
    const many = (n: number) => Float64Array.from({ length: n }, (_, k) => k / n);
    expect(rankEnvelope(curve, many(998)).quickLook).toBe(true);
    expect(rankEnvelope(curve, many(999)).quickLook).toBe(false);
    expect(() => rankEnvelope(Float64Array.of(1, 2), many(3))).toThrow(RangeError);
    expect(() => rankEnvelope(curve, many(0))).toThrow(RangeError);
    expect(() => rankEnvelope(curve, many(5), 1)).toThrow(/alpha/);
  });
});
