import { z } from "zod";
import {
  CHECK_OUTCOMES,
  CLASSIFICATIONS,
  FOLLOW_ENDS,
  FOLLOW_STATES,
  MISSING,
  RESPONDENTS,
} from "../vocabulary.ts";
import { choice, day, LIMITS, listOf, listQuery, optionalText, uuid } from "./common.ts";
import { SYMPTOM_LIMIT, symptomCode } from "./settings.ts";

/** Which contacts a list shows; those without a day 0 have no due days and a list of their own. */
export const FOLLOW_SHOWS = ["due", "all", "ended", "without_day_zero"] as const;
export type FollowShow = (typeof FOLLOW_SHOWS)[number];

/**
 * Why a contact has no day 0, as far as the acting person sees: no exposure to a case on record, a
 * last exposure known to the month only, or not known at all.
 */
export const DAY_ZERO_GAPS = ["no_exposure", "month_only", "not_known"] as const;
export type DayZeroGap = (typeof DAY_ZERO_GAPS)[number];

export const followUpQuery = listQuery.extend({
  show: z.enum(FOLLOW_SHOWS, { error: "not_in_list" }).default("due"),
});

const symptomAnswer = z.enum(["yes", "no", ...MISSING]).nullable();

/** A due day with the best outcome recorded for it. */
export const dueDay = z.strictObject({
  day: z.string(),
  outcome: z.enum(CHECK_OUTCOMES).nullable(),
});
export type DueDay = z.output<typeof dueDay>;

/** A recorded end of a follow-up (methods A.3), as it stands. */
export const standingEnd = z.strictObject({
  id: uuid,
  reason: z.enum(FOLLOW_ENDS),
  day: z.string(),
});
export type StandingEnd = z.output<typeof standingEnd>;

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
  /** These three are null, and `dueDays` is empty, while no last exposure is known to the day. */
  dayZero: z.string().nullable(),
  lastDueDay: z.string().nullable(),
  dayNumber: z.int().nullable(),
  dayZeroGap: z.enum(DAY_ZERO_GAPS).nullable(),
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
  /** The recorded end that stands, if any. */
  end: standingEnd.nullable(),
  /** Day on which an end was last taken back. */
  reopenedOn: z.string().nullable(),
  /**
   * First day that counts as missed when nothing was recorded: the day after coming on record, or
   * the day on which the follow-up was reopened.
   */
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
    // The server also asks that they stand in the investigation's list.
    symptomCodes: z
      .array(symptomCode, { error: "wrong_type" })
      .max(SYMPTOM_LIMIT, { error: "too_many" })
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

/** Ends a follow-up for a reason that no check can tell. Without a day it is today's. */
export const followEndInput = z.strictObject({
  reason: z.enum(FOLLOW_ENDS, { error: "not_in_list" }),
  day: day.nullable().default(null),
});
export type FollowEndInput = z.output<typeof followEndInput>;

/** An end with its history: one that was taken back stays on record. */
export const followEnd = standingEnd.extend({
  recordedAt: z.string(),
  /** Display name; null where the acting role may not know who it was. */
  recordedBy: z.string().nullable(),
  takenBackAt: z.string().nullable(),
  takenBackBy: z.string().nullable(),
});
export type FollowEndEntry = z.output<typeof followEnd>;
export const followEndList = listOf(followEnd);
