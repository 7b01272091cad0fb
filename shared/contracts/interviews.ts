import { z } from "zod";
import { CHANNELS, INTERVIEW_OUTCOMES, SETTINGS } from "../vocabulary.ts";
import {
  choice,
  choiceOrMissing,
  instant,
  LIMITS,
  listOf,
  listQuery,
  numberOrMissing,
  optionalText,
  partialDay,
  uuid,
  yesNo,
} from "./common.ts";

const inOrder = (row: { firstExposure: string | null; lastExposure: string | null }) =>
  !(row.firstExposure?.length === 10 && row.lastExposure?.length === 10) ||
  row.lastExposure >= row.firstExposure;

/** One named contact. With `personId` the pair is made with that person, never a second person. */
export const contactInput = z
  .strictObject({
    personId: uuid.nullable().optional(),
    name: optionalText(LIMITS.name),
    phone: optionalText(LIMITS.phone),
    setting: choiceOrMissing(SETTINGS),
    placeId: uuid.nullable().optional(),
    place: optionalText(LIMITS.shortText),
    firstExposure: partialDay,
    lastExposure: partialDay,
    minutes: numberOrMissing(0, 100_000, true),
    distanceM: numberOrMissing(0, 1000, false),
    physical: yesNo,
    indoors: yesNo,
    relation: optionalText(LIMITS.shortText),
  })
  .refine(inOrder, { path: ["lastExposure"], error: "last_before_first" })
  .refine((row) => row.personId || row.name || row.phone, { path: ["name"], error: "required" });
export type ContactInput = z.output<typeof contactInput>;

/** People who cannot be named: a count (exact, range, or unknown) kept apart from the graph. */
export const groupExposureInput = z
  .strictObject({
    setting: choiceOrMissing(SETTINGS),
    place: optionalText(LIMITS.shortText),
    firstExposure: partialDay,
    lastExposure: partialDay,
    countMin: z
      .int({ error: "not_a_whole_number" })
      .min(0, { error: "too_small" })
      .max(100_000, { error: "too_big" })
      .nullable()
      .default(null),
    countMax: z
      .int({ error: "not_a_whole_number" })
      .min(0, { error: "too_small" })
      .max(100_000, { error: "too_big" })
      .nullable()
      .default(null),
  })
  .refine(inOrder, { path: ["lastExposure"], error: "last_before_first" })
  .refine((row) => row.countMin === null || row.countMax === null || row.countMax >= row.countMin, {
    path: ["countMax"],
    error: "max_below_min",
  });
export type GroupExposureInput = z.output<typeof groupExposureInput>;

/** An interview, or an attempt at one. `heldAt` is the true time; the entry time is the server's. */
export const interviewInput = z.strictObject({
  personId: uuid,
  outcome: z.enum(INTERVIEW_OUTCOMES, { error: "not_in_list" }),
  channel: choice(CHANNELS),
  heldAt: instant.nullable().default(null),
  contacts: z
    .array(contactInput, { error: "wrong_type" })
    .max(LIMITS.contacts, { error: "too_many" })
    .default([]),
  groupExposures: z
    .array(groupExposureInput, { error: "wrong_type" })
    .max(LIMITS.groupExposures, { error: "too_many" })
    .default([]),
});
export type InterviewInput = z.output<typeof interviewInput>;

export const interviewReceipt = z.strictObject({ id: uuid, graphVersion: z.int() });

export const interviewsQuery = listQuery.extend({ personId: uuid.optional() });
export const interviewAnswer = z.strictObject({
  id: uuid,
  personId: uuid,
  studyNumber: z.string(),
  outcome: z.string(),
  channel: z.string().nullable(),
  day: z.string(),
  heldAt: z.string(),
  recordedAt: z.string(),
  contacts: z.int(),
  groupExposures: z.int(),
});
export type Interview = z.output<typeof interviewAnswer>;
export const interviewList = listOf(interviewAnswer);

/** A draft is whatever the form holds; only its size is bounded. */
export const draftInput = z.strictObject({
  version: z.int().min(0),
  body: z.record(z.string().max(60), z.unknown()),
});
export const draftAnswer = z.strictObject({
  version: z.int(),
  body: z.record(z.string(), z.unknown()).nullable(),
  updatedAt: z.string().nullable(),
});
export type Draft = z.output<typeof draftAnswer>;
