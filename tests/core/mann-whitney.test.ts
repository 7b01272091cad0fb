import { expect, test } from "vitest";
import { mannWhitney } from "../../bench/support/mann-whitney.ts";

// Ages of nine people with diabetes, an example much printed: U = 17 by counting the pairs in which
// the first is larger; with the corrections used here p = 0.1113 (SciPy's documentation of
// mannwhitneyu, method "asymptotic").
const MEN = [19, 22, 16, 29, 24];
const WOMEN = [20, 11, 17, 12];

test("gives U as counted by hand and the published p", () => {
  const counted = MEN.flatMap((a) => WOMEN.filter((b) => a > b)).length;
  const { u, p } = mannWhitney(MEN, WOMEN);
  expect(u).toBe(counted);
  expect(u).toBe(17);
  expect(p).toBeCloseTo(0.11134688653, 6);
  expect(mannWhitney(WOMEN, MEN).p).toBeCloseTo(p, 12);
});

test("counts ties as halves, and says nothing about equal values", () => {
  const [a, b] = [
    [1, 2, 2, 3],
    [2, 2, 4],
  ];
  let counted = 0;
  for (const x of a) for (const y of b) counted += x > y ? 1 : x === y ? 0.5 : 0;
  expect(mannWhitney(a, b).u).toBe(counted);
  expect(mannWhitney([5, 5, 5], [5, 5])).toEqual({ u: 3, p: 1 });
});

test("tells shifted samples apart and equal ones not", () => {
  const low = Array.from({ length: 60 }, (_none, at) => (at * 37) % 60);
  expect(mannWhitney(low, low).p).toBeGreaterThan(0.9);
  expect(
    mannWhitney(
      low,
      low.map((value) => value + 20),
    ).p,
  ).toBeLessThan(0.001);
});
