import type { SettingKey } from "../../../shared/contracts/settings.ts";

/** What is said about a setting where it is set. */
export type SettingNote = {
  /** Name of the setting, as it starts a sentence. */
  label: string;
  unit?: string;
  /** What it does: stands under the box. */
  does: string;
  /** Which figures and lists follow from it. */
  uses?: string;
  /** Values others used, with who published them. Examples, never a recommendation. */
  examples?: readonly string[];
};

/** Every setting: what it does, what uses it, and published examples (methods A.2, A.6, B10, F.1). */
export const SETTING_NOTES: Readonly<Record<SettingKey, SettingNote>> = {
  name: {
    label: "Name",
    does: "Shown in the header of every page and on reports. No name of a person or a patient.",
    uses: "headers, reports, invitations by e-mail.",
  },
  invented: {
    label: "Invented data",
    does: "Marks every page as invented. Demo accounts can work in invented data only.",
    uses: "the mark in the frame of every page.",
  },
  timeZone: {
    label: "Time zone",
    does: "Decides which calendar day an entry belongs to and when today begins.",
    uses: "today’s due list, days on which something was entered, cut-off times, reports as of a day. Days that were typed stay as typed.",
  },
  countryCode: {
    label: "Country of telephone numbers",
    does: "Two letters, such as GB: how a number without a country prefix is read.",
    uses: "search by telephone, and finding people who may be on record twice. Numbers on record are not written anew.",
  },
  populationAtRisk: {
    label: "Population at risk",
    unit: "people",
    does: "Everybody who could have been met, on record or not. Blank: not declared.",
    uses: "the two thresholds of Review and Compare, and comparison with random mixing in the whole population. Nothing of who is on record changes.",
  },
  caseDefinition: {
    label: "Wording of the case definition",
    does: "Clinical, laboratory and epidemiological criteria with limits of person, place and time.",
    uses: "every classification, which shows it. A change makes a new version; each classification keeps the version it was made with.",
  },
  caseRules: {
    label: "Rules by class",
    does: "All that is ticked must be on record. Asked from the top; the first class that is met is it.",
    uses: "the count of people whose class differs from the rules. Nobody is classed anew by a change: a person decides.",
    examples: [
      "Usual pattern: suspected by clinical criteria; probable by clinical criteria and an epidemiological link; confirmed by laboratory criteria. Some bodies say “possible” for suspected.",
    ],
  },
  incubationMin: {
    label: "Shortest incubation",
    unit: "days",
    does: "From infection to onset, at least.",
    uses: "the source window of a case: the days in which it may have been infected, counted back from onset.",
    examples: ["Ebola disease 2 to 21 days (WHO)", "COVID-19 1 to 14 days (ECDC 2020)"],
  },
  incubationMax: {
    label: "Longest incubation",
    unit: "days",
    does: "From infection to onset, at most. Also sets how far back an interview asks.",
  },
  infectiousBefore: {
    label: "Infectious before onset",
    unit: "days",
    does: "The day of onset is day 0. With no onset, days count from the first positive specimen.",
    uses: "the infectious window: which contact pairs count in groups, indicators and the network report, and which days an interview asks about.",
    examples: [
      "COVID-19: from 2 days before to 14 days after onset (WHO guidance)",
      "Ebola disease: from onset, so 0 days before (WHO)",
    ],
  },
  infectiousAfter: {
    label: "Infectious after onset",
    unit: "days",
    does: "The window ends earlier when isolation begins earlier.",
  },
  monitoringDays: {
    label: "Monitoring period",
    unit: "days",
    does: "Due days of a contact: day 1 is the day after the last exposure.",
    uses: "today’s round in Follow, follow-ups that are completed, work still to come.",
    examples: ["Ebola disease 21 days (WHO)", "COVID-19 14 days (2020 guidance)"],
  },
  lostAfterDays: {
    label: "Lost after",
    unit: "due days in a row",
    does: "A contact not reached on this many due days in a row counts as lost to follow-up.",
    uses: "states in Follow, the share lost to follow-up, the arc of a person’s mark.",
    examples: [
      "“Non-responsive” after at least one attempt on each of 3 days in a row (Lash and others, MMWR 2020). There is no universal number.",
    ],
  },
  symptoms: {
    label: "Symptoms to ask about",
    does: "Offered beside today’s check, in this order. A label may be mended at any time.",
    uses: "checks in Follow. A symptom that is removed stays on the checks that reported it, and is no longer offered.",
  },
  clusterWindowDays: {
    label: "Cluster window W",
    unit: "days",
    does: "Two cases with a contact pair or a place in common are joined when their onsets (or specimens) lie no further apart.",
    uses: "proposed clusters in Review. A proposal is not a finding: an epidemiologist decides what a cluster is.",
    examples: [
      "2 or more test-confirmed cases in a setting within 14 days (Public Health England)",
      "2 or more confirmed, or 1 confirmed with a compatible illness (HPSC Ireland 2020)",
      "3 or more linked cases in 14 days (workplace rule, California)",
    ],
  },
  clusterMinimumCases: {
    label: "Smallest cluster",
    unit: "cases",
    does: "Fewer joined cases than this are not proposed as a cluster.",
  },
  closureDays: {
    label: "Closure",
    unit: "days without a new case",
    does: "Blank: twice the longest incubation. Counted from the last case’s onset (or specimen).",
    uses: "clusters that show as quiet and ready to be looked at. No cluster closes by itself: a person closes it, once follow-ups, tests and unlinked cases are done.",
    examples: [
      "14 days for an outbreak on a ward (NHS Scotland)",
      "Ebola disease 42 days, twice the longest incubation (WHO 2015)",
    ],
  },
  exposureGrading: {
    label: "Exposure grading",
    does: "Any one of these makes an exposure high-risk.",
    uses: "the grade beside contact pairs and contacts, and their order in Follow.",
    examples: [
      "1 metre and 15 minutes (WHO and Africa CDC 2020)",
      "2 metres (ECDC 2020)",
      "Bodies disagree, so the cut-offs are set here and printed with what is graded.",
    ],
  },
  smallCellThreshold: {
    label: "Smallest count shown",
    unit: "people",
    does: "In tables that leave the team, counts from 1 up to one below this are left out. Never below 5.",
    uses: "exports and public tables. The team’s own pages show every count.",
    examples: [
      "Three or five, by agency (OECD and UNECE glossary 2005)",
      "Ten (ONS Longitudinal Study)",
      "Counts under ten left out (Washington State)",
    ],
  },
  texts: {
    label: "Texts for people",
    does: "Approved wording to read out or hand over, by language. Say nothing that gives away who the case is.",
    uses: "whoever speaks with cases and contacts, in the language that is needed.",
  },
};

/** Name of a setting inside a table. */
export function settingLabel(setting: SettingKey): string {
  return SETTING_NOTES[setting].label;
}
