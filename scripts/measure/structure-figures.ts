import type { ChunkRunner } from "../../server/analysis/chunks/chunk-runner.ts";
import {
  articulation,
  clustering,
  coreNumbers,
  degreeAssortativity,
  degreeCounts,
  dispersion,
  excessDegreeRatio,
  FEWEST_STARTS,
  type Graph,
} from "../../shared/core/index.ts";
import { byRef } from "./by-ref.ts";
import type { Take } from "./collect-reasons.ts";
import type { AddedName } from "./report-names.ts";

export type CommunityFigures = {
  readonly modularity: number | null;
  readonly count: number;
  /** Number of each person's community, by reference: 0 is the largest. */
  readonly membership: Record<string, number>;
};

export type StructureFigures = {
  readonly excessDegreeRatio: number | null;
  readonly dispersion: {
    readonly index: number | null;
    readonly corrected: number | null;
    readonly expected: number | null;
  };
  readonly averageClustering: number | null;
  readonly degreeAssortativity: number | null;
  readonly articulationPeople: readonly string[];
  readonly bridges: readonly (readonly [string, string])[];
  readonly coreNumbers: Record<string, number>;
  readonly communities: CommunityFigures;
};

/** The best of `FEWEST_STARTS` starts, the first one of equals. */
async function communityFigures(
  refs: readonly string[],
  runner: ChunkRunner,
  seed: number,
  take: Take,
): Promise<CommunityFigures> {
  const starts = await runner.run({ kind: "communities", seed, starts: FEWEST_STARTS });
  const reached = starts.map((start) => start.modularity.value ?? 0);
  const best = starts[reached.indexOf(Math.max(...reached))];
  if (!best) throw new Error("a search without starts");
  return {
    modularity: take("communities.modularity", best.modularity),
    count: best.sizes.length,
    membership: byRef(refs, best.membership),
  };
}

/** The figures of structure that are asked for. */
export async function structureFigures(
  graph: Graph,
  refs: readonly string[],
  options: { readonly wants: (name: AddedName) => boolean; readonly seed: number },
  runner: ChunkRunner,
  take: Take,
): Promise<Partial<StructureFigures>> {
  const { wants, seed } = options;
  const figures: { -readonly [K in keyof StructureFigures]?: StructureFigures[K] } = {};
  const ref = (person: number) => refs[person] ?? "";
  if (wants("excessDegreeRatio")) {
    const ratio = excessDegreeRatio(degreeCounts(graph));
    figures.excessDegreeRatio = take("excessDegreeRatio", ratio);
  }
  if (wants("dispersion")) {
    const { index, corrected, expected } = dispersion(graph);
    figures.dispersion = {
      index: take("dispersion.index", index),
      corrected: take("dispersion.corrected", corrected),
      expected: take("dispersion.expected", expected),
    };
  }
  if (wants("averageClustering")) {
    figures.averageClustering = take("averageClustering", clustering(graph).averageZeros);
  }
  if (wants("degreeAssortativity")) {
    figures.degreeAssortativity = take("degreeAssortativity", degreeAssortativity(graph));
  }
  if (wants("articulationPeople") || wants("bridges")) {
    const { people, bridges } = articulation(graph);
    if (wants("articulationPeople")) figures.articulationPeople = Array.from(people, ref);
    if (wants("bridges")) {
      figures.bridges = Array.from(bridges.a, (a, k) => [ref(a), ref(bridges.b[k] ?? a)] as const);
    }
  }
  if (wants("coreNumbers")) figures.coreNumbers = byRef(refs, coreNumbers(graph));
  if (wants("communities")) {
    figures.communities = await communityFigures(refs, runner, seed, take);
  }
  return figures;
}
