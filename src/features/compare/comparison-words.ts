import type {
  ComparisonKey,
  ComparisonReason,
  ObservationCaution,
  ObservationState,
  Standing,
} from "../../../shared/core/index.ts";
import { reasonWords } from "../../lib/reason-words.ts";
import { wordFor } from "../../lib/words.ts";

/** What is compared with what. */
export const comparisonWords: Readonly<Record<ComparisonKey, string>> = {
  threshold: "contact pairs per person, seen through the interviews, against the threshold of 1",
  mean_degree_interviewed: "mean number of contact pairs of interviewed people against 1",
  mean_degree_recorded: "mean number of contact pairs on record against 1",
  expected_giant_share: "largest connected group against the share that random mixing would give",
  degree_law: "numbers of contact pairs against the two laws of random mixing",
  largest_group: "largest connected group against random mixing",
  transitivity: "transitivity against random mixing",
  degree_assortativity: "like with like by number of pairs, against random mixing",
  mixing_preserving: "everything against networks that keep who mixes with whom",
  degree_preserving: "everything against networks that keep each person's number of pairs",
  degree_preserving_interviewed_end:
    "everything against networks that keep numbers of pairs and an interviewed person in each pair",
  traced_mixing: "everything against random mixing seen through the same interviews",
};

/** What the screen does with a comparison, in a word. */
export const standingWords: Readonly<Record<Standing, string>> = {
  show: "shown",
  warn: "with a warning",
  grey: "greyed",
  refuse: "refused",
};

const reasons: Readonly<Record<ComparisonReason, string>> = {
  no_one_interviewed: "nobody was interviewed, so nothing says how much of the network was seen",
  not_a_threshold_figure:
    "among traced people this mean runs about 1 too high; it is not made for the threshold",
  recorded_degree_biased:
    "on a record seen only in part this mean is off, too high or too low as it happens",
  coverage_low: "fewer than 90 % of the people were interviewed",
  false_spike_at_one:
    "people who were only named show one pair each, which is the record and not how they live",
  traced_degrees_uneven:
    "people found by tracing differ less in their numbers of pairs than the laws expect, even when " +
    "they mix at random",
  star_shaped_record:
    "people who were only named hang on those who named them, so the record is star-shaped",
  traced_rejects_random_mixing:
    "people found by tracing look unlike random mixing even when they mix at random",
  keeps_truncated_degrees:
    "the numbers of pairs on record are cut short for people who were not interviewed, and this " +
    "would keep the cut",
  no_interviews_to_trace: "the network is taken as complete; there are no interviews to go through",
  too_few_people: "fewer than 30 people, or fewer than 30 of them interviewed",
  free_range: "the exposures are not those of one preset window",
  recall_unknown: "how many contacts were forgotten is not known",
};

/** Reasons why a baseline was not drawn or has no random networks, beside those of the table. */
const baselineReasons: Readonly<Record<string, string>> = {
  no_attribute: "no attribute was chosen",
  few_replicates: "too few random networks were drawn in the time there was",
  attribute_empty: "nobody here has a value of this attribute",
  needs_whole_record:
    "it needs everybody on record, not interviewed people alone: ask for “all on record”",
  only_graph: "only one network has these numbers of pairs",
};

/** Why a comparison is warned of, greyed or refused. */
export function comparisonReason(code: string): string {
  if (code in reasons) return reasons[code as ComparisonReason];
  if (code in baselineReasons) return wordFor(baselineReasons, code);
  return reasonWords(code) ?? "no reason was given";
}

/** How the network came about. */
export const observationWords: Readonly<Record<ObservationState, string>> = {
  complete: "taken as complete: every contact pair is on record",
  covered: "nearly everybody was interviewed (90 % or more)",
  sampled: "interviewed people were chosen at random, and the network is the one among them",
  sampled_with_named: "interviewed people were chosen at random; others were only named",
  traced: "people were found by tracing",
  unseen: "nobody was interviewed",
};

const cautions: Readonly<Record<ObservationCaution, string>> = {
  coverage_partial: "Not everybody was interviewed; pairs between two others are not on record.",
  recall_unknown: "How many contacts were forgotten is not known; figures of pairs are too low.",
  group_exposures_open: "Group exposures that could not be named are in no figure here.",
};

/** What to print beside every comparison; undefined for a code without words. */
export function cautionWords(code: string): string | undefined {
  return code in cautions ? cautions[code as ObservationCaution] : undefined;
}
