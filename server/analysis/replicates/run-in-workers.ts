import { Worker } from "node:worker_threads";
import { type ReplicatePlan, rowWidth } from "../../../shared/core/index.ts";
import { CONTROL, type SharedRun } from "./shared-run.ts";

/** Loads the thread's file: a worker cannot be started on TypeScript itself. */
const SCRIPT = new URL("./replicate-worker.mjs", import.meta.url);

/** How often progress is looked at, in ms. */
const LOOK_EVERY = 100;

const STOPPED = { cap: 1, cancel: 2 } as const;

export type RunOptions = {
  /** Replicates wanted. */
  readonly replicates: number;
  /** Threads, at least 1. They only share the work: the figures do not depend on their number. */
  readonly workers: number;
  /** Most time to take, in ms, starting the threads included; null = no limit. */
  readonly capMs?: number | null;
  /** Cancels the run: replicates under way are finished, no other is begun. */
  readonly signal?: AbortSignal;
  /** Told how many replicates are ready, at most every 100 ms, and at the end. */
  readonly onProgress?: (done: number) => void;
};

export type ReplicateRun = {
  /** Rows of replicates 0 … reached − 1, one after another. */
  readonly table: Float64Array;
  readonly width: number;
  /** Replicates in the table: all that were wanted, or fewer when the run was stopped. */
  readonly reached: number;
  readonly stopped: "cap" | "cancel" | null;
};

function check({ replicates, workers }: RunOptions): void {
  if (!Number.isSafeInteger(replicates) || replicates < 0) {
    throw new RangeError("replicates must be a whole number >= 0");
  }
  if (!Number.isSafeInteger(workers) || workers < 1) {
    throw new RangeError("workers must be a whole number >= 1");
  }
}

/** Ends when the thread does. @throws what made it fail */
function ended(worker: Worker): Promise<void> {
  return new Promise((resolve, reject) => {
    worker.on("error", reject);
    worker.on("exit", (code) => {
      if (code === 0) resolve();
      else reject(new Error(`a replicate thread ended with ${code}`));
    });
  });
}

/**
 * Runs the replicates of a plan in worker threads over shared memory. The table is the same, byte
 * for byte, with any number of threads; a run that was stopped holds the first rows of it.
 *
 * @throws RangeError for impossible options or an impossible plan, Error when a thread dies
 */
export async function runInWorkers(
  plan: ReplicatePlan,
  options: RunOptions,
): Promise<ReplicateRun> {
  check(options);
  const { replicates, workers, capMs = null, signal, onProgress } = options;
  const width = rowWidth(plan);
  const run: SharedRun = {
    plan,
    replicates,
    control: new SharedArrayBuffer(CONTROL.length * Int32Array.BYTES_PER_ELEMENT),
    table: new SharedArrayBuffer(replicates * width * Float64Array.BYTES_PER_ELEMENT),
  };
  const words = new Int32Array(run.control);
  // Whoever stops first is the one who is named.
  const stop = (why: number) => {
    Atomics.compareExchange(words, CONTROL.stop, 0, why);
  };
  const cancel = () => stop(STOPPED.cancel);
  if (signal?.aborted) cancel();
  signal?.addEventListener("abort", cancel);

  let told = 0;
  const tell = () => {
    const done = Atomics.load(words, CONTROL.done);
    if (done !== told) onProgress?.(done);
    told = done;
  };
  const looking = setInterval(tell, LOOK_EVERY);
  const cap = capMs === null ? undefined : setTimeout(() => stop(STOPPED.cap), capMs);
  const count = Math.max(1, Math.min(workers, replicates));
  const threads = Array.from(
    { length: count },
    (_, at) => new Worker(SCRIPT, { name: `replicates-${at}`, workerData: run }),
  );
  try {
    await Promise.all(threads.map(ended));
  } catch (error) {
    // One thread failed: the others would fail alike or fill a table nobody reads.
    await Promise.all(threads.map((thread) => thread.terminate()));
    throw error;
  } finally {
    clearInterval(looking);
    clearTimeout(cap);
    signal?.removeEventListener("abort", cancel);
  }
  tell();
  const reached = Atomics.load(words, CONTROL.done);
  const why = Atomics.load(words, CONTROL.stop);
  return {
    table: new Float64Array(run.table).slice(0, reached * width),
    width,
    reached,
    stopped: reached === replicates ? null : why === STOPPED.cap ? "cap" : "cancel",
  };
}
