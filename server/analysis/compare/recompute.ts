import { replicateRunner } from "../../../shared/core/index.ts";
import { planBaselines } from "./plan-baselines.ts";
import { type ComparisonFile, inputOfFile } from "./run-file.ts";
import { type CompareResult, type DrawnBaseline, summarise } from "./summarise.ts";

/**
 * Works a downloaded run out again, in one thread and without database or server. The result is that
 * of the file, byte for byte, under the same version of the core.
 *
 * @throws Error for a file whose parts do not belong together
 */
export function recompute(file: ComparisonFile): CompareResult {
  const input = inputOfFile(file);
  const planned = planBaselines(input, file.method.seed);
  const drawn = planned.map(({ plan, ...one }): DrawnBaseline => {
    if (plan === null) return { ...one, table: null, reached: 0 };
    const told = file.result.baselines.find(({ baseline }) => baseline === one.baseline);
    // Where time ran out there are fewer than were asked for.
    const reached = Number(told?.parameters.reached ?? file.run.replicates);
    const runner = replicateRunner(plan);
    const table = new Float64Array(reached * runner.width);
    for (let k = 0; k < reached; k++) runner.run(k, table, k * runner.width);
    return { ...one, table, reached };
  });
  return summarise(input, drawn);
}
