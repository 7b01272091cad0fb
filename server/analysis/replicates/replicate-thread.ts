import { workerData } from "node:worker_threads";
import { replicateRunner } from "../../../shared/core/index.ts";
import { CONTROL, type SharedRun } from "./shared-run.ts";

/**
 * Takes replicates one by one until none is left or the run is stopped. A replicate that was taken
 * is always finished, so what is written is a beginning of the table without gaps.
 */
function work({ plan, replicates, control, table }: SharedRun): void {
  const words = new Int32Array(control);
  const rows = new Float64Array(table);
  const runner = replicateRunner(plan);
  while (Atomics.load(words, CONTROL.stop) === 0) {
    const replicate = Atomics.add(words, CONTROL.next, 1);
    if (replicate >= replicates) return;
    runner.run(replicate, rows, replicate * runner.width);
    Atomics.add(words, CONTROL.done, 1);
  }
}

work(workerData as SharedRun);
