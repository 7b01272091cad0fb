import { parentPort, workerData } from "node:worker_threads";
import type { ChunkAnswer, ChunkOrder, ChunkThreadData } from "./chunk-messages.ts";
import { chunkWork } from "./chunk-work.ts";

const { graph, next } = workerData as ChunkThreadData;
const counter = new Int32Array(next);

parentPort?.on("message", ({ task }: ChunkOrder) => {
  const { count, part } = chunkWork(graph, task);
  const parts: ChunkAnswer["parts"][number][] = [];
  for (;;) {
    const chunk = Atomics.add(counter, 0, 1);
    if (chunk >= count) break;
    parts.push([chunk, part(chunk)]);
  }
  parentPort?.postMessage({ parts } satisfies ChunkAnswer);
});
