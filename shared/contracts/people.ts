import { z } from "zod";
import { accessTo, personKeys } from "../fields.ts";
import type { Role } from "../roles.ts";
import {
  AGE_BANDS,
  CHECK_OUTCOMES,
  CLASSIFICATIONS,
  FOLLOW_STATES,
  INTERVIEW_OUTCOMES,
  OUTCOMES,
  SEXES,
  TEST_RESULTS,
} from "../vocabulary.ts";
import {
  choice,
  choiceOrMissing,
  emailField,
  LIMITS,
  listOf,
  listQuery,
  optionalText,
  partialDay,
  rowVersion,
  text,
  uuid,
} from "./common.ts";
import { peopleFilters } from "./people-filters.ts";

/** Fields of a person that a form or file may set. Null means "not asked". */
export const personFields = {
  ref: optionalText(LIMITS.ref),
  name: optionalText(LIMITS.name),
  phone: optionalText(LIMITS.phone),
  email: emailField,
  birthDate: partialDay,
  sex: choiceOrMissing(SEXES),
  address: optionalText(LIMITS.address),
  area: optionalText(LIMITS.shortText),
  occupation: optionalText(LIMITS.shortText),
  household: optionalText(LIMITS.shortText),
  classification: choice(CLASSIFICATIONS),
  onsetDate: partialDay,
  specimenDate: partialDay,
  resultDate: partialDay,
  result: choiceOrMissing(TEST_RESULTS),
  reportDate: partialDay,
  interviewDate: partialDay,
  interviewed: z.preprocess(
    (value) => (value === true ? "yes" : value === false ? "no" : value === "" ? null : value),
    z.enum(["yes", "no"], { error: "not_in_list" }).nullable().default(null),
  ),
  isolationDate: partialDay,
  diedDate: partialDay,
  outcome: choice(OUTCOMES),
  outcomeDate: partialDay,
  note: optionalText(LIMITS.note),
};

/** The form of a person. Interview facts come from interviews, not from here. */
export const personInput = z
  .strictObject(personFields)
  .omit({ interviewDate: true, interviewed: true });
export type PersonInput = z.output<typeof personInput>;

/**
 * Registering a person: every key that a row of a people file has, so that what another system
 * holds can be entered as it is. Something must be known; an empty form is nobody.
 */
export const personRegistration = z
  .strictObject(personFields)
  .refine((person) => Object.values(person).some((value) => value !== null), {
    path: ["name"],
    error: "required",
  });
export type PersonRegistration = z.output<typeof personRegistration>;

/** A person as a row of a people file carries it (same keys as the columns in camelCase). */
export const personRow = z
  .strictObject(personFields)
  .omit({ note: true, outcome: true, outcomeDate: true });
export type PersonRow = z.output<typeof personRow>;

const editable = z.strictObject(personFields).omit({
  interviewDate: true,
  interviewed: true,
  specimenDate: true,
  resultDate: true,
  result: true,
});

/**
 * Change of a person: only the keys present are changed. `assignedTo` is an account id or null.
 * Built without defaults, so that a key left out stays as it is.
 */
export const personPatch = z.strictObject({
  version: rowVersion,
  assignedTo: uuid.nullable().optional(),
  ...Object.fromEntries(
    Object.entries(editable.shape).map(([key, schema]) => [
      key,
      z
        .unknown()
        .transform((value, context) => {
          const parsed = (schema as z.ZodType).safeParse(value);
          if (parsed.success) return parsed.data as string | null;
          for (const issue of parsed.error.issues) {
            context.issues.push({ code: "custom", message: issue.message, input: value });
          }
          return z.NEVER;
        })
        .optional(),
    ]),
  ),
});
export type PersonPatch = { version: number; assignedTo?: string | null | undefined } & {
  [K in keyof z.output<typeof editable>]?: string | null | undefined;
};

const plain = z.string().nullable();
const PERSON_SHAPE: Record<string, z.ZodType> = {
  id: uuid,
  studyNumber: z.string(),
  classification: z.enum(CLASSIFICATIONS).nullable(),
  ageBand: z.enum(AGE_BANDS).nullable(),
  interviewState: z.enum(INTERVIEW_OUTCOMES).nullable(),
  becameCase: z.boolean(),
  birthYear: z.int().nullable(),
  householdNumber: z.int().nullable(),
  version: z.int(),
  recordedAt: z.string(),
  assignedTo: uuid.nullable(),
  assignedTeam: uuid.nullable(),
  can: z.strictObject({
    edit: z.boolean().optional(),
    interview: z.boolean().optional(),
    addTest: z.boolean().optional(),
  }),
};

/**
 * A person as a role gets it: exactly the registry's keys for that role, strict, so that an
 * unlisted key cannot leave. Keys whose identity is not the acting person's to open (a case seen
 * from a contact's page) are absent, hence optional.
 */
export function personAnswer(role: Role) {
  const shape: Record<string, z.ZodType> = {};
  for (const key of personKeys(role)) {
    const schema = PERSON_SHAPE[key] ?? plain;
    const identity = ["ref", "name", "phone", "email", "birthDate", "address", "note", "household"];
    shape[key] =
      identity.includes(key) || accessTo(key, role) === "none" ? schema.optional() : schema;
  }
  return z.strictObject(shape);
}

/** A person's keys for any role, all but the identifiers optional; what the client types against. */
export interface Person {
  id: string;
  studyNumber: string;
  version: number;
  recordedAt: string;
  ref?: string | null;
  name?: string | null;
  nameMasked?: string | null;
  phone?: string | null;
  phoneLast2?: string | null;
  email?: string | null;
  emailMasked?: string | null;
  birthDate?: string | null;
  birthYear?: number | null;
  ageBand: string | null;
  sex: string | null;
  address?: string | null;
  area: string | null;
  occupation?: string | null;
  household?: string | null;
  householdNumber: number | null;
  classification: (typeof CLASSIFICATIONS)[number] | null;
  becameCase: boolean;
  onsetDate: string | null;
  specimenDate: string | null;
  resultDate: string | null;
  result: string | null;
  reportDate: string | null;
  interviewDate: string | null;
  interviewed: "yes" | "no" | null;
  interviewState: (typeof INTERVIEW_OUTCOMES)[number] | null;
  isolationDate: string | null;
  outcome: string | null;
  outcomeDate: string | null;
  diedDate: string | null;
  note?: string | null;
  assignedTo?: string | null;
  assignedTeam?: string | null;
  can: { edit?: boolean; interview?: boolean; addTest?: boolean };
}

export const peopleQuery = listQuery.extend(peopleFilters);
export type PeopleQuery = z.output<typeof peopleQuery>;

/** The same list asked with a body, so that a typed name never stands in an address. */
export const peopleSearch = z.strictObject({
  page: z.int().min(1).max(1_000_000).default(1),
  pageSize: z.int().min(1).max(LIMITS.pageSize).default(50),
  sort: z.string().max(60).optional(),
  q: text(LIMITS.name).optional(),
  ...peopleFilters,
});

/** A neighbour on a person's page: the case by study number only, unless identity is held. */
export const pairAnswer = z.strictObject({
  pairId: uuid,
  personId: uuid,
  studyNumber: z.string(),
  name: z.string().nullable().optional(),
  classification: z.enum(CLASSIFICATIONS).nullable(),
  becameCase: z.boolean(),
  exposures: z.array(
    z.strictObject({
      id: uuid,
      firstExposure: z.string().nullable(),
      lastExposure: z.string().nullable(),
      setting: z.string().nullable(),
      place: z.string().nullable(),
      minutes: z.union([z.number(), z.string()]).nullable(),
      distanceM: z.union([z.number(), z.string()]).nullable(),
      physical: z.string().nullable(),
      indoors: z.string().nullable(),
      relation: z.string().nullable().optional(),
      recordedAt: z.string(),
    }),
  ),
});
export type PersonPair = z.output<typeof pairAnswer>;

const windowAnswer = z.strictObject({ from: z.string(), to: z.string() }).nullable();
const infectiousAnswer = z
  .strictObject({ from: z.string(), to: z.string(), basis: z.enum(["onset", "specimen"]) })
  .nullable();

/** What stands on a person's page beside the person. */
export function personPage(role: Role) {
  return personAnswer(role).extend({
    windows: z.strictObject({ infectious: infectiousAnswer, source: windowAnswer }),
    monitoring: z
      .strictObject({
        dayZero: z.string(),
        lastDueDay: z.string(),
        dueDays: z.array(z.string()),
        expectedFrom: z.string(),
        state: z.enum(FOLLOW_STATES),
        outcomes: z.array(z.strictObject({ day: z.string(), outcome: z.enum(CHECK_OUTCOMES) })),
      })
      .nullable(),
    classifications: z.array(
      z.strictObject({
        classification: z.string(),
        caseDefinitionVersion: z.int(),
        recordedAt: z.string(),
      }),
    ),
    pairs: z.array(pairAnswer),
    groupExposures: z.array(
      z.strictObject({
        id: uuid,
        setting: z.string().nullable(),
        place: z.string().nullable(),
        firstExposure: z.string().nullable(),
        lastExposure: z.string().nullable(),
        countMin: z.int().nullable(),
        countMax: z.int().nullable(),
      }),
    ),
    attempts: z.array(
      z.strictObject({
        id: uuid,
        outcome: z.string(),
        channel: z.string().nullable(),
        heldAt: z.string(),
        recordedAt: z.string(),
      }),
    ),
  });
}
export type PersonPage = Person & {
  windows: {
    infectious: { from: string; to: string; basis: "onset" | "specimen" } | null;
    source: { from: string; to: string } | null;
  };
  monitoring: {
    dayZero: string;
    lastDueDay: string;
    dueDays: string[];
    /** First day on which the absence of a check counts as missed. */
    expectedFrom: string;
    state: (typeof FOLLOW_STATES)[number];
    /** Best outcome of each day with a check, also of days that are no longer due. */
    outcomes: { day: string; outcome: (typeof CHECK_OUTCOMES)[number] }[];
  } | null;
  classifications: { classification: string; caseDefinitionVersion: number; recordedAt: string }[];
  pairs: PersonPair[];
  groupExposures: {
    id: string;
    setting: string | null;
    place: string | null;
    firstExposure: string | null;
    lastExposure: string | null;
    countMin: number | null;
    countMax: number | null;
  }[];
  attempts: {
    id: string;
    outcome: string;
    channel: string | null;
    heldAt: string;
    recordedAt: string;
  }[];
};

/** Answers of the people list for a role. */
export function peopleList(role: Role) {
  return listOf(personAnswer(role));
}

/** While typing a contact: find people already on record that the acting person may see. */
export const matchInput = z.strictObject({
  name: text(LIMITS.name).optional(),
  phone: text(LIMITS.phone).optional(),
});
export const matchAnswer = z.strictObject({
  items: z.array(
    z.strictObject({
      personId: uuid,
      studyNumber: z.string(),
      name: z.string().nullable(),
      phoneLast2: z.string().nullable(),
      ageBand: z.string().nullable(),
      area: z.string().nullable(),
      classification: z.string().nullable(),
      matchedOn: z.array(z.enum(["phone", "name", "sound"])),
    }),
  ),
});
export type Match = z.output<typeof matchAnswer>["items"][number];

export const matchReviewList = listOf(
  z.strictObject({
    id: uuid,
    personId: uuid,
    studyNumber: z.string(),
    otherId: uuid,
    otherStudyNumber: z.string(),
    matchedOn: z.array(z.string()),
    recordedAt: z.string(),
  }),
);
