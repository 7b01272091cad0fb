/** Two-sided 95 % point of the standard normal law. Not 1.96: the sixth digit of a limit differs. */
export const Z_95 = 1.959963984540054;

/** Lower and upper limit. */
export type Interval = [number, number];

/**
 * Wilson score interval for a proportion, 95 %.
 *
 * Limits are clamped to 0 … 1, and are exactly 0 with no success and exactly 1 with nothing but
 * successes (rounding alone gives −6e−17).
 *
 * @param successes x, 0 … trials
 * @param trials number of trials; may exceed 2^32 (pairs of a large population)
 * @returns limits of the proportion, or `null` when there is no trial
 * @throws RangeError when the counts are negative, not whole, or successes exceed trials
 *
 * Cost: O(1). Source: Wilson 1927, J Am Stat Assoc 22:209; Newcombe 1998; methods C.9.2, C.2.3.
 */
export function wilsonInterval(successes: number, trials: number): Interval | null {
  if (!Number.isInteger(successes) || !Number.isInteger(trials)) {
    throw new RangeError("successes and trials must be whole numbers");
  }
  if (successes < 0 || successes > trials) {
    throw new RangeError("successes must lie between 0 and trials");
  }
  if (trials === 0) return null;
  const proportion = successes / trials;
  const z2 = (Z_95 * Z_95) / trials;
  const centre = (proportion + z2 / 2) / (1 + z2);
  const half = (Z_95 * Math.sqrt((proportion * (1 - proportion) + z2 / 4) / trials)) / (1 + z2);
  return [
    successes === 0 ? 0 : Math.max(0, centre - half),
    successes === trials ? 1 : Math.min(1, centre + half),
  ];
}
