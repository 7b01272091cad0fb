import type { UndefinedReason } from "../../shared/core/index.ts";

const words: Record<UndefinedReason, string> = {
  no_people: "there are no people in this population",
  one_person: "there is only one person in this population",
  no_two_paths: "nobody here has two contact pairs",
  equal_degrees: "everyone with a contact pair has equally many",
  one_group: "everyone, or every contact pair, is in one group",
  one_in_group: "the group has one person only",
  no_one_interviewed: "nobody has been interviewed",
  too_few_people: "fewer than 30 people, or fewer than 30 of them interviewed",
  free_range:
    "the exposures are not those of one preset window; any network passes 1 if the range is widened",
  coverage_low: "fewer than 90 % of the people were interviewed",
  recall_unknown: "without a recall estimate the figure is a lower bound",
  recall_low: "corrected for recall, the figure may reach the threshold",
  no_double_reports: "no contact pair was told by both of its people",
  no_overlap: "nobody stands on both lists",
  no_contacts_followed: "no contact was followed to an outcome",
  no_group_or_contact: "no group exposure and no contact is on record",
  no_rows: "the table has no rows",
  no_values: "there are no values",
  one_value: "there is only one value",
  values_all_equal: "all values are equal",
  values_not_positive: "a value is zero or negative",
  no_cases: "there are no cases",
  no_offspring: "no case is known to have infected anyone",
  no_overdispersion: "no over-dispersion detectable: the counts vary no more than chance alone",
  zero_count: "a day has no case, and the log of 0 does not exist",
  too_few_days: "there are too few days",
  growth_unbounded: "all cases fall on the first or the last day",
  no_pairs: "no contact pair is on record here",
  all_pairs: "everyone here is in a contact pair with everyone else",
  at_threshold: "it grows without bound at the threshold",
  not_above_threshold: "it has a meaning above the threshold only",
  not_below_threshold: "it has a meaning below the threshold only",
  no_further_pairs: "nobody who is reached has a further contact pair",
  too_many_people: "there are too many people to work it out exactly",
  no_reachable_pairs: "nobody here is connected to anybody",
  fewer_than_three_people: "there are fewer than three people in this population",
  not_converged: "the calculation did not settle within its limit of steps",
  sample_too_small: "nobody in the sample drawn is connected to anybody",
};

/** Why a figure is missing or its verdict withheld, in words; undefined without a reason. */
export function reasonWords(code: string | undefined): string | undefined {
  if (code === undefined) return undefined;
  return code in words ? words[code as UndefinedReason] : "it could not be worked out";
}
