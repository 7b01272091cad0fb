import { describe, expect, it } from "vitest";
import {
  binomialPmf,
  clopperPearsonInterval,
  type Interval,
  wilsonInterval,
} from "../../shared/core/index.ts";

/** Exact probability that the interval of x in n trials holds p, summed over x. */
function coverage(n: number, p: number, intervals: readonly Interval[]): number {
  let sum = 0;
  intervals.forEach(([lower, upper], x) => {
    if (lower <= p && p <= upper) sum += binomialPmf(x, n, p);
  });
  return sum;
}

const grid = (from: number, to: number) =>
  Array.from({ length: Math.round((to - from) / 0.005) + 1 }, (_, k) => from + 0.005 * k);

// Exact sums, no simulation. Property of Clopper–Pearson: never below its level. Wilson: over
// p = 0.1, 0.105, …, 0.9 at least 0.92 everywhere and near 0.95 on average (Brown, Cai & DasGupta
// 2001, recalled); nearer 0 and 1 it may fall lower with few trials, which is stated, not tested away.
describe.each([10, 20, 50, 100, 200, 500])("coverage with %i trials", (n) => {
  const all = (interval: (x: number, n: number) => Interval | null) =>
    Array.from({ length: n + 1 }, (_, x) => interval(x, n) ?? ([0, 0] as Interval));

  it("Clopper–Pearson never covers less than 95 %", () => {
    const intervals = all((x, trials) => clopperPearsonInterval(x, trials));
    const least = Math.min(...grid(0.005, 0.995).map((p) => coverage(n, p, intervals)));
    expect(least).toBeGreaterThanOrEqual(0.95);
  });

  it("Wilson covers 92 % or more everywhere and 94 to 96 % on average", () => {
    const intervals = all(wilsonInterval);
    const shares = grid(0.1, 0.9).map((p) => coverage(n, p, intervals));
    expect(Math.min(...shares)).toBeGreaterThanOrEqual(0.92);
    const mean = shares.reduce((sum, share) => sum + share, 0) / shares.length;
    expect(Math.abs(mean - 0.95)).toBeLessThan(0.01);
  });
});
