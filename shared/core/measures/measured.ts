/** Why a figure is undefined, or why a verdict is withheld. The words for the screen live there. */
export type UndefinedReason =
  | "no_people"
  | "one_person"
  | "no_two_paths"
  | "equal_degrees"
  | "one_group"
  | "one_in_group"
  | "no_one_interviewed"
  | "too_few_people"
  | "free_range"
  | "coverage_low"
  | "recall_unknown"
  | "recall_low"
  | "no_double_reports"
  | "no_pairs"
  | "no_overlap"
  | "no_contacts_followed"
  | "no_group_or_contact"
  | "no_rows"
  | "no_values"
  | "one_value"
  | "values_all_equal"
  | "values_not_positive"
  | "no_cases"
  | "no_offspring"
  | "no_overdispersion"
  | "zero_count"
  | "too_few_days"
  | "growth_unbounded"
  | "all_pairs"
  | "at_threshold"
  | "not_above_threshold"
  | "not_below_threshold"
  | "no_further_pairs"
  | "too_many_people"
  | "no_reachable_pairs"
  | "fewer_than_three_people"
  | "not_converged"
  | "sample_too_small";

/** A value, or `null` with the reason; never NaN, and never 0 standing in for "undefined". */
export type Measured<T = number> =
  | { readonly value: T; readonly reason: null }
  | { readonly value: null; readonly reason: UndefinedReason };

/** Wraps a defined value. */
export function defined<T>(value: T): Measured<T> {
  return { value, reason: null };
}

/** Wraps an undefined value with its reason. */
export function undefinedBecause(reason: UndefinedReason): {
  readonly value: null;
  readonly reason: UndefinedReason;
} {
  return { value: null, reason };
}
