import {
  addDistances,
  betweennessChunk,
  betweennessPlan,
  type ClosenessSums,
  type CommunityStart,
  chunkRange,
  closenessChunk,
  communitySearch,
  createStream,
  drawSources,
  type Graph,
  replicateRunner,
  type SampledChunk,
  SOURCE_CHUNKS,
  sampledBetweennessChunk,
  searchOrder,
} from "../../../shared/core/index.ts";
import type { ChunkTask } from "./chunk-task.ts";

/** What a part of each kind of task is. */
export type ChunkPart = {
  /** Ordered pairs of people by their distance, from the sources of the part. */
  readonly paths: Float64Array;
  readonly closeness: ClosenessSums;
  readonly betweenness: Float64Array;
  readonly sampledBetweenness: SampledChunk;
  readonly communities: CommunityStart;
  /** The row of a replicate. */
  readonly replicates: Float64Array;
};

export type ChunkWork = {
  /** Parts 0 … count − 1; always as many, whoever does them. */
  readonly count: number;
  /** Works out one part. */
  readonly part: (chunk: number) => ChunkPart[keyof ChunkPart];
};

/**
 * Prepares a task on a graph. A part depends on graph, task and its number only, so parts may be
 * shared among threads in any way.
 *
 * @throws RangeError as the calculation itself
 */
export function chunkWork(graph: Graph, task: ChunkTask): ChunkWork {
  switch (task.kind) {
    case "paths": {
      const ordered = searchOrder(graph).graph;
      const part = (chunk: number) => {
        const [from, to] = chunkRange(graph.n, chunk);
        return addDistances(ordered, from, to, new Float64Array(graph.n));
      };
      return { count: SOURCE_CHUNKS, part };
    }
    case "closeness": {
      const ordered = searchOrder(graph);
      return { count: SOURCE_CHUNKS, part: (chunk) => closenessChunk(ordered, chunk) };
    }
    case "betweenness": {
      const plan = betweennessPlan(graph);
      return { count: SOURCE_CHUNKS, part: (chunk) => betweennessChunk(plan, chunk) };
    }
    case "sampledBetweenness": {
      const plan = betweennessPlan(graph);
      const drawn = drawSources(plan, task.sources, createStream(task.seed, task.stream));
      return {
        count: SOURCE_CHUNKS,
        part: (chunk) => sampledBetweennessChunk(plan, drawn, chunk),
      };
    }
    case "communities": {
      const search = communitySearch(graph);
      return { count: task.starts, part: (start) => search(task.seed, start) };
    }
    case "replicates": {
      const runner = replicateRunner(task.plan);
      const part = (replicate: number) => {
        const row = new Float64Array(runner.width);
        runner.run(replicate, row, 0);
        return row;
      };
      return { count: task.replicates, part };
    }
  }
}
