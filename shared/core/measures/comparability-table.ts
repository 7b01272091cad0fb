/**
 * What may be done with a figure or comparison: shown; shown with a warning or label; shown grey
 * with its reason (a number without a verdict, a baseline that does not fit); refused.
 */
export type Standing = "show" | "warn" | "grey" | "refuse";

/** How the network on record came about, as far as comparisons care. */
export type ObservationState =
  /** Declared complete: every pair is on record. */
  | "complete"
  /** At least 90 % of the people interviewed. */
  | "covered"
  /** Interviewed people chosen at random, and the network is the one among them. */
  | "sampled"
  /** Chosen at random, but the network also holds people who were only named. */
  | "sampled_with_named"
  /** Anything else: people found by tracing. */
  | "traced"
  /** Nobody interviewed, and not declared complete. */
  | "unseen";

/** What is compared, and with what. */
export type ComparisonKey =
  | "threshold"
  | "mean_degree_interviewed"
  | "mean_degree_recorded"
  | "expected_giant_share"
  | "degree_law"
  | "largest_group"
  | "transitivity"
  | "degree_assortativity"
  | "mixing_preserving"
  | "degree_preserving"
  | "degree_preserving_interviewed_end"
  | "traced_mixing";

/** Why; the words for the screen live there. */
export type ComparisonReason =
  | "no_one_interviewed"
  | "not_a_threshold_figure"
  | "recorded_degree_biased"
  | "coverage_low"
  | "false_spike_at_one"
  | "traced_degrees_uneven"
  | "star_shaped_record"
  | "traced_rejects_random_mixing"
  | "keeps_truncated_degrees"
  | "no_interviews_to_trace"
  | "too_few_people"
  | "free_range"
  | "recall_unknown";

export type ComparisonRule = {
  readonly standing: Standing;
  readonly reason: ComparisonReason | null;
  /** What to look at instead, or null. */
  readonly instead: ComparisonKey | null;
};

export type ComparisonRow = Readonly<Record<ObservationState, ComparisonRule>>;

const SHOW: ComparisonRule = { standing: "show", reason: null, instead: null };

const rule = (
  standing: Standing,
  reason: ComparisonReason,
  instead: ComparisonKey | null = null,
): ComparisonRule => ({ standing, reason, instead });

const UNSEEN = rule("refuse", "no_one_interviewed");

/** The rule of the induced subgraph: valid among people interviewed independently of the network. */
const INDUCED: ComparisonRow = {
  complete: SHOW,
  covered: SHOW,
  sampled: SHOW,
  sampled_with_named: rule("grey", "star_shaped_record", "traced_mixing"),
  traced: rule("grey", "traced_rejects_random_mixing", "traced_mixing"),
  unseen: UNSEEN,
};

const NOT_A_THRESHOLD_FIGURE = rule("refuse", "not_a_threshold_figure", "threshold");
const RECORDED_DEGREE = rule("refuse", "recorded_degree_biased", "threshold");
const GIANT_SHARE = rule("grey", "coverage_low", "traced_mixing");

/**
 * Which comparison is valid for which observation. Source: methods, table of C.8.5 and the box at
 * the head of C.8; own simulation behind it: at the 5 % level traced networks of people who mix at
 * random are called non-random by assortativity 60–67 % of the time and by their largest group
 * always, and 0–5 % of the time by traced random mixing.
 */
export const COMPARABILITY: Readonly<Record<ComparisonKey, ComparisonRow>> = {
  // The figure itself is made for interviews; whether a verdict goes with it is decided apart.
  threshold: {
    complete: SHOW,
    covered: SHOW,
    sampled: SHOW,
    sampled_with_named: SHOW,
    traced: SHOW,
    unseen: UNSEEN,
  },
  // Never against 1: among traced people it is too high by about 1.
  mean_degree_interviewed: {
    complete: NOT_A_THRESHOLD_FIGURE,
    covered: NOT_A_THRESHOLD_FIGURE,
    sampled: NOT_A_THRESHOLD_FIGURE,
    sampled_with_named: NOT_A_THRESHOLD_FIGURE,
    traced: NOT_A_THRESHOLD_FIGURE,
    unseen: UNSEEN,
  },
  // 100 of 1000 interviewed at random: true 0.5 shows as 0.66, 1 as 1.02, 5 as 2.09.
  mean_degree_recorded: {
    complete: SHOW,
    covered: RECORDED_DEGREE,
    sampled: RECORDED_DEGREE,
    sampled_with_named: RECORDED_DEGREE,
    traced: RECORDED_DEGREE,
    unseen: UNSEEN,
  },
  expected_giant_share: {
    complete: SHOW,
    covered: SHOW,
    sampled: GIANT_SHARE,
    sampled_with_named: GIANT_SHARE,
    traced: GIANT_SHARE,
    unseen: UNSEEN,
  },
  degree_law: {
    complete: SHOW,
    covered: SHOW,
    sampled: SHOW,
    sampled_with_named: rule("grey", "false_spike_at_one", "traced_mixing"),
    traced: rule("grey", "traced_degrees_uneven", "traced_mixing"),
    unseen: UNSEEN,
  },
  largest_group: INDUCED,
  transitivity: INDUCED,
  degree_assortativity: INDUCED,
  mixing_preserving: INDUCED,
  degree_preserving: {
    complete: SHOW,
    covered: SHOW,
    sampled: SHOW,
    sampled_with_named: rule(
      "refuse",
      "keeps_truncated_degrees",
      "degree_preserving_interviewed_end",
    ),
    traced: rule("refuse", "keeps_truncated_degrees", "degree_preserving_interviewed_end"),
    unseen: UNSEEN,
  },
  // Where every pair is seen the restriction changes nothing worth a warning.
  degree_preserving_interviewed_end: {
    complete: rule("refuse", "no_interviews_to_trace", "degree_preserving"),
    covered: SHOW,
    sampled: SHOW,
    sampled_with_named: rule("warn", "keeps_truncated_degrees", "traced_mixing"),
    traced: rule("warn", "keeps_truncated_degrees", "traced_mixing"),
    unseen: UNSEEN,
  },
  traced_mixing: {
    complete: rule("refuse", "no_interviews_to_trace"),
    covered: SHOW,
    sampled: SHOW,
    sampled_with_named: SHOW,
    traced: SHOW,
    unseen: UNSEEN,
  },
};
