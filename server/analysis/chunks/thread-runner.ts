import { Worker } from "node:worker_threads";
import type { Graph } from "../../../shared/core/index.ts";
import type { ChunkAnswer, ChunkOrder, ChunkThreadData } from "./chunk-messages.ts";
import type { ChunkRunner } from "./chunk-runner.ts";
import type { ChunkPart } from "./chunk-work.ts";

/** Loads the thread's file: a worker cannot be started on TypeScript itself. */
const SCRIPT = new URL("./chunk-worker.mjs", import.meta.url);

function shared(values: Int32Array): Int32Array {
  const copy = new Int32Array(new SharedArrayBuffer(values.byteLength));
  copy.set(values);
  return copy;
}

/** The next answer of a thread. @throws what made the thread fail */
function answer(worker: Worker): Promise<ChunkAnswer> {
  return new Promise((resolve, reject) => {
    const onMessage = (message: ChunkAnswer) => settle(() => resolve(message));
    const onError = (error: Error) => settle(() => reject(error));
    const onExit = (code: number) =>
      settle(() => reject(new Error(`an analysis thread ended with ${code}`)));
    const settle = (end: () => void) => {
      worker.off("message", onMessage).off("error", onError).off("exit", onExit);
      end();
    };
    worker.on("message", onMessage).on("error", onError).on("exit", onExit);
  });
}

/**
 * Worker threads that share one graph and do its tasks in parts. The parts come back in the order of
 * their numbers, so that what is made of them is the same, byte for byte, with any number of threads.
 *
 * The threads start with the first task. One task at a time: await one before the next. Call `close` in the end, or the process stays.
 *
 * @throws RangeError for a number of workers that is not whole and positive
 */
export function threadRunner(graph: Graph, workers: number): ChunkRunner {
  if (!Number.isSafeInteger(workers) || workers < 1) {
    throw new RangeError("workers must be a whole number >= 1");
  }
  const next = new SharedArrayBuffer(Int32Array.BYTES_PER_ELEMENT);
  const counter = new Int32Array(next);
  const workerData: ChunkThreadData = {
    graph: { ...graph, offsets: shared(graph.offsets), neighbours: shared(graph.neighbours) },
    next,
  };
  let threads: Worker[] = [];
  const start = () =>
    Array.from(
      { length: workers },
      (_, at) => new Worker(SCRIPT, { name: `chunks-${at}`, workerData }),
    );
  return {
    async run(task) {
      if (threads.length === 0) threads = start();
      Atomics.store(counter, 0, 0);
      const answers = threads.map(answer);
      for (const thread of threads) thread.postMessage({ task } satisfies ChunkOrder);
      const found = await Promise.all(answers);
      const parts: ChunkPart[typeof task.kind][] = [];
      for (const { parts: some } of found) {
        for (const [chunk, part] of some) parts[chunk] = part as ChunkPart[typeof task.kind];
      }
      return parts;
    },
    async close() {
      await Promise.all(threads.map((thread) => thread.terminate()));
    },
  };
}
