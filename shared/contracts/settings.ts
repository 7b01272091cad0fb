import { z } from "zod";
import { CASE_CLASSIFICATIONS, SETTINGS, SYMPTOMS } from "../vocabulary.ts";
import { LIMITS, listOf, rowVersion, text, uuid } from "./common.ts";

/** A number left blank is needed; only what is there can be no number. */
const numberCode = (issue: { input?: unknown }) =>
  issue.input === "" || issue.input === null || issue.input === undefined
    ? "required"
    : "not_a_number";

const whole = (min: number, max: number) =>
  z
    .number({ error: numberCode })
    .int({ error: "not_a_whole_number" })
    .min(min, { error: "too_small" })
    .max(max, { error: "too_big" });

/**
 * True when this runtime knows the IANA zone. A bare offset such as `+05:30` is none: PostgreSQL
 * reads its sign the other way, and it has no summer time.
 */
export function isTimeZone(zone: string): boolean {
  if (!/^[A-Za-z]/.test(zone)) return false;
  try {
    new Intl.DateTimeFormat("en", { timeZone: zone });
    return true;
  } catch {
    return false;
  }
}

/** What a class of case asks for: all that is true here must be on record. */
const criteria = z.strictObject({
  /** A positive test. */
  laboratory: z.boolean({ error: "wrong_type" }),
  /** An onset of symptoms. */
  clinical: z.boolean({ error: "wrong_type" }),
  /** A contact pair with a confirmed or probable case. */
  link: z.boolean({ error: "wrong_type" }),
});

/**
 * Criteria by class, asked in this order; the first class whose criteria are all met is it. A class
 * that asks for nothing is met by nobody.
 */
export const caseRules = z.strictObject(
  Object.fromEntries([...CASE_CLASSIFICATIONS].map((one) => [one, criteria])) as Record<
    (typeof CASE_CLASSIFICATIONS)[number],
    typeof criteria
  >,
);
export type CaseRules = z.output<typeof caseRules>;

/** Usual pattern (methods A.1, common practice). */
export const DEFAULT_CASE_RULES: CaseRules = {
  confirmed: { laboratory: true, clinical: false, link: false },
  probable: { laboratory: false, clinical: true, link: true },
  suspected: { laboratory: false, clinical: true, link: false },
};

/**
 * When a contact is high-risk: any of these. Else low-risk, or unknown where duration or distance
 * decides and is not on record.
 */
export const exposureGrading = z.strictObject({
  physicalIsHigh: z.boolean({ error: "wrong_type" }),
  /** Settings in which every exposure is high-risk. */
  highSettings: z
    .array(z.enum(SETTINGS, { error: "not_in_list" }))
    .max(SETTINGS.length, { error: "too_many" })
    .refine((list) => new Set(list).size === list.length, { error: "repeated" }),
  /** At least this long, and no further apart than that. */
  highMinutes: whole(1, 1440),
  highDistanceM: z
    .number({ error: numberCode })
    .min(0.1, { error: "too_small" })
    .max(100, { error: "too_big" }),
});
export type ExposureGrading = z.output<typeof exposureGrading>;

/** Cut-offs differ between bodies (methods F.1); these are a start, to be set locally. */
export const DEFAULT_EXPOSURE_GRADING: ExposureGrading = {
  physicalIsHigh: true,
  highSettings: ["household"],
  highMinutes: 15,
  highDistanceM: 2,
};

/** Code of a symptom: stable once used, so a label may be mended without touching checks. */
export const symptomCode = z
  .string({ error: "not_text" })
  .regex(/^[a-z][a-z0-9_]{0,39}$/, { error: "invalid" });

/** Most symptoms a list may hold. */
export const SYMPTOM_LIMIT = 40;

export const symptomList = z
  .array(z.strictObject({ code: symptomCode, label: text(LIMITS.shortText, 1) }))
  .min(1, { error: "required" })
  .max(SYMPTOM_LIMIT, { error: "too_many" })
  .refine((list) => new Set(list.map((one) => one.code)).size === list.length, {
    error: "repeated",
  });
export type SymptomList = z.output<typeof symptomList>;

const labelOf = (code: string) =>
  `${code.charAt(0).toUpperCase()}${code.slice(1)}`.replaceAll("_", " ");

export const DEFAULT_SYMPTOMS: SymptomList = SYMPTOMS.map((code) => ({
  code,
  label: labelOf(code),
}));

export const TEXT_KINDS = ["advice", "consent"] as const;
export const settingTexts = z
  .array(
    z.strictObject({
      kind: z.enum(TEXT_KINDS, { error: "not_in_list" }),
      /** A language tag (BCP 47), such as `en` or `pt-BR`. */
      language: z
        .string({ error: "required" })
        .regex(/^[a-z]{2,3}(-[A-Za-z0-9]{2,8}){0,2}$/, { error: "invalid" }),
      text: text(LIMITS.note, 1),
    }),
  )
  .max(60, { error: "too_many" })
  .refine(
    (list) => new Set(list.map((one) => `${one.kind} ${one.language}`)).size === list.length,
    {
      error: "repeated",
    },
  );
export type SettingTexts = z.output<typeof settingTexts>;

/** Each setting by itself; bounds are wide, since guidance differs. */
export const SETTING_SHAPES = {
  name: text(LIMITS.name, 1),
  invented: z.boolean({ error: "wrong_type" }),
  timeZone: z
    .string({ error: "required" })
    .max(64, { error: "too_long" })
    .refine(isTimeZone, { error: "not_a_zone" }),
  countryCode: z.string({ error: "required" }).regex(/^[A-Z]{2}$/, { error: "invalid" }),
  populationAtRisk: whole(1, 100_000_000).nullable(),
  caseDefinition: text(LIMITS.note),
  caseRules,
  incubationMin: whole(0, 120),
  incubationMax: whole(1, 365),
  infectiousBefore: whole(0, 60),
  infectiousAfter: whole(1, 120),
  monitoringDays: whole(1, 120),
  clusterWindowDays: whole(1, 120),
  clusterMinimumCases: whole(2, 100),
  /** Null: twice the longest incubation. */
  closureDays: whole(1, 365).nullable(),
  lostAfterDays: whole(1, 60),
  smallCellThreshold: whole(5, 100),
  exposureGrading,
  symptoms: symptomList,
  texts: settingTexts,
} as const;
export type SettingKey = keyof typeof SETTING_SHAPES;

const optional = Object.fromEntries(
  Object.entries(SETTING_SHAPES).map(([key, shape]) => [key, shape.optional()]),
) as { [K in SettingKey]: z.ZodOptional<(typeof SETTING_SHAPES)[K]> };

/** A change of settings: only what changes, with the version it was read at. */
export const settingsPatch = z.strictObject({ version: rowVersion, ...optional });
export type SettingsPatch = z.output<typeof settingsPatch>;

export const settingsAnswer = z.strictObject({
  ...SETTING_SHAPES,
  /** True for one to learn with: it may be emptied, sends nothing and counts nowhere. */
  practice: z.boolean(),
  caseDefinitionVersion: z.int(),
  /** `closureDays`, or twice the longest incubation where that is null. */
  closureDaysInForce: z.int(),
  /** Local day in the investigation's zone. */
  today: z.string(),
  version: z.int(),
});
export type Settings = z.output<typeof settingsAnswer>;

/** What a change would move, counted on what is on record now. */
export const SETTING_MEASURES = [
  "pairs_in_window",
  "source_pairs_in_window",
  "contacts_due_today",
  "follow_ups_ended",
  "follow_ups_lost",
  "proposed_clusters",
  "cases_in_clusters",
  "clusters_quiet",
  "pairs_high_risk",
  "pairs_low_risk",
  "pairs_grade_unknown",
  "cases_meeting_confirmed",
  "cases_meeting_probable",
  "cases_meeting_suspected",
  "classes_that_differ",
  "checks_with_removed_symptoms",
  "entries_on_another_day",
  "phones_of_the_country",
] as const;
export type SettingMeasure = (typeof SETTING_MEASURES)[number];

export const settingsPreview = z.strictObject({
  /** One line per thing that can move; equal numbers say that it was counted and stays. */
  moves: z.array(
    z.strictObject({
      setting: z.enum(Object.keys(SETTING_SHAPES) as [SettingKey, ...SettingKey[]]),
      measure: z.enum(SETTING_MEASURES),
      before: z.int(),
      after: z.int(),
    }),
  ),
  /** The change makes a new version of the case definition. */
  newCaseDefinition: z.boolean(),
});
export type SettingsPreview = z.output<typeof settingsPreview>;

/** One change of the settings, the newest first in the list. */
export const settingChange = z.strictObject({
  id: uuid,
  version: z.int(),
  recordedAt: z.string(),
  /** Who, by display name; null where the acting role may not know, or for changes by the system. */
  by: z.string().nullable(),
  changes: z.array(
    z.strictObject({
      setting: z.enum(Object.keys(SETTING_SHAPES) as [SettingKey, ...SettingKey[]]),
      from: z.json(),
      to: z.json(),
    }),
  ),
});
export type SettingChange = z.output<typeof settingChange>;
export const settingChangeList = listOf(settingChange);

/** A version of the case definition; classifications name the one they were made with. */
export const caseDefinitionVersion = z.strictObject({
  number: z.int(),
  wording: z.string(),
  rules: caseRules,
  recordedAt: z.string(),
});
export const caseDefinitionList = listOf(caseDefinitionVersion);

/** Emptying a practice investigation and filling it again; its name is typed to confirm. */
export const practiceReset = z.strictObject({ version: rowVersion, name: text(LIMITS.name, 1) });
export type PracticeReset = z.output<typeof practiceReset>;
