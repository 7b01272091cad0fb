/** Both series below are exact to double precision from here on. */
const ASYMPTOTIC_FROM = 15;

/** B(2j) / 2j for j = 1, 2, …, 8. */
const DIGAMMA_SERIES = [
  1 / 12,
  -1 / 120,
  1 / 252,
  -1 / 240,
  1 / 132,
  -691 / 32760,
  1 / 12,
  -3617 / 8160,
];

/** B(2j) for j = 1, 2, …, 8. */
const TRIGAMMA_SERIES = [1 / 6, -1 / 30, 1 / 42, -1 / 30, 5 / 66, -691 / 2730, 7 / 6, -3617 / 510];

function polynomial(coefficients: readonly number[], x: number): number {
  let sum = 0;
  for (let j = coefficients.length - 1; j >= 0; j--) sum = coefficients[j]! + sum * x;
  return sum;
}

/**
 * ψ(x), the derivative of ln Γ(x). Error below 1e-15 or 1e-14 of the value (absolute near its zero
 * at 1.4616).
 *
 * @param x > 0
 * @throws RangeError for x <= 0 or NaN
 *
 * Cost: O(1), at most 15 steps up by ψ(x) = ψ(x + 1) − 1/x. Source: Abramowitz & Stegun 1964, 6.3.5
 * and 6.3.18.
 */
export function digamma(x: number): number {
  if (!(x > 0)) throw new RangeError("x must be a number > 0");
  let below = 0;
  let at = x;
  for (; at < ASYMPTOTIC_FROM; at++) below += 1 / at;
  const square = 1 / (at * at);
  return Math.log(at) - 0.5 / at - square * polynomial(DIGAMMA_SERIES, square) - below;
}

/**
 * ψ′(x), the second derivative of ln Γ(x); positive and falling.
 *
 * @param x > 0
 * @throws RangeError for x <= 0 or NaN
 *
 * Cost: O(1). Source: Abramowitz & Stegun 1964, 6.4.6 and 6.4.12.
 */
export function trigamma(x: number): number {
  if (!(x > 0)) throw new RangeError("x must be a number > 0");
  let below = 0;
  let at = x;
  for (; at < ASYMPTOTIC_FROM; at++) below += 1 / (at * at);
  const inverse = 1 / at;
  const square = inverse * inverse;
  return below + inverse + square / 2 + inverse * square * polynomial(TRIGAMMA_SERIES, square);
}
