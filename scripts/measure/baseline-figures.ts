import { runInWorkers } from "../../server/analysis/replicates/run-in-workers.ts";
import {
  BURN_IN_PER_PAIR,
  type Graph,
  type Measured,
  MISSING_GROUP,
  type NullModel,
  observedRow,
  type ReplicatePlan,
  replicateRange,
  replicateSummary,
  type SampledNetwork,
  type Statistic,
  tracedDesign,
} from "../../shared/core/index.ts";
import type { Take } from "./collect-reasons.ts";
import { seenNetwork, wholeNetwork } from "./observed-networks.ts";
import type { FileNetwork } from "./read-network.ts";

/** One figure over the replicates: spread, pointwise 95 % envelope, Monte Carlo p-values. */
export type BaselineFigure = {
  readonly mean: number | null;
  readonly sd: number | null;
  readonly low: number | null;
  readonly high: number | null;
  readonly pUpper: number | null;
  readonly pLower: number | null;
};

export type BaselineFigures = Record<string, BaselineFigure>;

export type Baselines = {
  readonly traced?: BaselineFigures | null;
  readonly gnm: BaselineFigures;
  readonly degreePreserving: BaselineFigures;
  readonly mixing?: BaselineFigures;
};

export type BaselineOptions = {
  readonly replicates: number;
  readonly seed: number;
  readonly workers: number;
  /** Declared population, or null for the people on record. */
  readonly population: number | null;
  readonly recall: number | null;
};

const SHAPE = [
  "people",
  "groups",
  "largestGroup",
  "isolates",
  "meanSmallGroup",
  "meanSmallGroupOfPerson",
  "sizeSquares",
  "degreeVariance",
  "maxDegree",
  "triangles",
  "transitivity",
  "averageClustering",
  "degreeAssortativity",
] as const satisfies readonly Statistic[];
const MIXING = [
  "attributeAssortativity",
  "ei",
  "attributeModularity",
] as const satisfies readonly Statistic[];

/** They search from everyone on every replicate, so only small networks get them. */
const HEAVY = [
  "meanPath",
  "diameter",
  "reachableShare",
  "efficiency",
  "maxBetweenness",
  "maxCore",
  "articulationPeople",
  "bridges",
] as const satisfies readonly Statistic[];
const HEAVY_UP_TO_PEOPLE = 500;

/** Not fixed by the interviews alone, unlike in the other baselines. */
const TRACED = ["pairs", "meanDegree"] as const satisfies readonly Statistic[];

/** All rows of a plan, in turn; with several threads when there are several. */
async function table(plan: ReplicatePlan, { replicates, workers }: BaselineOptions) {
  if (workers > 1) return (await runInWorkers(plan, { replicates, workers })).table;
  const width = plan.statistics.length;
  const rows = new Float64Array(replicates * width);
  replicateRange(plan, 0, replicates, (replicate, row) => {
    rows.set(row, replicate * width);
    return true;
  });
  return rows;
}

async function figuresOf(
  model: NullModel,
  observed: SampledNetwork,
  statistics: readonly Statistic[],
  attribute: Int32Array | null,
  options: BaselineOptions,
): Promise<BaselineFigures> {
  const plan: ReplicatePlan = {
    seed: options.seed,
    model,
    statistics,
    degreeBins: 0,
    sizeBins: 0,
    attribute,
  };
  const rows = await table(plan, options);
  const seen = observedRow(plan, observed);
  const width = statistics.length;
  const column = (name: Statistic) => {
    const at = statistics.indexOf(name);
    const values = new Float64Array(options.replicates);
    for (let k = 0; k < values.length; k++) values[k] = rows[k * width + at] ?? Number.NaN;
    return { seen: seen[at] ?? Number.NaN, values };
  };
  const figures: Record<string, BaselineFigure> = {};
  const add = (name: string, value: number, values: Float64Array) => {
    const { mean, sd, low, high, pUpper, pLower } = replicateSummary(value, values);
    figures[name] = { mean, sd, low, high, pUpper, pLower };
  };
  const people = column("people");
  const largest = column("largestGroup");
  const share = largest.values.map((size, k) => size / (people.values[k] ?? 0));
  add("largestShare", largest.seen / people.seen, share);
  const isTraced = model.kind === "traced";
  for (const name of statistics) {
    if (name === "people" && !isTraced) continue;
    const { seen: value, values } = column(name);
    add(name, value, values);
  }
  return figures;
}

/** People without a value make a class of their own where pairs are only moved within classes. */
function withMissingClass(classOf: Int32Array, values: number): Int32Array {
  return classOf.map((group) => (group === MISSING_GROUP ? values : group));
}

/**
 * The observed network against its baselines: the same interviews under random mixing (only with
 * interviews on record), as many pairs at random, degrees kept, and mixing by the attribute kept
 * (only with one).
 *
 * Where people were interviewed, traced mixing and kept degrees are about what the interviews
 * recorded, and every pair keeps an interviewed end. The other two are about everyone on record;
 * with interviews missing they say what G(n,m) looks like and no more.
 *
 * Statistics by attribute leave out pairs with a missing value. Replicate i of each baseline draws
 * from the stream (seed, i).
 */
export async function baselineFigures(
  graph: Graph,
  network: FileNetwork,
  options: BaselineOptions,
  take: Take,
): Promise<Baselines> {
  const { isInterviewed, interviewOrder: order, tellings, attribute } = network;
  const { n, m } = graph;
  const whole = wholeNetwork(graph);
  const classOf = attribute?.classOf ?? null;
  const shape: Statistic[] = n <= HEAVY_UP_TO_PEOPLE ? [...SHAPE, ...HEAVY] : [...SHAPE];
  const statistics: Statistic[] = classOf ? [...shape, ...MIXING] : shape;
  const seen = isInterviewed ? seenNetwork(whole, isInterviewed) : null;
  const kept = seen ?? whole;
  const keptClasses = classOf && seen ? seen.original.map((u) => classOf[u] ?? 0) : classOf;
  const baselines: { -readonly [K in keyof Baselines]?: Baselines[K] } = {};
  if (seen) {
    const design = tracedDesign({
      population: options.population ?? n,
      people: n,
      order,
      tellings,
      directed: true,
      recall: options.recall,
    });
    const nobody: Measured<BaselineFigures> = { value: null, reason: "no_one_interviewed" };
    baselines.traced = design
      ? await figuresOf({ kind: "traced", design }, seen, [...shape, ...TRACED], null, options)
      : take("baselines.traced", nobody);
  }
  const gnm: NullModel = { kind: "gnm", n, m };
  const degrees: NullModel = {
    kind: "degreePreserving",
    n: kept.people,
    pairs: { a: kept.a, b: kept.b },
    isInterviewed: kept.isInterviewed,
    proposalsPerPair: BURN_IN_PER_PAIR,
  };
  const found: Baselines = {
    ...baselines,
    gnm: await figuresOf(gnm, whole, statistics, classOf, options),
    degreePreserving: await figuresOf(degrees, kept, statistics, keptClasses, options),
  };
  if (!attribute) return found;
  const classes = withMissingClass(attribute.classOf, attribute.values.length);
  const mixing: NullModel = {
    kind: "mixing",
    pairs: { a: whole.a, b: whole.b },
    classOf: classes,
  };
  return { ...found, mixing: await figuresOf(mixing, whole, statistics, classOf, options) };
}
