import { articulation } from "../graph/articulation.ts";
import { buildGraph, type Graph } from "../graph/build-graph.ts";
import { communities, FEWEST_STARTS } from "../graph/communities.ts";
import { coreNumbers } from "../graph/core-numbers.ts";
import { betweenness } from "../measures/betweenness.ts";
import type { Measured } from "../measures/measured.ts";
import { type PathFigures, pathFigures } from "../measures/path-figures.ts";
import type { SampledNetwork } from "./sampled-network.ts";

/**
 * Figures that need a graph and often a search from everybody: only worked out when named.
 *
 * - `meanPath`, `diameter`, `reachableShare`, `efficiency`: see `pathFigures`.
 * - `maxBetweenness`: raw, each pair of people once; undefined below three people.
 * - `maxCore`: largest core number. `articulationPeople`, `bridges`: how many.
 * - `bestModularity`: of the best of 20 starts of the community search, seed 0.
 */
export const HEAVY_STATISTICS = [
  "meanPath",
  "diameter",
  "reachableShare",
  "efficiency",
  "maxBetweenness",
  "maxCore",
  "articulationPeople",
  "bridges",
  "bestModularity",
] as const;

export type HeavyStatistic = (typeof HEAVY_STATISTICS)[number];

const PATHS = ["meanPath", "diameter", "reachableShare", "efficiency"] as const;
const COMMUNITY_SEED = 0;

const numberOf = (measured: Measured) => measured.value ?? Number.NaN;

function largest(values: ArrayLike<number>): number {
  let most = Number.NEGATIVE_INFINITY;
  for (let k = 0; k < values.length; k++) if (values[k]! > most) most = values[k]!;
  return values.length === 0 ? Number.NaN : most;
}

/**
 * Works out the named figures of a network; NaN = undefined.
 *
 * Cost: O(n·m/32) for the paths, O(n·m) for betweenness, near O(n + m) a start for communities, else
 * O(n + m). Source: the measures named.
 */
export function heavyStatistics(
  network: SampledNetwork,
  wanted: ReadonlySet<string>,
): Map<HeavyStatistic, number> {
  const values = new Map<HeavyStatistic, number>();
  const graph: Graph = buildGraph(network.people, network, network.length);
  if (PATHS.some((name) => wanted.has(name))) {
    const figures: PathFigures = pathFigures(graph);
    for (const name of PATHS) values.set(name, numberOf(figures[name]));
  }
  if (wanted.has("maxBetweenness")) {
    values.set("maxBetweenness", graph.n < 3 ? Number.NaN : largest(betweenness(graph)));
  }
  if (wanted.has("maxCore")) values.set("maxCore", largest(coreNumbers(graph)));
  if (wanted.has("articulationPeople") || wanted.has("bridges")) {
    const found = articulation(graph);
    values.set("articulationPeople", found.people.length);
    values.set("bridges", found.bridges.a.length);
  }
  if (wanted.has("bestModularity")) {
    values.set(
      "bestModularity",
      numberOf(communities(graph, { seed: COMMUNITY_SEED, starts: FEWEST_STARTS }).modularity),
    );
  }
  return values;
}
