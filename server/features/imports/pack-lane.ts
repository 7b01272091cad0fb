import type { PackedPeople } from "../../identity/pack-new-people.ts";
import { WorkerLane } from "../../worker-lane.ts";
import type { PackAnswer, PackJob } from "./pack-jobs.ts";

const WORKER = new URL("./pack-worker.mjs", import.meta.url);

/** A thread that seals identity for one commit. */
export interface PackLane {
  /** Begins to seal; a failure is told to whoever awaits it and to nobody else. */
  pack(job: Omit<PackJob, "kind">): Promise<PackedPeople>;
  stop(): Promise<void>;
}

/** Makes the lane of one commit; its thread starts with the first job and ends with `stop`. */
export function createPackLane(): PackLane {
  const lane = new WorkerLane<PackJob, PackAnswer>(WORKER, "import");
  return {
    pack(job) {
      const packed = lane.run({ kind: "pack", ...job });
      // The commit may fail before it comes to this part.
      packed.catch(() => undefined);
      return packed;
    },
    stop: () => lane.stop(),
  };
}
