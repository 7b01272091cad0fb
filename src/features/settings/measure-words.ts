import type { SettingMeasure } from "../../../shared/contracts/settings.ts";
import { formatNumber } from "../../lib/formatters.ts";

/** What is counted, in words that follow "how many". */
export const measureWords: Readonly<Record<SettingMeasure, string>> = {
  pairs_in_window: "contact pairs with an exposure in an infectious window",
  source_pairs_in_window: "contact pairs with an exposure in a source window",
  contacts_due_today: "contacts due today",
  follow_ups_ended: "follow-ups at their end",
  follow_ups_lost: "contacts lost to follow-up",
  proposed_clusters: "proposed clusters",
  cases_in_clusters: "cases in proposed clusters",
  clusters_quiet: "clusters that are quiet",
  pairs_high_risk: "contact pairs graded high-risk",
  pairs_low_risk: "contact pairs graded low-risk",
  pairs_grade_unknown: "contact pairs whose grade is not known",
  cases_meeting_confirmed: "people who meet the rule of a confirmed case",
  cases_meeting_probable: "people who meet the rule of a probable case",
  cases_meeting_suspected: "people who meet the rule of a suspected case",
  classes_that_differ: "people whose class differs from what the rules give",
  checks_with_removed_symptoms: "checks that report a symptom no longer offered",
  entries_on_another_day: "entries that fall on another calendar day",
  phones_of_the_country: "telephone numbers read as of this country",
};

/** "12 more", "3 fewer", "stays". */
export function differenceWords(before: number, after: number): string {
  if (after === before) return "stays";
  return `${formatNumber(Math.abs(after - before))} ${after > before ? "more" : "fewer"}`;
}
