import { expect } from "vitest";

/** Every value within a relative 1e-9 (or that much absolutely, near 0), and as many of them. */
export function expectClose(
  actual: ArrayLike<number> | null,
  expected: ArrayLike<number>,
  relative = 1e-9,
): void {
  const values = Array.from(actual ?? []);
  expect(values.length).toBe(expected.length);
  const wrong = values.flatMap((value, k) => {
    const wanted = expected[k] ?? Number.NaN;
    const near = Math.abs(value - wanted) <= relative * Math.max(1, Math.abs(wanted));
    return near ? [] : [{ k, value, wanted }];
  });
  expect(wrong).toEqual([]);
}
