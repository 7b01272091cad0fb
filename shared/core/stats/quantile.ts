/**
 * Empirical quantile of type 7: linear between the order statistics at (k − 1)·p.
 *
 * @param sorted ascending, without NaN; not checked
 * @param p 0 … 1
 * @returns NaN for an empty list
 * @throws RangeError for p outside 0 … 1
 *
 * Cost: O(1). Source: Hyndman & Fan 1996, *Sample quantiles in statistical packages* (recalled); the
 * default of R; methods C.7.4.
 */
export function quantile(sorted: ArrayLike<number>, p: number): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError("p must lie between 0 and 1");
  if (sorted.length === 0) return Number.NaN;
  const place = (sorted.length - 1) * p;
  const low = Math.floor(place);
  const below = sorted[low]!;
  const above = sorted[Math.min(low + 1, sorted.length - 1)]!;
  return below + (place - low) * (above - below);
}
