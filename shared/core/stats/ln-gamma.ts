/** ζ(k) − 1 for k = 2, 3, …, 30: what the gamma function's own series about 2 is made of. */
const ZETA_LESS_ONE = [
  0.6449340668482264, 0.2020569031595943, 0.08232323371113819, 0.03692775514336993,
  0.01734306198444914, 0.008349277381922827, 0.00407735619794434, 0.0020083928260822143,
  0.0009945751278180853, 0.0004941886041194645, 0.0002460865533080483, 0.00012271334757848915,
  6.124813505870483e-5, 3.058823630702049e-5, 1.528225940865187e-5, 7.637197637899763e-6,
  3.81729326499984e-6, 1.908212716553939e-6, 9.539620338727962e-7, 4.769329867878064e-7,
  2.38450502727733e-7, 1.1921992596531106e-7, 5.960818905125948e-8, 2.980350351465228e-8,
  1.4901554828365043e-8, 7.45071178983543e-9, 3.725334024788457e-9, 1.862659723513049e-9,
  9.313274324196682e-10,
];

/** 1 − γ, with γ Euler's constant. */
const ONE_LESS_EULER = 0.42278433509846713;

/** B(2j) / (2j(2j − 1)) for j = 1, 2, …, 8, with B the Bernoulli numbers. */
const STIRLING_COEFFICIENTS = [
  1 / 12,
  -1 / 360,
  1 / 1260,
  -1 / 1680,
  1 / 1188,
  -691 / 360360,
  1 / 156,
  -3617 / 122400,
];

/** Tail of Stirling's series, Σ B(2j) / (2j(2j − 1)x^(2j − 1)); exact to 1e-17 for x >= 15. */
export function stirlingSeries(x: number): number {
  const inverse = 1 / x;
  const square = inverse * inverse;
  let sum = 0;
  for (let j = STIRLING_COEFFICIENTS.length - 1; j >= 0; j--)
    sum = STIRLING_COEFFICIENTS[j]! + sum * square;
  return sum * inverse;
}

/** From here on Stirling's series is exact to double precision. */
export const STIRLING_FROM = 15;

const HALF_LN_TWO_PI = 0.9189385332046728;

/** ln Γ(2 + z) for |z| <= 1/2: (1 − γ)z + Σ (−1)^k (ζ(k) − 1) z^k / k, terms fall like 4^−k. */
function aboutTwo(z: number): number {
  let sum = 0;
  for (let k = ZETA_LESS_ONE.length + 1; k >= 2; k--) {
    const term = ZETA_LESS_ONE[k - 2]! / k;
    sum = (k % 2 === 0 ? term : -term) + sum * z;
  }
  return z * (ONE_LESS_EULER + z * sum);
}

/**
 * ln Γ(x), the natural logarithm of the gamma function, without unit.
 *
 * Relative error below 1e-14, also beside the zeros at 1 and 2: the series about 2 vanishes there by
 * itself. Between 2.5 and 15 the argument is brought down by Γ(x) = (x − 1)Γ(x − 1).
 *
 * @param x > 0; +∞ gives +∞
 * @throws RangeError for x <= 0 or NaN
 *
 * Cost: O(1). Source: Abramowitz & Stegun 1964, 6.1.33 and 6.1.40 (DLMF 5.7.3, 5.11.1).
 */
export function lnGamma(x: number): number {
  if (!(x > 0)) throw new RangeError("x must be a number > 0");
  if (x >= STIRLING_FROM) {
    if (x === Number.POSITIVE_INFINITY) return x;
    return (x - 0.5) * Math.log(x) - x + HALF_LN_TWO_PI + stirlingSeries(x);
  }
  if (x < 0.5) return aboutTwo(x) - Math.log(x) - Math.log1p(x);
  if (x < 1.5) return aboutTwo(x - 1) - Math.log1p(x - 1);
  let product = 1;
  let rest = x;
  while (rest > 2.5) {
    rest -= 1;
    product *= rest;
  }
  return aboutTwo(rest - 2) + Math.log(product);
}
