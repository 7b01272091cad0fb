import { sampleQuantile } from "./sample-quantile.ts";

/** Lower and upper limit at each point of a curve. */
export type Envelope = { readonly low: Float64Array; readonly high: Float64Array };

/**
 * Pointwise envelope of replicated curves: at each point the quantiles that leave `alpha`/2 on each
 * side. It holds for one point chosen beforehand, not for the curve as a whole: say "pointwise".
 *
 * @param curves replicates one after another, `points` values each
 * @param alpha chance to lie outside at one point, between 0 and 1
 * @throws RangeError when the curves are no whole number of replicates, or alpha is out of range
 *
 * Edge cases: no replicate → NaN everywhere. Cost: O(points·N log N). Source: methods C.7.4.
 */
export function pointwiseEnvelope(curves: Float64Array, points: number, alpha = 0.05): Envelope {
  if (!(alpha > 0 && alpha < 1)) throw new RangeError("alpha must lie between 0 and 1");
  if (!Number.isSafeInteger(points) || points < 1 || curves.length % points !== 0) {
    throw new RangeError("curves must hold a whole number of replicates");
  }
  const replicates = curves.length / points;
  const low = new Float64Array(points).fill(Number.NaN);
  const high = new Float64Array(points).fill(Number.NaN);
  if (replicates === 0) return { low, high };
  const column = new Float64Array(replicates);
  for (let point = 0; point < points; point++) {
    for (let k = 0; k < replicates; k++) column[k] = curves[k * points + point]!;
    column.sort();
    low[point] = sampleQuantile(column, alpha / 2);
    high[point] = sampleQuantile(column, 1 - alpha / 2);
  }
  return { low, high };
}
