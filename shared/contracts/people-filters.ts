import { z } from "zod";
import { accessTo } from "../fields.ts";
import type { Role } from "../roles.ts";
import { CLASSIFICATIONS, INTERVIEW_OUTCOMES } from "../vocabulary.ts";
import { day, LIMITS, rowVersion, text, uuid } from "./common.ts";

const oneOf = <const T extends readonly [string, ...string[]]>(values: T) =>
  z.enum(values, { error: "not_in_list" });

/**
 * Filters of the line list, by coded values only. `assigned` is me, my team, nobody or a member's
 * account; `followUp` asks whether any check of follow-up is on record. Ranges of days include both
 * ends, and a month known without its day where any of its days is inside.
 */
export const peopleFilters = {
  classification: oneOf([...CLASSIFICATIONS, "case"]).optional(),
  interviewed: oneOf(["yes", "no"]).optional(),
  interviewState: oneOf([...INTERVIEW_OUTCOMES, "none"]).optional(),
  assigned: z
    .string({ error: "not_in_list" })
    .refine(
      (value) => ["me", "team", "none"].includes(value) || z.uuid().safeParse(value).success,
      "not_in_list",
    )
    .optional(),
  followUp: oneOf(["yes", "no"]).optional(),
  needs: oneOf(["interview"]).optional(),
  area: text(LIMITS.shortText).optional(),
  onsetFrom: day.optional(),
  onsetTo: day.optional(),
  reportFrom: day.optional(),
  reportTo: day.optional(),
};
export const filterSet = z.strictObject(peopleFilters);
export type PeopleFilters = z.output<typeof filterSet>;

/** The person's field that a filter tells about: who may not read it may not filter by it. */
const FIELD_OF: Record<keyof PeopleFilters, string> = {
  classification: "classification",
  interviewed: "interviewed",
  interviewState: "interviewState",
  assigned: "assignedTo",
  followUp: "id",
  needs: "interviewState",
  area: "area",
  onsetFrom: "onsetDate",
  onsetTo: "onsetDate",
  reportFrom: "reportDate",
  reportTo: "reportDate",
};

/** The filters given that a role may not use, because it cannot read what they tell about. */
export function refusedFilters(filters: PeopleFilters, role: Role): (keyof PeopleFilters)[] {
  return (Object.keys(FIELD_OF) as (keyof PeopleFilters)[]).filter(
    (key) => filters[key] !== undefined && accessTo(FIELD_OF[key], role) !== "full",
  );
}

/** What a saved filter holds: filters and an order, never what was typed into the search. */
export const savedQuestion = filterSet.extend({
  sort: z.string().max(60, { error: "too_long" }).optional(),
});
export type SavedQuestion = z.output<typeof savedQuestion>;

const filterName = text(60, 1);

export const savedFilterInput = z.strictObject({ name: filterName, filter: savedQuestion });
export type SavedFilterInput = z.output<typeof savedFilterInput>;

export const savedFilterPatch = z.strictObject({
  version: rowVersion,
  name: filterName.optional(),
  filter: savedQuestion.optional(),
});
export type SavedFilterPatch = z.output<typeof savedFilterPatch>;

/** A saved filter as its owner gets it. */
export const savedFilterAnswer = z.strictObject({
  id: uuid,
  name: z.string(),
  filter: savedQuestion,
  version: z.int(),
});
export type SavedFilter = z.output<typeof savedFilterAnswer>;
export const savedFilterList = z.strictObject({ items: z.array(savedFilterAnswer) });

/** Most filters somebody may keep in one investigation. */
export const MOST_SAVED_FILTERS = 50;

/** Most people assigned by one request: named one by one, or by a filter. */
export const ASSIGN_LIMITS = { people: 500, filter: 5_000 } as const;

/**
 * Assigning several people. `people` names them with the versions that were seen; `filter` means
 * everybody it finds, and `expected` how many that were when the choice was made.
 */
export const assignInput = z
  .strictObject({
    to: z.discriminatedUnion(
      "kind",
      [
        z.strictObject({ kind: z.literal("member"), accountId: uuid }),
        z.strictObject({ kind: z.literal("team"), teamId: uuid }),
        z.strictObject({ kind: z.literal("nobody") }),
      ],
      { error: "not_in_list" },
    ),
    people: z
      .array(z.strictObject({ id: uuid, version: rowVersion }))
      .min(1, { error: "required" })
      .max(ASSIGN_LIMITS.people, { error: "too_many" })
      .optional(),
    filter: filterSet.extend({ q: text(LIMITS.name).optional() }).optional(),
    expected: z.int({ error: "not_a_whole_number" }).min(0).optional(),
  })
  .refine((body) => (body.people === undefined) !== (body.filter === undefined), {
    path: ["people"],
    error: "required",
  })
  .refine((body) => body.filter === undefined || body.expected !== undefined, {
    path: ["expected"],
    error: "required",
  });
export type AssignInput = z.output<typeof assignInput>;

/** How an assignment of several went; those skipped are listed and stay as they were. */
export const assignAnswer = z.strictObject({
  changed: z.int(),
  /** Assigned so already. */
  unchanged: z.int(),
  /** Changed by somebody else since they were seen, or gone from sight. */
  skipped: z.array(uuid),
});
export type AssignAnswer = z.output<typeof assignAnswer>;

/** To whom people can be assigned. */
export const assigneesAnswer = z.strictObject({
  members: z.array(
    z.strictObject({ accountId: uuid, displayName: z.string(), team: z.string().nullable() }),
  ),
  teams: z.array(z.strictObject({ id: uuid, name: z.string() })),
});
export type Assignees = z.output<typeof assigneesAnswer>;
