import { availableParallelism } from "node:os";
import { inlineRunner } from "../../server/analysis/chunks/inline-runner.ts";
import { threadRunner } from "../../server/analysis/chunks/thread-runner.ts";
import type { Graph, UndefinedReason } from "../../shared/core/index.ts";
import { type AttributeFigures, attributeFigures } from "./attribute-figures.ts";
import { type Baselines, baselineFigures } from "./baseline-figures.ts";
import { collectReasons } from "./collect-reasons.ts";
import { type Estimated, type PathFigures, pathFigures } from "./path-figures.ts";
import type { Arguments } from "./read-arguments.ts";
import type { FileNetwork } from "./read-network.ts";
import type { AddedName } from "./report-names.ts";
import { type StructureFigures, structureFigures } from "./structure-figures.ts";

/** What the command adds to the network report; with `--only` the figures named by it. */
export type AddedFigures = Partial<StructureFigures> &
  Partial<PathFigures> & {
    readonly attribute?: AttributeFigures;
    readonly baselines?: Baselines | null;
    /** Which figures are estimates; only above 20,000 people. */
    readonly estimated?: Record<string, Estimated>;
  };

export type AddedOptions = Pick<
  Arguments,
  "population" | "replicates" | "seed" | "workers" | "only"
> & { readonly recall: number | null };

/** A quick look; 999 are wanted for a claim. */
const REPLICATES = 199;

/** Above, baselines take minutes and are drawn when asked for. */
const BASELINES_UP_TO_PEOPLE = 5_000;

/** Below, starting threads takes longer than the work; only baselines are shared among them. */
const THREADS_FROM_PEOPLE = 2_000;

const SEED = 1;

/**
 * All figures beyond the network report, or those that are named.
 *
 * @returns the figures, and why some of them are null by dotted path
 */
export async function addedFigures(
  graph: Graph,
  network: FileNetwork,
  options: AddedOptions,
): Promise<{ figures: AddedFigures; reasons: Record<string, UndefinedReason> }> {
  const { only, recall, population } = options;
  const seed = options.seed ?? SEED;
  const reasons: Record<string, UndefinedReason> = {};
  const take = collectReasons(reasons);
  const wants = (name: AddedName) => only === null || only.has(name);
  const isSmall = graph.n < THREADS_FROM_PEOPLE;
  const workers = options.workers ?? (isSmall ? 1 : availableParallelism());
  const { refs, attribute } = network;
  const choice = { wants, seed, named: only !== null };

  const runner = workers > 1 && !isSmall ? threadRunner(graph, workers) : inlineRunner(graph);
  let structure: Partial<StructureFigures>;
  let paths: Awaited<ReturnType<typeof pathFigures>>;
  try {
    structure = await structureFigures(graph, refs, choice, runner, take);
    paths = await pathFigures(graph, refs, choice, runner, take);
  } finally {
    await runner.close();
  }
  const figures: { -readonly [K in keyof AddedFigures]: AddedFigures[K] } = {
    ...structure,
    ...paths.figures,
  };
  if (attribute && wants("attribute")) {
    figures.attribute = attributeFigures(graph, attribute, take);
  }
  if (wants("baselines")) {
    const isAsked = only !== null || options.replicates !== null;
    const replicates = options.replicates ?? REPLICATES;
    figures.baselines =
      isAsked || graph.n <= BASELINES_UP_TO_PEOPLE
        ? await baselineFigures(
            graph,
            network,
            { replicates, seed, workers, population, recall },
            take,
          )
        : take("baselines", { value: null, reason: "too_many_people" });
  }
  if (paths.estimated) figures.estimated = paths.estimated;
  return { figures, reasons };
}
