import { checkCount } from "./check-count.ts";
import {
  COMPARABILITY,
  type ComparisonKey,
  type ComparisonReason,
  type ObservationState,
  type Standing,
} from "./comparability-table.ts";
import { FEWEST_FOR_VERDICT, FULL_COVERAGE } from "./threshold.ts";

export type ObservationDescription = {
  /** People of the chosen population: at risk when declared, else on record. */
  readonly n: number;
  /** i, interviewed people among them. */
  readonly interviewed: number;
  /** The file was declared complete; then `interviewed` does not matter. */
  readonly complete: boolean;
  /** Interviewed people were chosen independently of the network (a random sample). */
  readonly interviewedAtRandom: boolean;
  /** Whom the network holds: everyone on record, or interviewed people alone. */
  readonly network: "everyone" | "interviewed";
  /** The exposures lie in one preset window. */
  readonly presetWindow: boolean;
  /** The population is "all on record", into which people come by being named. */
  readonly coverageRequired: boolean;
  /** q̂, or null. */
  readonly recall: number | null;
  /** Share of contacts that are still a head count, or null when there are none at all. */
  readonly unresolvedShare: number | null;
};

export type Judgement = {
  readonly standing: Standing;
  /** Most weighty first; empty with `show`. */
  readonly reasons: readonly ComparisonReason[];
  /** What to look at instead, or null. */
  readonly instead: ComparisonKey | null;
};

/** What to print beside every comparison, whatever its standing. */
export type ObservationCaution = "coverage_partial" | "recall_unknown" | "group_exposures_open";

export type Comparability = {
  readonly state: ObservationState;
  /** i/n; null without people or for a complete file. */
  readonly coverage: number | null;
  /** The baseline shown first; null when nothing was seen. */
  readonly firstBaseline: "random_mixing" | "traced_mixing" | null;
  readonly judgements: Readonly<Record<ComparisonKey, Judgement>>;
  readonly cautions: readonly ObservationCaution[];
};

function stateOf(seen: ObservationDescription): ObservationState {
  if (seen.complete) return "complete";
  if (seen.interviewed === 0) return "unseen";
  if (seen.interviewed / seen.n >= FULL_COVERAGE) return "covered";
  if (!seen.interviewedAtRandom) return "traced";
  return seen.network === "interviewed" ? "sampled" : "sampled_with_named";
}

/** The threshold figure stands, but what may be said with it depends on numbers and window. */
function thresholdJudgement(seen: ObservationDescription, state: ObservationState): Judgement {
  const reasons: ComparisonReason[] = [];
  const interviewed = state === "complete" ? seen.n : seen.interviewed;
  if (Math.min(seen.n, interviewed) < FEWEST_FOR_VERDICT) reasons.push("too_few_people");
  if (!seen.presetWindow) reasons.push("free_range");
  if (seen.coverageRequired && state !== "complete" && state !== "covered") {
    reasons.push("coverage_low");
  }
  const withheld = reasons.length > 0;
  if (state !== "complete" && seen.recall === null) reasons.push("recall_unknown");
  const standing = withheld ? "grey" : reasons.length > 0 ? "warn" : "show";
  return { standing, reasons, instead: null };
}

function cautionsOf(seen: ObservationDescription, state: ObservationState): ObservationCaution[] {
  const cautions: ObservationCaution[] = [];
  if (state !== "complete" && seen.interviewed < seen.n) cautions.push("coverage_partial");
  if (state !== "complete" && seen.recall === null) cautions.push("recall_unknown");
  if ((seen.unresolvedShare ?? 0) > 0) cautions.push("group_exposures_open");
  return cautions;
}

function check(seen: ObservationDescription): void {
  checkCount("n", seen.n);
  checkCount("interviewed", seen.interviewed);
  if (seen.interviewed > seen.n) throw new RangeError("interviewed cannot exceed n");
  if (seen.recall !== null && !(seen.recall > 0 && seen.recall <= 1)) {
    throw new RangeError("recall must lie in (0, 1]");
  }
  if (seen.unresolvedShare !== null && !(seen.unresolvedShare >= 0 && seen.unresolvedShare <= 1)) {
    throw new RangeError("unresolvedShare must lie in 0 … 1");
  }
}

/**
 * What may be compared with what, given how the network was seen: for each comparison whether it is
 * shown, shown with a warning, greyed or refused, and why.
 *
 * Screen logic: coverage of at least 90 %, or people interviewed at random → random mixing, degree-
 * and mixing-preserving baselines; otherwise traced random mixing comes first and the others are
 * grey. Readings chosen where the method leaves room:
 * - at random means: in the network *among* interviewed people; with people who were only named in
 *   it the record is star-shaped, and traced random mixing comes first there too;
 * - plain degree-preserving swaps on a traced record are refused, not greyed, since the form that
 *   keeps an interviewed end takes their place, with a label;
 * - the threshold is grey when its verdict is withheld and carries a warning while recall is
 *   unknown, for then it is a lower bound.
 *
 * @throws RangeError for counts that are none, i > n, or shares outside their range
 *
 * Edge cases: nobody interviewed and not complete → everything refused. Cost: O(1). Source: methods
 * C.8.5 and the box at the head of C.8.
 */
export function comparability(seen: ObservationDescription): Comparability {
  check(seen);
  const state = stateOf(seen);
  const judge = (key: ComparisonKey): Judgement => {
    const { standing, reason, instead } = COMPARABILITY[key][state];
    if (key === "threshold" && standing === "show") return thresholdJudgement(seen, state);
    return { standing, reasons: reason === null ? [] : [reason], instead };
  };
  const keys = Object.keys(COMPARABILITY) as ComparisonKey[];
  const independent = COMPARABILITY.largest_group[state].standing === "show";
  return {
    state,
    coverage: state === "complete" || seen.n === 0 ? null : seen.interviewed / seen.n,
    firstBaseline: state === "unseen" ? null : independent ? "random_mixing" : "traced_mixing",
    judgements: Object.fromEntries(keys.map((key) => [key, judge(key)])) as Record<
      ComparisonKey,
      Judgement
    >,
    cautions: cautionsOf(seen, state),
  };
}
