import { defined, type Measured, undefinedBecause } from "../measures/measured.ts";
import { incompleteGamma } from "../stats/incomplete-gamma.ts";
import { inverseGammaUpper } from "../stats/inverse-gamma.ts";

function checkTop(top: number): void {
  if (!(top > 0 && top < 1)) throw new RangeError("top must lie between 0 and 1");
}

/**
 * Share of transmission expected from the most infectious 20 % of cases (t₂₀), when infectiousness
 * follows a gamma law with shape k: x = the law's upper 20 % point, t₂₀ = share of Gamma(k + 1) above
 * x. Depends on k alone.
 *
 * @param dispersion k > 0; Infinity (everyone alike) gives `top` itself
 * @param top share of cases, default 0.2
 * @throws RangeError outside these ranges
 *
 * Cost: O(1). Source: Lloyd-Smith et al. 2005; methods C.9.4.
 */
export function modelTopShare(dispersion: number, top = 0.2): number {
  if (!(dispersion > 0)) throw new RangeError("k must be > 0");
  checkTop(top);
  if (dispersion === Number.POSITIVE_INFINITY) return top;
  return incompleteGamma(dispersion + 1, inverseGammaUpper(dispersion, top)).upper;
}

/**
 * Share of the observed offspring that came from the 20 % of cases with most; where 20 % is not a
 * whole number of cases, the last one counts in part.
 *
 * @param frequencies cases with 0, 1, 2, … offspring
 * @throws RangeError for frequencies below 0 or a share outside 0 … 1
 *
 * Edge cases: no case (`no_cases`), no offspring (`no_offspring`). Cost: O(most offspring).
 */
export function observedTopShare(frequencies: ArrayLike<number>, top = 0.2): Measured {
  checkTop(top);
  let cases = 0;
  let offspring = 0;
  for (let z = 0; z < frequencies.length; z++) {
    if (!(frequencies[z]! >= 0)) throw new RangeError("frequencies must be >= 0");
    cases += frequencies[z]!;
    offspring += z * frequencies[z]!;
  }
  if (cases === 0) return undefinedBecause("no_cases");
  if (offspring === 0) return undefinedBecause("no_offspring");
  let room = top * cases;
  let held = 0;
  for (let z = frequencies.length - 1; z > 0 && room > 0; z--) {
    const taken = Math.min(room, frequencies[z]!);
    held += z * taken;
    room -= taken;
  }
  return defined(held / offspring);
}
