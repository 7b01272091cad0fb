import type { ChunkTask } from "./chunk-task.ts";
import type { ChunkPart } from "./chunk-work.ts";

/** Does tasks on one graph, one after another. */
export type ChunkRunner = {
  /** All parts of a task, in the order of their numbers. @throws Error when a thread dies */
  run<K extends ChunkTask["kind"]>(task: Extract<ChunkTask, { kind: K }>): Promise<ChunkPart[K][]>;
  /** Ends the threads. */
  close(): Promise<void>;
};
