import { checkMeanDegree } from "./check-input.ts";

/** A law of the number of pairs through its generating functions, on 0 <= x <= 1. */
export type DegreeLaw = {
  /** ⟨k⟩. */
  readonly mean: number;
  /** ⟨k(k − 1)⟩/⟨k⟩; 0 without pairs. */
  readonly excess: number;
  /** G₀(x) = Σ p_k x^k. */
  readonly whole: (x: number) => number;
  /** G₁(x) = G₀′(x)/G₀′(1): the other pairs of a person reached along a pair. */
  readonly reached: (x: number) => number;
  /** G₁′(x). */
  readonly reachedSlope: (x: number) => number;
};

/** The Poisson law with mean c. @throws RangeError for a negative or non-finite c. Cost: O(1). */
export function poissonDegreeLaw(c: number): DegreeLaw {
  checkMeanDegree(c);
  const at = (x: number) => Math.exp(c * (x - 1));
  return { mean: c, excess: c, whole: at, reached: at, reachedSlope: (x) => c * at(x) };
}

/** Σ weights[k]·x^k. */
function polynomial(weights: Float64Array, x: number): number {
  let sum = 0;
  for (let k = weights.length - 1; k >= 0; k--) sum = weights[k]! + sum * x;
  return sum;
}

/** Coefficients of the derivative. */
function derivative(weights: Float64Array): Float64Array {
  const slope = new Float64Array(Math.max(0, weights.length - 1));
  for (let k = 1; k < weights.length; k++) slope[k - 1] = k * weights[k]!;
  return slope;
}

/**
 * The law of the recorded numbers of pairs.
 *
 * @param counts how many people have 0, 1, 2, … pairs (as `degreeCounts` gives them)
 * @throws RangeError for a negative count or nobody at all
 *
 * Cost: O(largest degree) to make and for each value. Source: Newman 2002, PRE 66:016128; methods
 * C.4.2.
 */
export function observedDegreeLaw(counts: ArrayLike<number>): DegreeLaw {
  let people = 0;
  for (let k = 0; k < counts.length; k++) {
    if (!(counts[k]! >= 0)) throw new RangeError("counts must be numbers >= 0");
    people += counts[k]!;
  }
  if (people === 0) throw new RangeError("there must be people to have a law of degrees");
  const shares = Float64Array.from(counts, (count) => count / people);
  const slope = derivative(shares);
  const mean = polynomial(slope, 1);
  const reached = mean === 0 ? Float64Array.of(1) : slope.map((weight) => weight / mean);
  const reachedSlope = derivative(reached);
  return {
    mean,
    excess: polynomial(reachedSlope, 1),
    whole: (x) => polynomial(shares, x),
    reached: (x) => polynomial(reached, x),
    reachedSlope: (x) => polynomial(reachedSlope, x),
  };
}
