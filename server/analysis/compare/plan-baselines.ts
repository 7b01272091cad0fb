import { BASELINES, type Baseline } from "../../../shared/contracts/compare.ts";
import {
  BURN_IN_PER_PAIR,
  buildGraph,
  type ComparisonKey,
  type NullModel,
  onlyGraph,
  type ReplicatePlan,
  type Standing,
  type Statistic,
} from "../../../shared/core/index.ts";
import type { CompareInput } from "./compare-input.ts";
import { type Observation, observe } from "./observe.ts";

export type Parameters = Record<string, number | string | null>;

/** A baseline as it is drawn, or why it is not. */
export type PlannedBaseline = {
  readonly baseline: Baseline;
  readonly standing: Standing;
  readonly reasons: readonly string[];
  readonly parameters: Parameters;
  /** Null = not drawn. */
  readonly plan: ReplicatePlan | null;
};

/** Whose rule says what may be done with a baseline. */
const RULE: Record<Baseline, ComparisonKey> = {
  traced: "traced_mixing",
  // Largest group, transitivity and assortativity have one rule.
  gnm: "largest_group",
  degreePreserving: "degree_preserving",
  degreePreservingInterviewedEnd: "degree_preserving_interviewed_end",
  mixing: "mixing_preserving",
};

const DEGREES: readonly Statistic[] = ["isolates", "meanDegree", "degreeVariance", "maxDegree"];

/**
 * Figures that a baseline holds fixed, or that say nothing on what it draws: there is nothing to
 * compare. Among interviewed people alone the mean degree varies although the pairs are fixed.
 */
export function heldFixed(baseline: Baseline, observation: Observation): readonly Statistic[] {
  const everyone = observation.network.isInterviewed === null;
  const meanDegree: readonly Statistic[] = everyone ? ["meanDegree"] : [];
  switch (baseline) {
    case "traced":
      // The people who are drawn are not those of the record: they have no attribute.
      return ["attributeAssortativity", "ei", "modularity"];
    case "gnm":
      return ["people", "pairs", ...meanDegree];
    case "degreePreserving":
    case "degreePreservingInterviewedEnd":
      return ["people", "pairs", ...DEGREES];
    case "mixing":
      return observation.attribute === "household"
        ? ["people", "pairs", ...meanDegree, "ei"]
        : ["people", "pairs", ...meanDegree, "attributeAssortativity", "ei", "modularity"];
  }
}

/** True where the curve of degrees is that of the observed network in every draw. */
export function keepsDegrees(baseline: Baseline): boolean {
  return baseline === "degreePreserving" || baseline === "degreePreservingInterviewedEnd";
}

type Model = { model: NullModel; parameters: Parameters } | { refused: string };

function tracedModel({ design }: Observation, input: CompareInput): Model {
  if (input.population === "interviewed") return { refused: "needs_whole_record" };
  if (design === null) return { refused: "no_interviews_to_trace" };
  return {
    model: { kind: "traced", design },
    parameters: {
      population: design.population,
      interviews: design.interviews,
      p: design.pairProbability,
      q: design.recall,
      sigma: design.tracedShare,
    },
  };
}

function degreeModel({ network }: Observation, withInterviewedEnd: boolean): Model {
  const { people: n, a, b, length, isInterviewed } = network;
  const rule = withInterviewedEnd ? isInterviewed : null;
  if (onlyGraph(buildGraph(n, { a, b }, length), rule)) return { refused: "only_graph" };
  return {
    model: {
      kind: "degreePreserving",
      n,
      pairs: { a, b },
      isInterviewed: rule,
      proposalsPerPair: BURN_IN_PER_PAIR,
      seen: isInterviewed,
    },
    // Each draw starts from the observed network, so there is no thinning between draws.
    parameters: {
      pairs: length,
      burnIn: BURN_IN_PER_PAIR * length,
      burnInPerPair: BURN_IN_PER_PAIR,
    },
  };
}

function mixingModel({ network, classOf, attribute }: Observation, input: CompareInput): Model {
  if (attribute === null || classOf === null) return { refused: "no_attribute" };
  if (input.classes.length === 0) return { refused: "attribute_empty" };
  const { a, b, isInterviewed: seen } = network;
  const missing = classOf.reduce((count, label) => count + (label < 0 ? 1 : 0), 0);
  const parameters = { attribute, classes: input.classes.length, missing };
  if (attribute === "household") {
    const model: NullModel = { kind: "household", pairs: { a, b }, householdOf: classOf, seen };
    return { model, parameters };
  }
  // People without a value are a class of their own.
  const classes = classOf.map((label) => (label < 0 ? input.classes.length : label));
  return { model: { kind: "mixing", pairs: { a, b }, classOf: classes, seen }, parameters };
}

function modelOf(baseline: Baseline, observation: Observation, input: CompareInput): Model {
  const { people: n, length: m, isInterviewed: seen } = observation.network;
  if (n < 2) return { refused: "too_few_people" };
  switch (baseline) {
    case "traced":
      return tracedModel(observation, input);
    case "gnm":
      return { model: { kind: "gnm", n, m, seen }, parameters: { people: n, pairs: m } };
    case "degreePreserving":
      return degreeModel(observation, false);
    case "degreePreservingInterviewedEnd":
      return degreeModel(observation, true);
    case "mixing":
      return mixingModel(observation, input);
  }
}

/**
 * What is drawn for a comparison, baseline by baseline, and what is greyed or refused, and why. A
 * greyed baseline is drawn: its figures stand on the screen without a verdict.
 */
export function planBaselines(input: CompareInput, seed: number): PlannedBaseline[] {
  const observation = observe(input);
  return BASELINES.map((baseline): PlannedBaseline => {
    const { standing, reasons } = observation.judged.judgements[RULE[baseline]];
    if (standing === "refuse") {
      return { baseline, standing, reasons, parameters: {}, plan: null };
    }
    const made = modelOf(baseline, observation, input);
    if ("refused" in made) {
      const why = [made.refused, ...reasons];
      return { baseline, standing: "refuse", reasons: why, parameters: {}, plan: null };
    }
    const attribute = baseline === "traced" ? null : observation.choice.attribute;
    const plan = { ...observation.choice, attribute, seed, model: made.model };
    return { baseline, standing, reasons, parameters: made.parameters, plan };
  });
}
