/** Refuses a series of daily counts that is none. */
export function checkSeries(name: string, counts: ArrayLike<number>): void {
  for (let t = 0; t < counts.length; t++) {
    if (!Number.isSafeInteger(counts[t]!) || counts[t]! < 0) {
      throw new RangeError(`${name} must hold whole numbers >= 0`);
    }
  }
}

/**
 * Refuses weights of a serial interval that are none: not negative, none on day 0 (a case cannot
 * infect before it is one), and at most 1 in sum.
 */
export function checkWeights(weights: ArrayLike<number>): void {
  let total = 0;
  for (let k = 0; k < weights.length; k++) {
    if (!(weights[k]! >= 0)) throw new RangeError("weights must be >= 0");
    total += weights[k]!;
  }
  if (weights.length > 0 && weights[0] !== 0) throw new RangeError("the weight of day 0 must be 0");
  if (!(total > 0 && total <= 1 + 1e-9)) throw new RangeError("weights must sum to 1 at most");
}

/**
 * Λ_t = Σ_{s >= 1} I_{t−s} w_s: how many cases day t would see if each case infected one other, the
 * earlier ones imported included.
 *
 * @param counts cases by day, local and imported
 * @param weights w_0 … w_last of the serial interval
 *
 * Cost: O(days × last). Source: Cori et al. 2013; methods C.9.5.
 */
export function infectiousness(
  counts: ArrayLike<number>,
  weights: ArrayLike<number>,
): Float64Array {
  const pressure = new Float64Array(counts.length);
  for (let t = 0; t < counts.length; t++) {
    const last = Math.min(t, weights.length - 1);
    let sum = 0;
    for (let s = 1; s <= last; s++) sum += counts[t - s]! * weights[s]!;
    pressure[t] = sum;
  }
  return pressure;
}

/** Local and imported cases of each day together. */
export function allCases(
  local: ArrayLike<number>,
  imported: ArrayLike<number> | null,
): Float64Array {
  checkSeries("local", local);
  const all = Float64Array.from(local);
  if (imported === null) return all;
  checkSeries("imported", imported);
  if (imported.length !== local.length) throw new RangeError("the two series differ in length");
  for (let t = 0; t < all.length; t++) all[t]! += imported[t]!;
  return all;
}
