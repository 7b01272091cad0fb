import { type Envelope, pointwiseEnvelope } from "../stats/pointwise-envelope.ts";
import { type RankEnvelope, rankEnvelope } from "../stats/rank-envelope.ts";
import { type ReplicateSummary, replicateSummary } from "../stats/replicate-summary.ts";
import { rowWidth, type Statistic, type StatisticsChoice } from "./replicate-statistics.ts";

/** A curve against its replicates. */
export type CurveSummary = {
  readonly observed: Float64Array;
  readonly mean: Float64Array;
  /** For one point chosen beforehand. */
  readonly pointwise: Envelope;
  /** For the curve as a whole. */
  readonly global: RankEnvelope;
};

export type ReplicatesSummary = {
  readonly replicates: number;
  /** By statistic, in the order of the choice. */
  readonly figures: ReadonlyMap<Statistic, ReplicateSummary>;
  /** Null without bins or without a replicate. */
  readonly degreeCurve: CurveSummary | null;
  readonly sizeCurve: CurveSummary | null;
};

/**
 * What a run of replicates says: every figure with mean, spread, envelope and p-values, and both
 * curves with their envelopes.
 *
 * @param observed row of the observed network (`observedRow` with the same choice)
 * @param table rows of the replicates, one after another
 * @throws RangeError when the rows are not those of the choice
 *
 * Cost: O(width·N log N). Source: methods C.7.4.
 */
export function summariseReplicates(
  choice: StatisticsChoice,
  observed: Float64Array,
  table: Float64Array,
): ReplicatesSummary {
  const width = rowWidth(choice);
  if (observed.length !== width || (width > 0 && table.length % width !== 0)) {
    throw new RangeError("rows must be as wide as the choice asks for");
  }
  const replicates = width === 0 ? 0 : table.length / width;
  const column = (at: number) =>
    Float64Array.from({ length: replicates }, (_, k) => table[k * width + at]!);

  const curve = (start: number, bins: number): CurveSummary | null => {
    if (bins === 0 || replicates === 0) return null;
    const curves = new Float64Array(replicates * bins);
    const mean = new Float64Array(bins);
    for (let k = 0; k < replicates; k++) {
      const row = table.subarray(k * width + start, k * width + start + bins);
      curves.set(row, k * bins);
      for (let bin = 0; bin < bins; bin++) mean[bin]! += row[bin]! / replicates;
    }
    const own = observed.slice(start, start + bins);
    return {
      observed: own,
      mean,
      pointwise: pointwiseEnvelope(curves, bins),
      global: rankEnvelope(own, curves),
    };
  };

  const { statistics, degreeBins, sizeBins } = choice;
  return {
    replicates,
    figures: new Map(
      statistics.map((name, at) => [name, replicateSummary(observed[at]!, column(at))]),
    ),
    degreeCurve: curve(statistics.length, degreeBins),
    sizeCurve: curve(statistics.length + degreeBins, sizeBins),
  };
}
