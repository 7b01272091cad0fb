import {
  DEFAULT_CASE_RULES,
  DEFAULT_EXPOSURE_GRADING,
  DEFAULT_SYMPTOMS,
  type Settings,
  type SettingsPreview,
} from "../../../shared/contracts/settings.ts";
import { ids } from "./network-answers.ts";

/** The settings of an invented investigation. */
export function settingsOf(over: Partial<Settings> = {}): Settings {
  return {
    name: "Sallow Bay",
    invented: true,
    practice: false,
    timeZone: "Europe/Lisbon",
    countryCode: "GB",
    populationAtRisk: 12_400,
    caseDefinition: "Fever and rash in a person who was in Sallow Bay since 1 April.",
    caseRules: DEFAULT_CASE_RULES,
    incubationMin: 2,
    incubationMax: 14,
    infectiousBefore: 2,
    infectiousAfter: 10,
    monitoringDays: 14,
    clusterWindowDays: 14,
    clusterMinimumCases: 2,
    closureDays: null,
    lostAfterDays: 3,
    smallCellThreshold: 5,
    exposureGrading: DEFAULT_EXPOSURE_GRADING,
    symptoms: DEFAULT_SYMPTOMS.slice(0, 4),
    texts: [
      { kind: "advice", language: "en", text: "Stay at home and ring us if you feel unwell." },
      { kind: "consent", language: "ar", text: "نسأل عن من التقيت بهم." },
    ],
    caseDefinitionVersion: 2,
    closureDaysInForce: 28,
    today: "2026-05-27",
    version: 4,
    ...over,
  };
}

export const previewAnswer: SettingsPreview = {
  moves: [
    { setting: "monitoringDays", measure: "contacts_due_today", before: 212, after: 305 },
    { setting: "monitoringDays", measure: "follow_ups_ended", before: 640, after: 640 },
  ],
  newCaseDefinition: false,
};

export const definitionsAnswer = {
  items: [
    {
      number: 2,
      wording: "Fever and rash in a person who was in Sallow Bay since 1 April.",
      rules: DEFAULT_CASE_RULES,
      recordedAt: "2026-05-12T08:30:00.000Z",
    },
    {
      number: 1,
      wording: "Rash of any kind.",
      rules: DEFAULT_CASE_RULES,
      recordedAt: "2026-05-01T07:00:00.000Z",
    },
  ],
  total: 2,
  page: 1,
  pageSize: 10,
};

export const changesAnswer = {
  items: [
    {
      id: ids.small,
      version: 4,
      recordedAt: "2026-05-20T09:15:00.000Z",
      by: "Ada Field",
      changes: [
        { setting: "closureDays", from: 42, to: null },
        { setting: "symptoms", from: null, to: DEFAULT_SYMPTOMS.slice(0, 4) },
      ],
    },
    {
      id: ids.large,
      version: 3,
      recordedAt: "2026-05-18T09:15:00.000Z",
      by: null,
      changes: [{ setting: "incubationMax", from: 10, to: 14 }],
    },
  ],
  total: 24,
  page: 1,
  pageSize: 20,
};
