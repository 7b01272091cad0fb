import type { ChunkRunner } from "../../server/analysis/chunks/chunk-runner.ts";
import { sumDistances } from "../../server/analysis/chunks/sum-distances.ts";
import {
  addChunks,
  addSampledChunks,
  betweennessPlan,
  closenessOf,
  createStream,
  drawSources,
  type EstimatePerPerson,
  EXACT_UP_TO_PEOPLE,
  type Graph,
  type Measured,
  pathFiguresOf,
  sampledCloseness,
  sampledPathFigures,
  searchOrder,
} from "../../shared/core/index.ts";
import { byRef } from "./by-ref.ts";
import type { Take } from "./collect-reasons.ts";
import type { AddedName } from "./report-names.ts";

export type PathFigures = {
  readonly meanPath: number | null;
  /** In a sample: the longest distance met, so at least this. */
  readonly diameter: number | null;
  readonly reachableShare: number | null;
  readonly efficiency: number | null;
  readonly betweenness: Record<string, number>;
  readonly harmonicCloseness: Record<string, number> | null;
};

/** How a figure was estimated: by person for the figures by person, null where it has no error. */
export type Estimated = {
  readonly sources: number;
  readonly standardError: number | Record<string, number> | null;
};

/** People whose paths are followed in a network too big to follow everyone. */
export const SOURCES = 512;

/** The last streams there are, far beyond the numbers of replicates and starts. */
const STREAMS = { paths: 2 ** 32 - 1, closeness: 2 ** 32 - 2, betweenness: 2 ** 32 - 3 };

type Figures = { -readonly [K in keyof PathFigures]?: PathFigures[K] };
type Options = {
  readonly wants: (name: AddedName) => boolean;
  /** Exact whatever the size. */
  readonly named: boolean;
  readonly seed: number;
};

const PATHS = ["meanPath", "diameter", "reachableShare", "efficiency"] as const;

/**
 * Paths, betweenness and closeness, as far as asked for: exact up to `EXACT_UP_TO_PEOPLE` people or
 * when named, else estimated from `SOURCES` people drawn at random.
 *
 * @returns the figures, and which of them are estimates; null where all would be exact anyway
 */
export async function pathFigures(
  graph: Graph,
  refs: readonly string[],
  options: Options,
  runner: ChunkRunner,
  take: Take,
): Promise<{ figures: Partial<PathFigures>; estimated: Record<string, Estimated> | null }> {
  const figures: Figures = {};
  const estimated: Record<string, Estimated> = {};
  const isBig = graph.n > EXACT_UP_TO_PEOPLE;
  const found = { figures, estimated: isBig ? estimated : null };
  if (isBig && !options.named) {
    await sample(graph, refs, options, runner, take, figures, estimated);
    return found;
  }
  const { wants } = options;
  if (PATHS.some(wants)) {
    const counts = sumDistances(graph.n, await runner.run({ kind: "paths" }));
    const exact = pathFiguresOf(graph.n, counts);
    for (const name of PATHS) if (wants(name)) figures[name] = take(name, exact[name]);
  }
  if (wants("betweenness")) {
    const parts = await runner.run({ kind: "betweenness" });
    figures.betweenness = byRef(refs, addChunks(betweennessPlan(graph), parts));
  }
  if (wants("harmonicCloseness")) {
    const parts = await runner.run({ kind: "closeness" });
    const values = take("harmonicCloseness", closenessOf(searchOrder(graph), parts).harmonic);
    figures.harmonicCloseness = values && byRef(refs, values);
  }
  return found;
}

async function sample(
  graph: Graph,
  refs: readonly string[],
  { wants, seed }: Options,
  runner: ChunkRunner,
  take: Take,
  figures: Figures,
  estimated: Record<string, Estimated>,
): Promise<void> {
  const perPerson = (name: string, { sources, value, standardError }: EstimatePerPerson) => {
    estimated[name] = { sources, standardError: byRef(refs, standardError) };
    return byRef(refs, value);
  };
  if (PATHS.some(wants)) {
    const paths = sampledPathFigures(graph, SOURCES, createStream(seed, STREAMS.paths));
    const { sources } = paths;
    const single = (name: string, measured: Measured<{ value: number; standardError: number }>) => {
      const estimate = take(name, measured);
      if (estimate) estimated[name] = { sources, standardError: estimate.standardError };
      return estimate?.value ?? null;
    };
    if (wants("meanPath")) figures.meanPath = single("meanPath", paths.meanPath);
    if (wants("diameter")) {
      figures.diameter = take("diameter", paths.diameterAtLeast);
      if (figures.diameter !== null) estimated.diameter = { sources, standardError: null };
    }
    // Follows from the sizes of the groups, so it is no estimate.
    if (wants("reachableShare")) {
      figures.reachableShare = take("reachableShare", paths.reachableShare);
    }
    if (wants("efficiency")) figures.efficiency = single("efficiency", paths.efficiency);
  }
  if (wants("betweenness")) {
    const from = { sources: SOURCES, seed, stream: STREAMS.betweenness };
    const parts = await runner.run({ kind: "sampledBetweenness", ...from });
    const plan = betweennessPlan(graph);
    const drawn = drawSources(plan, SOURCES, createStream(seed, STREAMS.betweenness));
    figures.betweenness = perPerson("betweenness", addSampledChunks(plan, drawn, parts));
  }
  if (wants("harmonicCloseness")) {
    const stream = createStream(seed, STREAMS.closeness);
    const values = take("harmonicCloseness", sampledCloseness(graph, SOURCES, stream));
    figures.harmonicCloseness = values && perPerson("harmonicCloseness", values);
  }
}
