import { z } from "zod";
import {
  CHECK_OUTCOMES,
  CLASSIFICATIONS,
  FOLLOW_STATES,
  MISSING,
  RESPONDENTS,
  SYMPTOMS,
} from "../vocabulary.ts";
import { choice, day, LIMITS, listOf, listQuery, optionalText, uuid } from "./common.ts";

export const followUpQuery = listQuery.extend({
  show: z.enum(["due", "all", "ended"], { error: "not_in_list" }).default("due"),
});

const symptomAnswer = z.enum(["yes", "no", ...MISSING]).nullable();

/** A due day with the best outcome recorded for it. */
export const dueDay = z.strictObject({
  day: z.string(),
  outcome: z.enum(CHECK_OUTCOMES).nullable(),
});
export type DueDay = z.output<typeof dueDay>;

/** A contact under follow-up: day 0 is the last exposure day, due days run from day 1 to day M. */
export const followUpItem = z.strictObject({
  id: uuid,
  studyNumber: z.string(),
  name: z.string().nullable().optional(),
  phone: z.string().nullable().optional(),
  area: z.string().nullable(),
  classification: z.enum(CLASSIFICATIONS).nullable(),
  assignedTo: uuid.nullable(),
  /** True when the acting person may change this person's record. */
  mine: z.boolean(),
  version: z.int(),
  dayZero: z.string(),
  lastDueDay: z.string(),
  dayNumber: z.int(),
  monitoringDays: z.int(),
  state: z.enum(FOLLOW_STATES),
  /** A symptom report that no later day has taken back. */
  symptomatic: z.boolean(),
  lastCheck: z
    .strictObject({
      day: z.string(),
      outcome: z.enum(CHECK_OUTCOMES),
      symptoms: symptomAnswer,
      recordedAt: z.string(),
    })
    .nullable(),
  /** First day that counts as missed when nothing was recorded: the day after coming on record. */
  expectedFrom: z.string(),
  dueDays: z.array(dueDay),
  /** The same word for contacts of this list who share a household or a telephone number. */
  together: z.string().nullable(),
});
export type FollowUpItem = z.output<typeof followUpItem>;
export const followUpList = listOf(followUpItem).extend({
  today: z.string(),
  withoutDayZero: z.int(),
  lostAfterDays: z.int(),
});

/** One attempt to reach a contact. Without a day it is today's in the investigation's zone. */
export const followCheckInput = z
  .strictObject({
    day: day.nullable().default(null),
    outcome: z.enum(CHECK_OUTCOMES, { error: "not_in_list" }),
    symptoms: choice(["yes", "no", ...MISSING]),
    symptomCodes: z
      .array(z.enum(SYMPTOMS, { error: "not_in_list" }))
      .max(SYMPTOMS.length, { error: "too_many" })
      .default([]),
    respondent: choice(RESPONDENTS),
    note: optionalText(LIMITS.note),
  })
  .refine((check) => new Set(check.symptomCodes).size === check.symptomCodes.length, {
    path: ["symptomCodes"],
    error: "repeated",
  })
  .refine((check) => check.symptoms === "yes" || check.symptomCodes.length === 0, {
    path: ["symptomCodes"],
    error: "only_with_symptoms",
  })
  .refine(
    (check) =>
      check.outcome !== "not_reached" || check.symptoms === null || check.symptoms === "unknown",
    { path: ["symptoms"], error: "nobody_answered" },
  )
  .refine((check) => check.outcome !== "not_reached" || check.respondent === null, {
    path: ["respondent"],
    error: "nobody_answered",
  });
export type FollowCheckInput = z.output<typeof followCheckInput>;

export const followCheck = z.strictObject({
  id: uuid,
  day: z.string(),
  outcome: z.enum(CHECK_OUTCOMES),
  symptoms: symptomAnswer,
  symptomCodes: z.array(z.string()),
  respondent: z.enum(RESPONDENTS).nullable(),
  /** Absent where the person's identity is not the acting person's to open. */
  note: z.string().nullable().optional(),
  recordedAt: z.string(),
});
export type FollowCheck = z.output<typeof followCheck>;
export const followCheckList = listOf(followCheck);
