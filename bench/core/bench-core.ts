import { readFileSync } from "node:fs";
import { availableParallelism } from "node:os";
import { resolve } from "node:path";
import { parseArgs } from "node:util";
import type { ChunkRunner } from "../../server/analysis/chunks/chunk-runner.ts";
import { threadRunner } from "../../server/analysis/chunks/thread-runner.ts";
import { buildGraph, EXACT_UP_TO_PEOPLE } from "../../shared/core/index.ts";
import { CORE_NAMES, type CoreMeasure, type CoreName, coreMeasures } from "./core-measures.ts";
import { medianMs } from "./median-ms.ts";
import { readPairs } from "./read-pairs.ts";

/** Times of one measure in ms, and a value by which to see that it was worked out. */
export type CoreTime = {
  /** On one core. */
  readonly ms: number;
  /** With a thread per core; null where the measure uses one thread. */
  readonly msAllWorkers: number | null;
  readonly value: unknown;
};

/** What to print and how to end: 0 with the times, 2 when arguments or file cannot be used. */
export type BenchEnd = {
  readonly output: string | null;
  readonly complaints: readonly string[];
  readonly code: 0 | 2;
};

/** They look at everyone from everyone: above `EXACT_UP_TO_PEOPLE` they run when named. */
const FROM_EVERYONE: readonly CoreName[] = ["paths", "betweenness", "closeness"];

type Arguments = { readonly pairs: string; readonly only: readonly CoreName[] | null };

function readArguments(args: readonly string[]): Arguments {
  const { values } = parseArgs({
    args: [...args],
    options: { pairs: { type: "string" }, only: { type: "string" } },
    strict: true,
    allowPositionals: false,
  });
  if (!values.pairs) throw new Error("--pairs: is needed");
  if (values.only === undefined) return { pairs: values.pairs, only: null };
  const only = values.only.split(",").map((part) => {
    const name = part.trim();
    const known = CORE_NAMES.find((one) => one === name);
    if (!known) throw new Error(`--only: no measure is called "${name.slice(0, 40)}"`);
    return known;
  });
  return { pairs: values.pairs, only };
}

const round = (ms: number) => Number(ms.toPrecision(5));

async function timeOf(measure: CoreMeasure, runner: ChunkRunner): Promise<CoreTime> {
  const { alone, shared, value, repeats } = measure;
  const one = await medianMs(alone);
  const all = shared ? await medianMs(() => shared(runner)) : null;
  return {
    ms: round(one.ms / repeats),
    msAllWorkers: all && round(all.ms / repeats),
    // Each measure pairs `value` with what its own `alone` answers.
    value: (value as (result: unknown) => unknown)(one.value),
  };
}

/**
 * Times the measures of the numeric core on the pairs of a file: medians of at least five runs after
 * a warm-up, on the graph already built.
 *
 * @param args command-line arguments: `--pairs FILE [--only NAME,NAME]`
 * @param folder folder that a relative path starts from
 */
export async function benchCore(args: readonly string[], folder: string): Promise<BenchEnd> {
  let options: Arguments;
  let file: ReturnType<typeof readPairs>;
  try {
    options = readArguments(args);
    file = readPairs(readFileSync(resolve(folder, options.pairs)));
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    const why = code === "ENOENT" ? "--pairs: no such file" : message;
    return { output: null, complaints: [why.split(/\n|\. /)[0] ?? why], code: 2 };
  }
  const graph = buildGraph(file.n, file.ends);
  const measures = coreMeasures(file, graph);
  const { only } = options;
  const isChosen = (name: CoreName) =>
    only ? only.includes(name) : graph.n <= EXACT_UP_TO_PEOPLE || !FROM_EVERYONE.includes(name);
  const times: Partial<Record<CoreName, CoreTime>> = {};
  const runner = threadRunner(graph, availableParallelism());
  try {
    for (const name of CORE_NAMES) {
      if (isChosen(name)) times[name] = await timeOf(measures[name], runner);
    }
  } finally {
    await runner.close();
  }
  return { output: JSON.stringify(times), complaints: [], code: 0 };
}
