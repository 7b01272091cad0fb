import { createStream } from "../random/random-stream.ts";
import { type NullModel, samplerOf } from "./null-model.ts";
import { ReplicateStatistics, rowWidth, type StatisticsChoice } from "./replicate-statistics.ts";
import type { SampledNetwork } from "./sampled-network.ts";

/** Everything that decides the figures of every replicate; plain data that a thread can be sent. */
export type ReplicatePlan = StatisticsChoice & {
  /** Whole number 0 … 2^53 − 1. */
  readonly seed: number;
  readonly model: NullModel;
};

/** Draws and measures single replicates of a plan, in the same buffers. */
export type ReplicateRunner = {
  /** Length of a row. */
  readonly width: number;
  /** Writes the row of replicate `replicate` into `out` from `offset` on. */
  run(replicate: number, out: Float64Array, offset: number): void;
};

/**
 * Prepares a plan. Replicate i depends on the plan, the seed and i only: its stream is
 * `createStream(seed, i)` and nothing is carried over from the replicate before, so any split of
 * the replicates among workers gives the same bytes.
 *
 * @throws RangeError when the plan holds an impossible model, curve or seed
 */
export function replicateRunner(plan: ReplicatePlan): ReplicateRunner {
  createStream(plan.seed, 0);
  const sampler = samplerOf(plan.model);
  const statistics = new ReplicateStatistics(plan);
  return {
    width: statistics.width,
    run(replicate, out, offset) {
      statistics.measure(sampler.sample(createStream(plan.seed, replicate)), out, offset);
    },
  };
}

/**
 * Replicates `from` … `to` − 1 of a plan, in turn.
 *
 * @param write receives the number of a replicate and its row, which is overwritten by the next;
 *   answering false ends the range
 * @throws RangeError as `replicateRunner`, or for a range that is none
 */
export function replicateRange(
  plan: ReplicatePlan,
  from: number,
  to: number,
  write: (replicate: number, row: Float64Array) => boolean | undefined,
): void {
  if (!Number.isSafeInteger(from) || !Number.isSafeInteger(to) || from < 0 || from > to) {
    throw new RangeError("from and to must be whole numbers with 0 <= from <= to");
  }
  const runner = replicateRunner(plan);
  const row = new Float64Array(runner.width);
  for (let replicate = from; replicate < to; replicate++) {
    runner.run(replicate, row, 0);
    if (write(replicate, row) === false) return;
  }
}

/** The row of a network that was not drawn: the observed one, measured as its replicates are. */
export function observedRow(choice: StatisticsChoice, network: SampledNetwork): Float64Array {
  const row = new Float64Array(rowWidth(choice));
  new ReplicateStatistics(choice).measure(network, row);
  return row;
}
