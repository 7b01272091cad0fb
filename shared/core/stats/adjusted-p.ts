function ascending(pValues: readonly number[]): number[] {
  for (const p of pValues) if (!(p >= 0 && p <= 1)) throw new RangeError("p: from 0 to 1");
  return pValues.map((_, at) => at).sort((i, j) => (pValues[i] ?? 0) - (pValues[j] ?? 0));
}

/**
 * Holm's adjusted p-values, in the order given: for claims, since the chance of any false one stays
 * below the level.
 *
 * @throws RangeError for a p-value outside 0 … 1
 *
 * Cost: O(k log k). Source: Holm 1979, *A simple sequentially rejective multiple test procedure*;
 * methods C.7.4.
 */
export function holm(pValues: readonly number[]): number[] {
  const adjusted = new Array<number>(pValues.length).fill(0);
  let floor = 0;
  ascending(pValues).forEach((at, rank) => {
    floor = Math.max(floor, Math.min(1, (pValues.length - rank) * (pValues[at] ?? 0)));
    adjusted[at] = floor;
  });
  return adjusted;
}

/**
 * Benjamini–Hochberg adjusted p-values, in the order given: for screening, since the expected share
 * of false findings stays below the level.
 *
 * @throws RangeError for a p-value outside 0 … 1
 *
 * Cost: O(k log k). Source: Benjamini & Hochberg 1995, *Controlling the false discovery rate*;
 * methods C.7.4.
 */
export function benjaminiHochberg(pValues: readonly number[]): number[] {
  const adjusted = new Array<number>(pValues.length).fill(1);
  const order = ascending(pValues);
  let ceiling = 1;
  for (let rank = order.length; rank > 0; rank--) {
    const at = order[rank - 1] ?? 0;
    ceiling = Math.min(ceiling, (pValues.length / rank) * (pValues[at] ?? 0));
    adjusted[at] = ceiling;
  }
  return adjusted;
}
