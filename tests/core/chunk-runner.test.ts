import { describe, expect, it } from "vitest";
import type { ChunkTask } from "../../server/analysis/chunks/chunk-task.ts";
import { inlineRunner } from "../../server/analysis/chunks/inline-runner.ts";
import { threadRunner } from "../../server/analysis/chunks/thread-runner.ts";
import { buildGraph } from "../../shared/core/index.ts";
import { endsOf } from "./support/graphs.ts";
import { lesMiserables } from "./support/published-networks.ts";

const { n, links } = lesMiserables();
const graph = buildGraph(n, endsOf(links));
const TASKS: ChunkTask[] = [
  { kind: "paths" },
  { kind: "closeness" },
  { kind: "betweenness" },
  { kind: "sampledBetweenness", sources: 20, seed: 4, stream: 2 ** 32 - 1 },
  { kind: "communities", seed: 4, starts: 21 },
];

describe("threads on one graph", () => {
  it.each([1, 3])(
    "%i give the parts that one gives here and now",
    async (workers) => {
      const threads = threadRunner(graph, workers);
      try {
        for (const task of TASKS) {
          expect(await threads.run(task), task.kind).toEqual(await inlineRunner(graph).run(task));
        }
      } finally {
        await threads.close();
      }
    },
    30_000,
  );

  it("passes on why a task cannot be done", async () => {
    const threads = threadRunner(graph, 2);
    const task = { kind: "communities", seed: -1, starts: 2 } as const;
    try {
      await expect(threads.run(task)).rejects.toThrow(/seed/);
    } finally {
      await threads.close();
    }
  });

  it("refuses a number of workers that is none", () => {
    expect(() => threadRunner(graph, 0)).toThrow(RangeError);
  });
});
