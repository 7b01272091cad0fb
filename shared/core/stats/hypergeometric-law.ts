import { discreteQuantile, nearMean } from "./discrete-quantile.ts";
import { binomialWeight } from "./law-weights.ts";

/** An urn: `marked` of `total` balls are marked, `drawn` are taken without putting back. */
export type Urn = { readonly total: number; readonly marked: number; readonly drawn: number };

function check({ total, marked, drawn }: Urn): void {
  for (const count of [total, marked, drawn]) {
    if (!Number.isSafeInteger(count) || count < 0) {
      throw new RangeError("total, marked and drawn must be whole numbers >= 0");
    }
  }
  if (marked > total || drawn > total) throw new RangeError("marked and drawn cannot exceed total");
}

function weight(k: number, { total, marked, drawn }: Urn): number {
  if (total === 0) return 1;
  const p = drawn / total;
  const q = (total - drawn) / total;
  const others = binomialWeight(drawn - k, total - marked - drawn + k, p, q);
  if (others === 0) return 0;
  return (
    (binomialWeight(k, marked - k, p, q) * others) / binomialWeight(drawn, total - drawn, p, q)
  );
}

const fewest = ({ total, marked, drawn }: Urn) => Math.max(0, marked + drawn - total);
const most = ({ marked, drawn }: Urn) => Math.min(marked, drawn);

/**
 * Probability of k marked balls; 0 for a k that cannot occur. Relative error near 1e-13, also for
 * urns of 1e11 (the pairs of a large population).
 *
 * @throws RangeError for an impossible urn
 *
 * Cost: O(1). Source: three binomial weights with p = drawn/total, in which p cancels; Loader 2000.
 */
export function hypergeometricPmf(k: number, urn: Urn): number {
  check(urn);
  const possible = Number.isInteger(k) && k >= fewest(urn) && k <= most(urn);
  return possible ? weight(k, urn) : 0;
}

/** Sum of the probabilities from k on in one direction, until they no longer count. */
function sumFrom(k: number, step: 1 | -1, urn: Urn): number {
  const { total, marked, drawn } = urn;
  const end = step === 1 ? most(urn) : fewest(urn);
  let term = weight(k, urn);
  let sum = term;
  for (let j = k; j !== end; j += step) {
    const up = (i: number) =>
      ((marked - i) * (drawn - i)) / ((i + 1) * (total - marked - drawn + i + 1));
    term *= step === 1 ? up(j) : 1 / up(j - 1);
    sum += term;
    if (term < 1e-17 * sum) break;
  }
  return Math.min(1, sum);
}

/** Probability of k or fewer marked balls. Cost: a few standard deviations' worth of terms. */
export function hypergeometricCdf(k: number, urn: Urn): number {
  check(urn);
  const whole = Math.floor(k);
  if (whole < fewest(urn)) return 0;
  if (whole >= most(urn)) return 1;
  const mean = (urn.marked * urn.drawn) / urn.total;
  return whole < mean ? sumFrom(whole, -1, urn) : 1 - sumFrom(whole + 1, 1, urn);
}

/** Probability of more than k marked balls, with the digits of a small one. */
export function hypergeometricUpper(k: number, urn: Urn): number {
  check(urn);
  const whole = Math.floor(k);
  if (whole < fewest(urn)) return 1;
  if (whole >= most(urn)) return 0;
  const mean = (urn.marked * urn.drawn) / urn.total;
  return whole < mean ? 1 - sumFrom(whole, -1, urn) : sumFrom(whole + 1, 1, urn);
}

/** Variance of the number of marked balls; 0 for an urn of at most one ball. */
export function hypergeometricVariance(urn: Urn): number {
  check(urn);
  const { total, marked, drawn } = urn;
  if (total < 2) return 0;
  return ((drawn * marked) / total) * ((total - marked) / total) * ((total - drawn) / (total - 1));
}

/** Smallest k with probability of k or fewer >= p. */
export function hypergeometricQuantile(p: number, urn: Urn): number {
  check(urn);
  if (p === 0 || urn.total === 0) return fewest(urn);
  const mean = (urn.marked * urn.drawn) / urn.total;
  const start = nearMean(mean, Math.sqrt(hypergeometricVariance(urn)), p);
  return discreteQuantile(p, (k) => hypergeometricCdf(k, urn), start, most(urn));
}
