/** Newton doubles the digits each step once close; far off it may take a few dozen. */
const MOST_STEPS = 200;

/** Value of the smaller tail at t and the density there. */
export type TailAt = { readonly tail: number; readonly density: number };

/**
 * The t at which a tail of a law on the whole line has the wanted probability.
 *
 * Newton on the logarithm of the tail. Where the density is log-concave so are both tails, and the
 * steps then close in from one side whatever the start; a limit on the step keeps a poor start from
 * leaving the range of doubles.
 *
 * @param wanted probability of the tail, in (0, 1)
 * @param rising true for the lower tail, false for the upper
 * @param start where to begin
 * @param at the tail and the density at t
 * @param longest largest step
 *
 * Cost: usually 4 to 8 evaluations. Source: Newton's method; Prékopa 1971 (tails of log-concave
 * densities are log-concave, recalled).
 */
export function logConcaveRoot(
  wanted: number,
  rising: boolean,
  start: number,
  at: (t: number) => TailAt,
  longest: number,
): number {
  const target = Math.log(wanted);
  const sign = rising ? 1 : -1;
  let t = start;
  let last = Number.POSITIVE_INFINITY;
  for (let step = 0; step < MOST_STEPS; step++) {
    const { tail, density } = at(t);
    if (!(tail > 0 && density > 0)) {
      // Too far out for doubles: come back towards the middle.
      t += sign * longest;
      continue;
    }
    const raw = (sign * (target - Math.log(tail)) * tail) / density;
    const move = Math.max(-longest, Math.min(longest, raw));
    t += move;
    const size = Math.abs(move);
    if (size <= 1e-16 * Math.abs(t)) return t;
    // Rounding has the last word once steps no longer shrink.
    if (size < 1e-9 * (1 + Math.abs(t)) && size >= last / 2) return t;
    last = size;
  }
  return t;
}
