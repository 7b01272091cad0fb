import type { ReplicatePlan } from "../../../shared/core/index.ts";

/** Cells of the control words all threads of a run share. */
export const CONTROL = {
  /** The next replicate nobody has taken. */
  next: 0,
  /** Replicates whose row is written. */
  done: 1,
  /** Not 0: take no further replicate. */
  stop: 2,
  length: 3,
} as const;

/** What a thread of a run is given. The buffers are shared, the plan is its own copy. */
export type SharedRun = {
  readonly plan: ReplicatePlan;
  readonly replicates: number;
  /** Int32 control words. */
  readonly control: SharedArrayBuffer;
  /** Float64 rows, one after another. */
  readonly table: SharedArrayBuffer;
};
