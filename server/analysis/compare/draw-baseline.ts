import type { ReplicatePlan } from "../../../shared/core/index.ts";
import type { WorkerLane } from "../../worker-lane.ts";
import { type ReplicateRun, type RunOptions, runInWorkers } from "../replicates/run-in-workers.ts";
import type { CompareAnswer, CompareJob } from "./compare-jobs.ts";

/** Steps of drawing, about, up to which starting threads would take longer than the work. */
const SMALL_WORK = 20_000_000;
const CHUNK = 100;

/** Steps of one draw and its measuring: pairs, or swap proposals. */
function workOf({ model }: ReplicatePlan): number {
  switch (model.kind) {
    case "gnp":
      return model.n * (1 + model.n * model.p);
    case "gnm":
      return model.n + 4 * model.m;
    case "degreePreserving":
      return model.n + (4 + model.proposalsPerPair) * model.pairs.a.length;
    case "mixing":
      return model.classOf.length + 8 * model.pairs.a.length;
    case "household":
      return model.householdOf.length + 8 * model.pairs.a.length;
    case "traced": {
      const { interviews, population, pairProbability } = model.design;
      return interviews * (4 + 4 * population * pairProbability);
    }
  }
}

/**
 * Draws the replicates of one baseline: a small amount of work in the thread of comparisons, which
 * runs already, more of it in threads of its own. Which of the two changes no figure.
 *
 * @throws as `runInWorkers`
 */
export async function drawBaseline(
  lane: WorkerLane<CompareJob, CompareAnswer>,
  plan: ReplicatePlan,
  options: RunOptions,
): Promise<Pick<ReplicateRun, "table" | "reached" | "stopped">> {
  const { replicates, signal, onProgress } = options;
  if (workOf(plan) * replicates > SMALL_WORK) return await runInWorkers(plan, options);
  const parts: Float64Array[] = [];
  for (let from = 0; from < replicates; from += CHUNK) {
    if (signal?.aborted) return { table: new Float64Array(0), reached: 0, stopped: "cancel" };
    const to = Math.min(replicates, from + CHUNK);
    parts.push(await lane.run({ kind: "draw", plan, from, to }));
    onProgress?.(to);
  }
  const table = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    table.set(part, at);
    at += part.length;
  }
  return { table, reached: replicates, stopped: null };
}
