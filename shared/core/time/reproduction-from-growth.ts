import { checkWeights } from "./case-series.ts";

/**
 * R that goes with a growth rate: R = 1/Σ_s w_s e^(−rs).
 *
 * @param r growth per day
 * @param weights w_0 … w_last of the serial interval
 * @throws RangeError for an r that is not finite or weights that are none
 *
 * Edge cases: r = 0 gives 1 when the weights sum to 1. Cost: O(length of the weights). Source:
 * Wallinga & Lipsitch 2007, *How generation intervals shape the relationship between growth rates
 * and reproductive numbers*; methods C.9.6.
 */
export function reproductionFromGrowth(r: number, weights: ArrayLike<number>): number {
  if (!Number.isFinite(r)) throw new RangeError("r must be a finite number");
  checkWeights(weights);
  let sum = 0;
  for (let s = 1; s < weights.length; s++) sum += weights[s]! * Math.exp(-r * s);
  return 1 / sum;
}
