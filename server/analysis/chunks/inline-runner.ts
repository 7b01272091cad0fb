import type { Graph } from "../../../shared/core/index.ts";
import type { ChunkRunner } from "./chunk-runner.ts";
import { type ChunkPart, chunkWork } from "./chunk-work.ts";

/** Does every part here and now: for small graphs, where starting threads would take longer. */
export function inlineRunner(graph: Graph): ChunkRunner {
  return {
    async run(task) {
      const { count, part } = chunkWork(graph, task);
      // The kind of the task decides what its parts are; `chunkWork` pairs them.
      return Array.from({ length: count }, (_, chunk) =>
        part(chunk),
      ) as ChunkPart[typeof task.kind][];
    },
    close: async () => undefined,
  };
}
