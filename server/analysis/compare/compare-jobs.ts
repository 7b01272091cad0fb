import type { MixingAttribute } from "../../../shared/contracts/compare.ts";
import { type ReplicatePlan, replicateRunner } from "../../../shared/core/index.ts";
import { serveJobs } from "../../worker-lane.ts";
import type { CompareInput } from "./compare-input.ts";
import { gatherInput } from "./gather-input.ts";
import { type PlannedBaseline, planBaselines } from "./plan-baselines.ts";
import type { ComparedRecord } from "./read-record.ts";
import { type CompareResult, type DrawnBaseline, summarise } from "./summarise.ts";

/** Work for the thread of a comparison. */
export type CompareJob =
  | {
      readonly kind: "gather";
      readonly record: ComparedRecord;
      readonly attribute: MixingAttribute | null;
    }
  | { readonly kind: "plan"; readonly input: CompareInput; readonly seed: number }
  | {
      readonly kind: "draw";
      readonly plan: ReplicatePlan;
      readonly from: number;
      readonly to: number;
    }
  | {
      readonly kind: "summarise";
      readonly input: CompareInput;
      readonly drawn: readonly DrawnBaseline[];
    };

/** Answer to each kind of job. */
export type CompareAnswer = {
  gather: CompareInput;
  plan: PlannedBaseline[];
  /** Rows of the replicates, one after another. */
  draw: Float64Array;
  summarise: CompareResult;
};

function draw(plan: ReplicatePlan, from: number, to: number): Float64Array {
  const runner = replicateRunner(plan);
  const table = new Float64Array((to - from) * runner.width);
  for (let replicate = from; replicate < to; replicate++) {
    runner.run(replicate, table, (replicate - from) * runner.width);
  }
  return table;
}

serveJobs<CompareJob>((job) => {
  switch (job.kind) {
    case "gather":
      return gatherInput(job.record, job.attribute);
    case "plan":
      return planBaselines(job.input, job.seed);
    case "draw":
      return draw(job.plan, job.from, job.to);
    case "summarise":
      return summarise(job.input, job.drawn);
  }
});
