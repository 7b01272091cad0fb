/** A quantile that misses its probability by rounding alone still counts as reaching it. */
const SLACK = 64 * Number.EPSILON;

/**
 * Smallest whole k from 0 to `most` with cdf(k) >= p, p in 0 … 1.
 *
 * Doubling away from a start near the answer, then halving. Like R, a cdf that falls short of p by
 * rounding only is taken to reach it.
 *
 * Cost: O(log of the distance from the start) evaluations.
 */
export function discreteQuantile(
  p: number,
  cdf: (k: number) => number,
  start: number,
  most: number,
): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError("a probability must lie in 0 … 1");
  if (p === 1) return most;
  const wanted = p * (1 - SLACK);
  const reaches = (k: number) => cdf(k) >= wanted;
  let low = -1;
  let high = Math.min(most, Math.max(0, Math.floor(start)));
  let stride = 1;
  if (reaches(high)) {
    while (high - stride > -1 && reaches(high - stride)) {
      high -= stride;
      stride *= 2;
    }
    low = Math.max(-1, high - stride);
  } else {
    low = high;
    high = Math.min(most, low + stride);
    while (high < most && !reaches(high)) {
      low = high;
      stride *= 2;
      high = Math.min(most, low + stride);
    }
  }
  while (high - low > 1) {
    const middle = low + Math.floor((high - low) / 2);
    if (reaches(middle)) high = middle;
    else low = middle;
  }
  return high;
}

/** A start: mean + z·sd with the z of the normal law, roughly. */
export function nearMean(mean: number, sd: number, p: number): number {
  const tail = Math.max(1e-300, Math.min(p, 1 - p));
  const z = Math.sqrt(Math.max(0, -2 * Math.log(2 * tail)));
  return mean + (p < 0.5 ? -z : z) * sd;
}
