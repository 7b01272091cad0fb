/**
 * How many cases infected 0, 1, 2, … people, prepared for the likelihood of a negative binomial law:
 * with T_j the cases with more than j offspring, ln Γ(z + k) − ln Γ(k) is a sum over j < z of
 * ln(k + j), so no gamma function is needed and large k costs no digits.
 */
export type OffspringCounts = {
  readonly cases: number;
  readonly offspring: number;
  readonly mean: number;
  /** T_j, cases with more than j offspring. */
  readonly above: Float64Array;
  /** Σ ln z! over cases. */
  readonly lnFactorials: number;
  /** Σ(z − mean)². */
  readonly squares: number;
};

/**
 * @param frequencies cases with 0, 1, 2, … offspring
 * @throws RangeError for frequencies that are not whole numbers >= 0
 */
export function offspringCounts(frequencies: ArrayLike<number>): OffspringCounts {
  const { length } = frequencies;
  const above = new Float64Array(Math.max(0, length - 1));
  let cases = 0;
  let offspring = 0;
  for (let z = length - 1; z >= 0; z--) {
    const count = frequencies[z]!;
    if (!Number.isSafeInteger(count) || count < 0) {
      throw new RangeError("frequencies must be whole numbers >= 0");
    }
    if (z < above.length) above[z] = cases;
    cases += count;
    offspring += z * count;
  }
  const mean = cases === 0 ? 0 : offspring / cases;
  let lnFactorials = 0;
  let lnFactorial = 0;
  let squares = 0;
  for (let z = 0; z < length; z++) {
    if (z > 1) lnFactorial += Math.log(z);
    lnFactorials += frequencies[z]! * lnFactorial;
    squares += frequencies[z]! * (z - mean) ** 2;
  }
  return { cases, offspring, mean, above, lnFactorials, squares };
}

/** Log-likelihood of the negative binomial law with the data's mean and dispersion k. */
export function lnLikelihood(counts: OffspringCounts, k: number): number {
  const { cases, offspring, mean, above, lnFactorials } = counts;
  let sum = offspring * Math.log(mean) - lnFactorials - cases * k * Math.log1p(mean / k);
  for (let j = 0; j < above.length; j++) sum += above[j]! * Math.log1p((j - mean) / (k + mean));
  return sum;
}

/** Log-likelihood of the Poisson law with the data's mean: the limit for k → ∞. */
export function lnPoissonLikelihood(counts: OffspringCounts): number {
  const { offspring, mean, lnFactorials } = counts;
  return offspring * Math.log(mean) - offspring - lnFactorials;
}

/** Derivative of `lnLikelihood` by k. */
export function score(counts: OffspringCounts, k: number): number {
  const { cases, mean, above } = counts;
  let sum = -cases * Math.log1p(mean / k);
  for (let j = 0; j < above.length; j++) sum += above[j]! / (k + j);
  return sum;
}

/** Observed information on k: less the second derivative of `lnLikelihood`. */
export function observedInformation(counts: OffspringCounts, k: number): number {
  const { cases, mean, above } = counts;
  let sum = (-cases * mean) / (k * (k + mean));
  for (let j = 0; j < above.length; j++) sum += above[j]! / (k + j) ** 2;
  return sum;
}

/** Terms of the expectation; with a k of e^(−10) the tail is this long. */
const MOST_TERMS = 1_000_000;

/**
 * Expected information on k under the law with the data's mean and dispersion k:
 * cases × (Σ_j P(Z > j)/(k + j)² − R/(k(k + R))).
 */
export function expectedInformation(counts: OffspringCounts, k: number): number {
  const { cases, mean } = counts;
  const odds = mean / (mean + k);
  let chance = Math.exp(-k * Math.log1p(mean / k));
  let tail = -Math.expm1(-k * Math.log1p(mean / k));
  let sum = -mean / (k * (k + mean));
  for (let j = 0; j < MOST_TERMS && tail > 1e-17; j++) {
    sum += tail / (k + j) ** 2;
    chance *= (odds * (k + j)) / (j + 1);
    tail -= chance;
  }
  return cases * sum;
}
