/**
 * Quantile of a sample, by type 7 (linear between order statistics at (n − 1)p; the default of R
 * and numpy) or type 6 (at (n + 1)p). The two differ on small samples: 3.25–5 against 3–5.25 for
 * the quartiles of {2,3,3,4,4,4,5,5,6,8}. This program prints type 7.
 *
 * @param sorted ascending values, at least one
 * @param p 0 … 1
 * @throws RangeError for no value or a p outside 0 … 1
 *
 * Cost: O(1). Source: Hyndman & Fan 1996, *Sample quantiles in statistical packages*; methods C.9.3.
 */
export function sampleQuantile(sorted: ArrayLike<number>, p: number, type: 6 | 7 = 7): number {
  const { length } = sorted;
  if (length === 0) throw new RangeError("a quantile needs at least one value");
  if (!(p >= 0 && p <= 1)) throw new RangeError("p must lie in 0 … 1");
  const place = type === 7 ? (length - 1) * p : (length + 1) * p - 1;
  const held = Math.min(Math.max(place, 0), length - 1);
  const below = Math.floor(held);
  const low = sorted[below]!;
  if (below === held) return low;
  return low + (held - below) * (sorted[below + 1]! - low);
}
