import { inverseBetaLower, inverseBetaUpper } from "./inverse-beta.ts";
import type { Interval } from "./wilson-interval.ts";

/**
 * Clopper–Pearson ("exact") interval for a proportion: never covers less often than it says, and is
 * therefore wider than Wilson's.
 *
 * @param successes x, 0 … trials
 * @param trials number of trials; may exceed 2^32 (pairs of a large population)
 * @param level two-sided confidence, in (0, 1)
 * @returns limits of the proportion (exactly 0 with no success, exactly 1 with nothing but
 * successes), or `null` when there is no trial
 * @throws RangeError when the counts are negative, not whole, or successes exceed trials, or for a
 * level outside (0, 1)
 *
 * Cost: two beta quantiles. Source: Clopper & Pearson 1934, Biometrika 26:404; methods C.2.3.
 */
export function clopperPearsonInterval(
  successes: number,
  trials: number,
  level = 0.95,
): Interval | null {
  if (!Number.isInteger(successes) || !Number.isInteger(trials)) {
    throw new RangeError("successes and trials must be whole numbers");
  }
  if (successes < 0 || successes > trials) {
    throw new RangeError("successes must lie between 0 and trials");
  }
  if (!(level > 0 && level < 1)) throw new RangeError("level must lie in (0, 1)");
  if (trials === 0) return null;
  const tail = (1 - level) / 2;
  const failures = trials - successes;
  return [
    successes === 0 ? 0 : inverseBetaLower(tail, successes, failures + 1),
    failures === 0 ? 1 : inverseBetaUpper(tail, successes + 1, failures),
  ];
}
