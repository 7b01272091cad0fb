import type { ChunkRunner } from "../../server/analysis/chunks/chunk-runner.ts";
import { sumDistances } from "../../server/analysis/chunks/sum-distances.ts";
import {
  addChunks,
  articulation,
  betweenness,
  betweennessPlan,
  buildGraph,
  closeness,
  closenessOf,
  clustering,
  communitySearch,
  components,
  coreNumbers,
  degreeAssortativity,
  type Graph,
  pathFigures,
  pathFiguresOf,
  type ReplicatePlan,
  replicateRunner,
  rowWidth,
  searchOrder,
} from "../../shared/core/index.ts";
import type { PairsFile } from "./read-pairs.ts";

/** How one name of the benchmark is worked out. */
export type CoreMeasure = {
  /** On one core. */
  readonly alone: () => unknown;
  /** In threads; null where one thread does it. */
  readonly shared: ((runner: ChunkRunner) => Promise<unknown>) | null;
  /** What to print beside the time, from what `alone` answered. */
  readonly value: (result: never) => unknown;
  /** Repeats inside one run: the time is divided by it. */
  readonly repeats: number;
};

const SEED = 1;
/** Replicates in one run of `baseline`, so that threads have enough to share. */
const REPLICATES = 48;

const largest = (values: ArrayLike<number>): number => {
  let most = 0;
  for (let k = 0; k < values.length; k++) most = Math.max(most, values[k] ?? 0);
  return most;
};

/** Fills in the parts that measures have in common. */
function measure<T>(
  alone: () => T,
  value: (result: T) => unknown,
  shared: CoreMeasure["shared"] = null,
  repeats = 1,
): CoreMeasure {
  return { alone, shared, value, repeats };
}

function paths(graph: Graph): CoreMeasure {
  const shared = async (runner: ChunkRunner) =>
    pathFiguresOf(graph.n, sumDistances(graph.n, await runner.run({ kind: "paths" })));
  const value = (found: ReturnType<typeof pathFigures>) => ({
    meanPath: found.meanPath.value,
    diameter: found.diameter.value,
    efficiency: found.efficiency.value,
  });
  return measure(() => pathFigures(graph), value, shared);
}

function baseline(graph: Graph): CoreMeasure {
  const plan: ReplicatePlan = {
    seed: SEED,
    model: { kind: "gnm", n: graph.n, m: graph.m },
    statistics: ["groups", "transitivity"],
    degreeBins: 0,
    sizeBins: 0,
    attribute: null,
  };
  const runner = replicateRunner(plan);
  const table = new Float64Array(REPLICATES * rowWidth(plan));
  const alone = () => {
    for (let k = 0; k < REPLICATES; k++) runner.run(k, table, k * runner.width);
    return { groups: table[0], transitivity: Number.isNaN(table[1]) ? null : table[1] };
  };
  const shared = (threads: ChunkRunner) =>
    threads.run({ kind: "replicates", plan, replicates: REPLICATES });
  return measure(alone, (row) => row, shared, REPLICATES);
}

/** Everything the benchmark knows, by name, on one graph. */
export function coreMeasures({ n, ends }: PairsFile, graph: Graph) {
  return {
    build: measure(
      () => buildGraph(n, ends),
      (built) => ({ people: built.n, pairs: built.m }),
    ),
    components: measure(
      () => components(graph),
      ({ sizes }) => ({ count: sizes.length, largest: largest(sizes) }),
    ),
    clustering: measure(
      () => clustering(graph),
      ({ transitivity, averageZeros }) => ({
        transitivity: transitivity.value,
        averageClustering: averageZeros.value,
      }),
    ),
    cores: measure(() => coreNumbers(graph), largest),
    articulation: measure(
      () => articulation(graph),
      ({ people, bridges }) => ({ people: people.length, bridges: bridges.a.length }),
    ),
    assortativity: measure(
      () => degreeAssortativity(graph),
      ({ value }) => value,
    ),
    communities: measure(
      () => communitySearch(graph)(SEED, 0),
      ({ modularity, sizes }) => ({ modularity: modularity.value, count: sizes.length }),
    ),
    paths: paths(graph),
    betweenness: measure(
      () => betweenness(graph),
      largest,
      async (runner) => {
        const parts = await runner.run({ kind: "betweenness" });
        return addChunks(betweennessPlan(graph), parts);
      },
    ),
    closeness: measure(
      () => closeness(graph).harmonic.value,
      (values) => values && largest(values),
      async (runner) => {
        const parts = await runner.run({ kind: "closeness" });
        return closenessOf(searchOrder(graph), parts).harmonic.value;
      },
    ),
    baseline: baseline(graph),
  } satisfies Record<string, CoreMeasure>;
}

export const CORE_NAMES = [
  "build",
  "components",
  "clustering",
  "cores",
  "articulation",
  "assortativity",
  "communities",
  "paths",
  "betweenness",
  "closeness",
  "baseline",
] as const satisfies readonly (keyof ReturnType<typeof coreMeasures>)[];

export type CoreName = (typeof CORE_NAMES)[number];
