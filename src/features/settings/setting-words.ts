import {
  type CaseRules,
  type ExposureGrading,
  SETTING_SHAPES,
  type SettingKey,
  type SettingTexts,
  type SymptomList,
} from "../../../shared/contracts/settings.ts";
import { CASE_CLASSIFICATIONS } from "../../../shared/vocabulary.ts";
import { formatNumber } from "../../lib/formatters.ts";
import { settingWords as placeWords } from "../../lib/words.ts";
import { languageName } from "./language-name.ts";
import { SETTING_NOTES } from "./setting-notes.ts";

export const criteriaWords = {
  laboratory: "a positive test",
  clinical: "an onset of symptoms",
  link: "a contact pair with a confirmed or probable case",
} as const;
export type Criterion = keyof typeof criteriaWords;
export const CRITERIA = Object.keys(criteriaWords) as Criterion[];

export const textKindWords = { advice: "Advice", consent: "Consent" } as const;

/** "a, b and c". */
export function joined(words: readonly string[], last = "and"): string {
  if (words.length < 2) return words.join("");
  return `${words.slice(0, -1).join(", ")} ${last} ${words.at(-1)}`;
}

/** One class's rule as a sentence. */
function ruleWords(rules: CaseRules, one: keyof CaseRules): string {
  const ticked = CRITERIA.filter((criterion) => rules[one][criterion]);
  const what = ticked.map((criterion) => criteriaWords[criterion]);
  return `${one}: ${what.length === 0 ? "nobody (nothing is ticked)" : joined(what)}`;
}

/** The grading as one sentence; numbers as they stand, so that a half-typed one shows as such. */
export function gradingSentence(
  grading: Omit<ExposureGrading, "highMinutes" | "highDistanceM"> & {
    highMinutes: number | string;
    highDistanceM: number | string;
  },
): string {
  const number = (value: number | string) =>
    typeof value === "number"
      ? formatNumber(value, { decimals: Number.isInteger(value) ? 0 : 1 })
      : value.trim() || "…";
  const places = grading.highSettings.map((setting) => placeWords[setting]);
  const parts = [
    ...(grading.physicalIsHigh ? ["direct physical contact"] : []),
    ...(places.length > 0 ? [`any exposure in the setting ${joined(places, "or")}`] : []),
    `at least ${number(grading.highMinutes)} min no further apart than ${number(grading.highDistanceM)} m`,
  ];
  return (
    `High-risk: ${joined(parts, "or")}. Otherwise low-risk, ` +
    "or not known where duration or distance decides and is not on record."
  );
}

const asShipped: Partial<Record<SettingKey, string>> = {
  populationAtRisk: "not declared",
  closureDays: "twice the longest incubation",
  exposureGrading: "as shipped",
  symptoms: "as shipped",
  texts: "none",
};

/** Writers of the values that are no plain text or number. */
const writers: { [K in SettingKey]?: (value: never) => string } = {
  invented: (value: boolean) => (value ? "yes, invented" : "no, real"),
  caseRules: (value: CaseRules) =>
    CASE_CLASSIFICATIONS.map((one) => ruleWords(value, one)).join("\n"),
  exposureGrading: (value: ExposureGrading) => gradingSentence(value),
  symptoms: (value: SymptomList) => value.map(({ label }) => label).join(", "),
  texts: (value: SettingTexts) =>
    value.length === 0
      ? "none"
      : value
          .map(({ kind, language }) => `${textKindWords[kind]} in ${languageName(language)}`)
          .join(", "),
};

/**
 * A stored value in words. What does not fit the setting any more (a list of another time) is said
 * to be so, since history keeps values of all times.
 */
export function settingValueWords(setting: SettingKey, value: unknown): string {
  if (value === null || value === undefined) return asShipped[setting] ?? "—";
  const parsed = SETTING_SHAPES[setting].safeParse(value);
  if (!parsed.success) return "a value of another kind";
  const write = writers[setting] as ((value: unknown) => string) | undefined;
  if (write) return write(parsed.data);
  if (typeof parsed.data === "number") {
    const unit = SETTING_NOTES[setting].unit;
    return unit ? `${formatNumber(parsed.data)} ${unit}` : formatNumber(parsed.data);
  }
  return parsed.data === "" ? "none" : String(parsed.data);
}
