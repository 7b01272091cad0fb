import fc from "fast-check";
import { describe, expect, it } from "vitest";
import * as core from "../../shared/core/index.ts";
import { MPMATH_VALUES, R_VALUES, type ReferenceRow } from "./support/reference-functions.ts";
import { SCIPY_VALUES } from "./support/reference-laws.ts";

const urn = (total: number, marked: number, drawn: number) => ({ total, marked, drawn });
type Urned = (value: number, urn: core.Urn) => number;
const fromUrn =
  (call: Urned) =>
  (value = 0, total = 0, marked = 0, drawn = 0) =>
    call(value, urn(total, marked, drawn));

const CALLS: Readonly<Record<string, (...args: number[]) => number>> = {
  "incompleteGamma.lower": (a = 0, x = 0) => core.incompleteGamma(a, x).lower,
  "incompleteGamma.upper": (a = 0, x = 0) => core.incompleteGamma(a, x).upper,
  "incompleteBeta.lower": (x = 0, a = 0, b = 0) => core.incompleteBeta(x, a, b).lower,
  "incompleteBeta.upper": (x = 0, a = 0, b = 0) => core.incompleteBeta(x, a, b).upper,
  hypergeometricPmf: fromUrn(core.hypergeometricPmf),
  hypergeometricCdf: fromUrn(core.hypergeometricCdf),
  hypergeometricUpper: fromUrn(core.hypergeometricUpper),
  hypergeometricQuantile: fromUrn(core.hypergeometricQuantile),
};

function called(name: string, args: readonly number[]): number {
  const call = CALLS[name] ?? (core as unknown as Record<string, unknown>)[name];
  if (typeof call !== "function") throw new Error(`no function ${name}`);
  return call(...args) as number;
}

const relative = (got: number, expected: number) =>
  got === expected ? 0 : Math.abs(got - expected) / Math.abs(expected);

function holds(rows: readonly ReferenceRow[], tolerance: number) {
  it.each(rows)("%s(%j)", (name, args, expected) => {
    expect(relative(called(name, args), expected)).toBeLessThan(tolerance);
  });
}

describe("against mpmath", () => holds(MPMATH_VALUES, 1e-12));
describe("against scipy", () => holds(SCIPY_VALUES, 1e-10));
describe("against R", () => holds(R_VALUES, 1e-10));

describe("sizes the product meets", () => {
  // Source: mpmath 1.2.1 at 40 digits; a network of 100,000 people and 300,000 pairs.
  it.each([
    [0, 0.002478157315803993],
    [3, 0.08923150874466469],
  ])("hypergeometric law of %i pairs among 5e9", (k, expected) => {
    const got = core.hypergeometricPmf(k, urn(4_999_950_000, 99_999, 300_000));
    expect(relative(got, expected)).toBeLessThan(1e-11);
  });

  it("an interval for a million people stays quick and holds its own equation", () => {
    const [lower, upper] = core.clopperPearsonInterval(3_000_000, 5e11) ?? [0, 1];
    expect(core.incompleteBeta(lower, 3_000_000, 5e11 - 3_000_000 + 1).lower).toBeCloseTo(0.025, 9);
    expect(core.incompleteBeta(upper, 3_000_001, 5e11 - 3_000_000).upper).toBeCloseTo(0.025, 9);
  });
});

describe("quantiles undo their laws", () => {
  const share = fc.double({ min: 1e-9, max: 1 - 1e-9, noNaN: true });
  const positive = fc.double({ min: 0.05, max: 2000, noNaN: true });
  const run = { seed: 31, numRuns: 200 };

  it("gamma", () => {
    fc.assert(
      fc.property(positive, share, (a, p) => {
        const { lower, upper } = core.incompleteGamma(a, core.inverseGammaLower(a, p));
        expect(Math.min(relative(lower, p), relative(upper, 1 - p))).toBeLessThan(1e-10);
      }),
      run,
    );
  });

  it("beta", () => {
    fc.assert(
      fc.property(positive, positive, share, (a, b, p) => {
        const x = core.inverseBetaLower(p, a, b);
        const { lower, upper } = core.incompleteBeta(x, a, b);
        // A double close to 1 cannot say how close: allow for its last digit.
        const slack = 1e-10 + (1e-16 / Math.max(1 - x, 1e-300)) * b;
        expect(Math.min(relative(lower, p), relative(upper, 1 - p))).toBeLessThan(slack);
      }),
      run,
    );
  });

  it("normal and t", () => {
    fc.assert(
      fc.property(positive, share, (df, p) => {
        expect(core.normalCdf(core.normalQuantile(p))).toBeCloseTo(p, 12);
        // With fewer degrees the tails leave the range of doubles.
        const t = core.studentQuantile(p, df + 0.5);
        expect(core.studentCdf(t, df + 0.5)).toBeCloseTo(p, 12);
      }),
      run,
    );
  });

  it("whole-number laws: the smallest k that reaches the share", () => {
    const mean = fc.double({ min: 0.01, max: 500, noNaN: true });
    fc.assert(
      fc.property(mean, share, fc.double({ min: 0.05, max: 50, noNaN: true }), (m, p, size) => {
        const laws: [(q: number) => number, (k: number) => number][] = [
          [(q) => core.poissonQuantile(q, m), (k) => core.poissonCdf(k, m)],
          [(q) => core.binomialQuantile(q, 600, m / 600), (k) => core.binomialCdf(k, 600, m / 600)],
          [
            (q) => core.negativeBinomialQuantile(q, m, size),
            (k) => core.negativeBinomialCdf(k, m, size),
          ],
        ];
        for (const [quantile, cdf] of laws) {
          const k = quantile(p);
          expect(cdf(k)).toBeGreaterThan(p - 1e-12);
          expect(k === 0 ? -1 : cdf(k - 1)).toBeLessThan(p);
        }
      }),
      run,
    );
  });
});

describe("laws add up", () => {
  const sum = (pmf: (k: number) => number, to: number) =>
    Array.from({ length: to + 1 }, (_, k) => pmf(k)).reduce((total, share) => total + share, 0);

  it("to 1, and to their own cumulative law", () => {
    expect(sum((k) => core.binomialPmf(k, 50, 0.13), 50)).toBeCloseTo(1, 13);
    expect(sum((k) => core.poissonPmf(k, 7.5), 80)).toBeCloseTo(1, 13);
    expect(sum((k) => core.negativeBinomialPmf(k, 2, 0.5), 400)).toBeCloseTo(1, 13);
    expect(sum((k) => core.hypergeometricPmf(k, urn(561, 33, 78)), 33)).toBeCloseTo(1, 13);
    expect(sum((k) => core.hypergeometricPmf(k, urn(561, 33, 78)), 4)).toBeCloseTo(
      core.hypergeometricCdf(4, urn(561, 33, 78)),
      13,
    );
    expect(sum((k) => core.negativeBinomialPmf(k, 2, 0.5), 6)).toBeCloseTo(
      core.negativeBinomialCdf(6, 2, 0.5),
      13,
    );
  });
});

describe("ends and refusals", () => {
  it("knows the ends", () => {
    expect(core.incompleteGamma(2, 0)).toEqual({ lower: 0, upper: 1 });
    expect(core.incompleteGamma(2, Number.POSITIVE_INFINITY)).toEqual({ lower: 1, upper: 0 });
    expect(core.incompleteBeta(0, 2, 3)).toEqual({ lower: 0, upper: 1 });
    expect(core.incompleteBeta(1, 2, 3)).toEqual({ lower: 1, upper: 0 });
    expect([core.inverseGammaLower(2, 0), core.inverseGammaLower(2, 1)]).toEqual([0, Infinity]);
    expect([core.inverseBetaLower(0, 2, 3), core.inverseBetaLower(1, 2, 3)]).toEqual([0, 1]);
    expect([core.inverseBetaUpper(0, 2, 3), core.inverseBetaUpper(1, 2, 3)]).toEqual([1, 0]);
    expect([core.normalQuantile(0), core.normalQuantile(0.5)]).toEqual([-Infinity, 0]);
    expect([core.normalQuantile(1), core.studentQuantile(1, 3)]).toEqual([Infinity, Infinity]);
    expect([core.binomialPmf(-1, 3, 0.5), core.poissonPmf(1.5, 2)]).toEqual([0, 0]);
    expect([core.poissonPmf(0, 0), core.negativeBinomialPmf(0, 0, 1)]).toEqual([1, 1]);
    expect([core.binomialQuantile(1, 9, 0.2), core.poissonQuantile(0.3, 0)]).toEqual([9, 0]);
    expect(core.hypergeometricCdf(5, urn(0, 0, 0))).toBe(1);
    // A shape so small that its upper fifth lies below the smallest double.
    expect(core.inverseGammaUpper(4.5e-5, 0.2)).toBe(0);
  });

  it.each<[string, readonly number[]]>([
    ["lnGamma", [0]],
    ["digamma", [-1]],
    ["trigamma", [Number.NaN]],
    ["incompleteGamma.lower", [0, 1]],
    ["incompleteGamma.lower", [1, -1]],
    ["incompleteBeta.lower", [1.1, 1, 1]],
    ["incompleteBeta.lower", [0.5, 0, 1]],
    ["inverseGammaLower", [1, 1.5]],
    ["inverseBetaUpper", [0.5, -1, 1]],
    ["normalCdf", [Number.NaN]],
    ["normalQuantile", [-0.1]],
    ["studentQuantile", [0.5, 0]],
    ["gammaCdf", [1, 1, 0]],
    ["chiSquaredUpper", [1, 0]],
    ["binomialPmf", [1, 2.5, 0.5]],
    ["binomialCdf", [1, 2, 1.5]],
    ["poissonQuantile", [2, 3]],
    ["negativeBinomialPmf", [1, 2, 0]],
    ["hypergeometricPmf", [1, 4, 5, 2]],
    ["clopperPearsonInterval", [3, 2]],
    ["clopperPearsonInterval", [1, 2, 1]],
  ])("%s refuses %j", (name, args) => {
    expect(() => called(name, args)).toThrow(RangeError);
  });
});
