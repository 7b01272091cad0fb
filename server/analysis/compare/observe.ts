import type { CompareRun, MixingAttribute } from "../../../shared/contracts/compare.ts";
import {
  type Comparability,
  comparability,
  type SampledNetwork,
  type Statistic,
  type StatisticsChoice,
  type TracedDesign,
  tracedDesign,
} from "../../../shared/core/index.ts";
import type { CompareInput } from "./compare-input.ts";

type Seen = NonNullable<CompareRun["result"]>["seen"];

/** Figures of the table, in the order of the screen; those of mixing only with an attribute. */
const TABLE: readonly Statistic[] = [
  "people",
  "pairs",
  "groups",
  "largestGroup",
  "isolates",
  "meanSmallGroup",
  "sizeSquares",
  "meanDegree",
  "degreeVariance",
  "maxDegree",
  "triangles",
  "transitivity",
  "averageClustering",
  "degreeAssortativity",
];
const MIXING: readonly Statistic[] = ["attributeAssortativity", "ei", "modularity"];

/** Longest and shortest curve of degrees, and the length of that of group sizes. */
const MOST_DEGREE_BINS = 40;
const FEWEST_DEGREE_BINS = 8;
const SIZE_BINS = 12;

/** What is known before anything is drawn. */
export type Observation = {
  readonly network: SampledNetwork;
  readonly choice: StatisticsChoice;
  readonly judged: Comparability;
  /** Null where there is nothing to simulate interviews from. */
  readonly design: TracedDesign | null;
  /** Class of each person, -1 = missing; null without an attribute. */
  readonly classOf: Int32Array | null;
  readonly attribute: MixingAttribute | null;
};

function largestDegree(people: number, a: Int32Array, b: Int32Array): number {
  const degrees = new Int32Array(people);
  let most = 0;
  for (const ends of [a, b]) {
    for (const u of ends) {
      const degree = (degrees[u] as number) + 1;
      degrees[u] = degree;
      if (degree > most) most = degree;
    }
  }
  return most;
}

/** How the network was seen, as the rules of comparison ask for it. */
function judge(input: CompareInput): Comparability {
  const contacts = input.unresolvedGroupExposures + input.pairs.a.length;
  return comparability({
    n: input.n,
    interviewed: input.interviewedPeople,
    complete: input.complete,
    // The record does not say that people were drawn by lot, so they count as found by tracing.
    interviewedAtRandom: false,
    network: input.population === "interviewed" ? "interviewed" : "everyone",
    presetWindow: input.presetWindow,
    coverageRequired: input.population !== "interviewed",
    recall: input.recall,
    unresolvedShare: contacts === 0 ? null : input.unresolvedGroupExposures / contacts,
  });
}

/** Sets up the observed network, what is measured on it and on each drawn one, and the rules. */
export function observe(input: CompareInput): Observation {
  const people = input.studyNumbers.length;
  const a = Int32Array.from(input.pairs.a);
  const b = Int32Array.from(input.pairs.b);
  const isInterviewed = input.interviewed && Uint8Array.from(input.interviewed);
  const classOf = input.classOf && Int32Array.from(input.classOf);
  const bins = largestDegree(people, a, b) + 2;
  const design =
    isInterviewed === null
      ? null
      : tracedDesign({
          population: Math.max(input.n, people),
          people,
          order: Int32Array.from(input.order),
          tellings: { a: Int32Array.from(input.tellings.a), b: Int32Array.from(input.tellings.b) },
          directed: true,
          recall: input.recall,
        });
  return {
    network: { people, a, b, length: a.length, isInterviewed },
    choice: {
      statistics: classOf ? [...TABLE, ...MIXING] : TABLE,
      degreeBins: Math.min(MOST_DEGREE_BINS, Math.max(FEWEST_DEGREE_BINS, bins)),
      sizeBins: SIZE_BINS,
      attribute: classOf,
    },
    judged: judge(input),
    design,
    classOf,
    attribute: input.attribute,
  };
}

/** What the screen states before any comparison. */
export function seenOf(input: CompareInput, judged: Comparability): Seen {
  const named = input.namedByBoth + input.namedByOne;
  return {
    state: judged.state,
    n: input.n,
    interviewed: input.interviewedPeople,
    coverage: judged.coverage,
    doubleNamedShare: named === 0 ? null : input.namedByBoth / named,
    recall: input.recall,
    unresolvedGroupExposures: input.unresolvedGroupExposures,
    undated: input.undated,
    leftOutPeople: input.leftOutPeople,
    leftOutPairs: input.leftOutPairs,
    cautions: [...judged.cautions],
  };
}
