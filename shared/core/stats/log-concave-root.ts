/** Newton doubles the digits each step once close; far off it may take a few dozen. */
const MOST_STEPS = 200;

/** Value of the smaller tail at t and the density there. */
export type TailAt = { readonly tail: number; readonly density: number };

/**
 * The t at which a tail of a law on the whole line has the wanted probability.
 *
 * Newton on the logarithm of the tail. Where the density is log-concave so are both tails, and the
 * steps then close in from one side. Far out in the other tail a step would leave the range of
 * doubles: the ends found so far hold it, and a step that leaves them is replaced by halving.
 *
 * @param wanted probability of the tail, in (0, 1)
 * @param rising true for the lower tail, false for the upper
 * @param start where to begin
 * @param at the tail and the density at t
 * @param longest largest step while one end is still open
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
  let low = Number.NEGATIVE_INFINITY;
  let high = Number.POSITIVE_INFINITY;
  let t = start;
  let last = Number.POSITIVE_INFINITY;
  for (let step = 0; step < MOST_STEPS; step++) {
    const { tail, density } = at(t);
    const rootIsRight = rising ? tail < wanted : tail > wanted;
    if (rootIsRight) low = t;
    else high = t;
    const raw = tail > 0 ? (sign * (target - Math.log(tail)) * tail) / density : Number.NaN;
    let next = t + Math.max(-longest, Math.min(longest, raw));
    if (!(next > low && next < high) && raw !== 0) {
      if (Math.abs(raw) <= 1e-15 * Math.abs(t)) return t;
      const open = high - low === Number.POSITIVE_INFINITY;
      next = open ? t + (rootIsRight ? longest : -longest) : (low + high) / 2;
    }
    const size = Math.abs(next - t);
    t = next;
    if (size <= 1e-16 * Math.abs(t)) return t;
    // Rounding has the last word once steps no longer shrink.
    if (size < 1e-9 * (1 + Math.abs(t)) && size >= last / 2) return t;
    last = size;
  }
  return t;
}
