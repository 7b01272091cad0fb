import type { Graph } from "../../../shared/core/index.ts";
import type { ChunkTask } from "./chunk-task.ts";
import type { ChunkPart } from "./chunk-work.ts";

/** What a thread is started with. The graph's arrays and the counter are shared memory. */
export type ChunkThreadData = {
  readonly graph: Graph;
  /** Int32: the next part nobody has taken. */
  readonly next: SharedArrayBuffer;
};

/** To a thread: take parts of this task until none is left. */
export type ChunkOrder = { readonly task: ChunkTask };

/** From a thread: the parts it took, with their numbers. */
export type ChunkAnswer = {
  readonly parts: readonly (readonly [chunk: number, part: ChunkPart[keyof ChunkPart]])[];
};
