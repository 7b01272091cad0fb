import type { Envelope } from "./pointwise-envelope.ts";

/** Fewest replicates for a global envelope worth printing without the words "quick look". */
export const FEWEST_FOR_ENVELOPE = 999;

export type RankEnvelope = Envelope & {
  /** Chance under the null model of a curve as extreme as the observed one; ties count. */
  readonly p: number;
  /** Whether the observed curve leaves the envelope at any point. */
  readonly outside: boolean;
  /** Fewer replicates than `FEWEST_FOR_ENVELOPE`. */
  readonly quickLook: boolean;
  readonly replicates: number;
};

/**
 * Two-sided rank of each curve at each point, 1 = the lowest or highest of all; equal values share
 * the middle of their ranks. Curve 0 is the observed one.
 */
function pointwiseRanks(curves: readonly Float64Array[], points: number): Float64Array[] {
  const count = curves.length;
  const ranks = curves.map(() => new Float64Array(points));
  const order = Int32Array.from({ length: count }, (_, k) => k);
  for (let point = 0; point < points; point++) {
    const value = (k: number) => curves[k]![point]!;
    order.sort((i, j) => value(i) - value(j));
    for (let begin = 0; begin < count; ) {
      let end = begin + 1;
      while (end < count && value(order[end]!) === value(order[begin]!)) end++;
      const rank = (begin + 1 + end) / 2;
      for (let at = begin; at < end; at++) {
        ranks[order[at]!]![point] = Math.min(rank, count + 1 - rank);
      }
      begin = end;
    }
  }
  return ranks;
}

function compareSorted(x: Float64Array, y: Float64Array): number {
  for (let k = 0; k < x.length; k++) {
    const difference = x[k]! - y[k]!;
    if (difference !== 0) return difference;
  }
  return 0;
}

/**
 * Global envelope by extreme rank length: holds for the curve as a whole. Curves are ordered by
 * their sorted pointwise ranks, compared from the most extreme on; the envelope spans the curves that
 * remain when the most extreme `alpha` of all of them, the observed one included, are taken away.
 * Without ties the observed curve leaves it exactly when p <= alpha.
 *
 * @param observed the observed curve, one value per point, without NaN
 * @param curves replicates one after another, as many values each
 * @param alpha chance to lie outside anywhere, between 0 and 1
 * @throws RangeError when the curves are no whole number of replicates, there is none, or alpha is
 *   out of range
 *
 * Cost: O(points·N log N). Source: Myllymäki, Mrkvička, Grabarnik, Seijo & Hahn 2017, *Global
 * envelope tests for spatial processes*; methods C.7.4.
 */
export function rankEnvelope(
  observed: Float64Array,
  curves: Float64Array,
  alpha = 0.05,
): RankEnvelope {
  if (!(alpha > 0 && alpha < 1)) throw new RangeError("alpha must lie between 0 and 1");
  const points = observed.length;
  if (points === 0 || curves.length === 0 || curves.length % points !== 0) {
    throw new RangeError("curves must hold a whole number of replicates, at least one");
  }
  const replicates = curves.length / points;
  const all = [observed];
  for (let k = 0; k < replicates; k++) all.push(curves.subarray(k * points, (k + 1) * points));
  const ranks = pointwiseRanks(all, points);
  for (const row of ranks) row.sort();

  const order = Int32Array.from(all, (_, k) => k);
  order.sort((i, j) => compareSorted(ranks[i]!, ranks[j]!));
  // How many curves are more extreme than each, and how many at least as extreme as the observed.
  const before = new Int32Array(all.length);
  let asExtreme = 0;
  for (let at = 0; at < order.length; at++) {
    const k = order[at]!;
    const previous = at === 0 ? -1 : order[at - 1]!;
    const tied = previous >= 0 && compareSorted(ranks[k]!, ranks[previous]!) === 0;
    before[k] = tied ? before[previous]! : at;
    if (compareSorted(ranks[k]!, ranks[0]!) <= 0) asExtreme = at + 1;
  }

  const most = Math.floor(alpha * all.length + 1e-9);
  // The critical curve: the most extreme one with no more than `most` curves before its successor.
  let critical = 0;
  for (const k of order) if (before[k]! <= most) critical = before[k]!;
  const low = new Float64Array(points).fill(Number.POSITIVE_INFINITY);
  const high = new Float64Array(points).fill(Number.NEGATIVE_INFINITY);
  for (let k = 0; k < all.length; k++) {
    if (before[k]! < critical) continue;
    const curve = all[k]!;
    for (let point = 0; point < points; point++) {
      if (curve[point]! < low[point]!) low[point] = curve[point]!;
      if (curve[point]! > high[point]!) high[point] = curve[point]!;
    }
  }
  const outside = observed.some((value, point) => value < low[point]! || value > high[point]!);
  return {
    low,
    high,
    p: asExtreme / all.length,
    outside,
    quickLook: replicates < FEWEST_FOR_ENVELOPE,
    replicates,
  };
}
