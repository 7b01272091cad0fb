import type { MixingAttribute } from "../../../shared/contracts/compare.ts";
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
      readonly kind: "summarise";
      readonly input: CompareInput;
      readonly drawn: readonly DrawnBaseline[];
    };

/** Answer to each kind of job. */
export type CompareAnswer = {
  gather: CompareInput;
  plan: PlannedBaseline[];
  summarise: CompareResult;
};

serveJobs<CompareJob>((job) => {
  switch (job.kind) {
    case "gather":
      return gatherInput(job.record, job.attribute);
    case "plan":
      return planBaselines(job.input, job.seed);
    case "summarise":
      return summarise(job.input, job.drawn);
  }
});
