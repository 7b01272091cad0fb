import { z } from "zod";
import {
  type CaseRules,
  type ExposureGrading,
  SETTING_SHAPES,
  type SettingKey,
  type Settings,
  type SettingsPatch,
  type SettingTexts,
  type SymptomList,
  settingsPatch,
} from "../../../../shared/contracts/settings.ts";
import { SETTINGS } from "../../../../shared/vocabulary.ts";
import { typedNumber } from "../../../lib/typed-number.ts";

/** Settings that are one whole number in one box. */
export const NUMBER_SETTINGS = [
  "populationAtRisk",
  "incubationMin",
  "incubationMax",
  "infectiousBefore",
  "infectiousAfter",
  "monitoringDays",
  "clusterWindowDays",
  "clusterMinimumCases",
  "closureDays",
  "lostAfterDays",
  "smallCellThreshold",
] as const satisfies readonly SettingKey[];
export type NumberSetting = (typeof NUMBER_SETTINGS)[number];

/** What the boxes hold: numbers as typed. */
export type SettingsValues = Record<NumberSetting, string> & {
  name: string;
  invented: boolean;
  timeZone: string;
  countryCode: string;
  caseDefinition: string;
  caseRules: CaseRules;
  exposureGrading: Omit<ExposureGrading, "highMinutes" | "highDistanceM"> & {
    highMinutes: string;
    highDistanceM: string;
  };
  symptoms: SymptomList;
  texts: SettingTexts;
};

export const SETTING_KEYS = Object.keys(SETTING_SHAPES) as SettingKey[];

/** The saved settings as the boxes show them. */
export function valuesOf(settings: Settings): SettingsValues {
  const numbers = NUMBER_SETTINGS.map((key) => [key, settings[key]?.toString() ?? ""]);
  const { exposureGrading: grading } = settings;
  return {
    ...(Object.fromEntries(numbers) as Record<NumberSetting, string>),
    name: settings.name,
    invented: settings.invented,
    timeZone: settings.timeZone,
    countryCode: settings.countryCode,
    caseDefinition: settings.caseDefinition,
    caseRules: structuredClone(settings.caseRules),
    exposureGrading: {
      physicalIsHigh: grading.physicalIsHigh,
      highSettings: [...grading.highSettings],
      highMinutes: String(grading.highMinutes),
      highDistanceM: String(grading.highDistanceM),
    },
    symptoms: settings.symptoms.map(({ code, label }) => ({ code, label })),
    texts: settings.texts.map(({ kind, language, text }) => ({ kind, language, text })),
  };
}

/** What the boxes hold as the contract wants it; nothing is checked or repaired here. */
export function toSettings(values: SettingsValues): Record<SettingKey, unknown> {
  const numbers = NUMBER_SETTINGS.map((key) => [key, typedNumber(values[key])]);
  const { exposureGrading: grading, caseRules: rules } = values;
  return {
    ...(Object.fromEntries(numbers) as Record<NumberSetting, unknown>),
    name: values.name,
    invented: values.invented,
    timeZone: values.timeZone.trim(),
    countryCode: values.countryCode.trim().toUpperCase(),
    caseDefinition: values.caseDefinition,
    // Written key by key, so that two equal settings are equal as text too.
    caseRules: Object.fromEntries(
      (["confirmed", "probable", "suspected"] as const).map((one) => [
        one,
        {
          laboratory: rules[one].laboratory,
          clinical: rules[one].clinical,
          link: rules[one].link,
        },
      ]),
    ),
    exposureGrading: {
      physicalIsHigh: grading.physicalIsHigh,
      highSettings: SETTINGS.filter((setting) => grading.highSettings.includes(setting)),
      highMinutes: typedNumber(grading.highMinutes),
      highDistanceM: typedNumber(grading.highDistanceM),
    },
    symptoms: values.symptoms.map(({ code, label }) => ({ code, label })),
    texts: values.texts.map(({ kind, language, text }) => ({ kind, language, text })),
  };
}

/** The settings whose boxes say something else than what is saved. */
export function changedSettings(values: SettingsValues, saved: Settings): SettingKey[] {
  const now = toSettings(values);
  const was = toSettings(valuesOf(saved));
  return SETTING_KEYS.filter((key) => JSON.stringify(now[key]) !== JSON.stringify(was[key]));
}

/** The change that is asked about and saved: only what differs, with the version it was read at. */
export function changeOf(values: SettingsValues, saved: Settings): Record<string, unknown> {
  const now = toSettings(values);
  const changed = changedSettings(values, saved).map((key) => [key, now[key]]);
  return { version: saved.version, ...Object.fromEntries(changed) };
}

/** The contract of a change, with what holds between two settings of which one may be saved. */
export function changeSchema(saved: Settings) {
  return z.preprocess(
    (typed) => changeOf(typed as SettingsValues, saved),
    settingsPatch.superRefine((patch: SettingsPatch, context) => {
      const min = patch.incubationMin ?? saved.incubationMin;
      const max = patch.incubationMax ?? saved.incubationMax;
      if (max < min) {
        // Beside the one that was changed, as the server says it.
        const path = patch.incubationMax === undefined ? "incubationMin" : "incubationMax";
        context.addIssue({ code: "custom", path: [path], message: "max_below_min" });
      }
    }),
  );
}
