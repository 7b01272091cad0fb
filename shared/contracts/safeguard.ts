import { z } from "zod";
import { ROLES } from "../roles.ts";
import { listOf, listQuery, uuid } from "./common.ts";

export const accessEventsQuery = listQuery.extend({
  action: z.string().max(60).optional(),
  personId: uuid.optional(),
  accountId: uuid.optional(),
});
export const accessEventAnswer = z.strictObject({
  id: uuid,
  at: z.string(),
  accountId: uuid.nullable(),
  displayName: z.string().nullable(),
  role: z.string().nullable(),
  action: z.string(),
  fields: z.array(z.string()),
  personIds: z.array(uuid),
  studyNumbers: z.array(z.string()),
  /** Numbers, and for exports coded words: id, purpose, SHA-256. */
  counts: z.record(z.string(), z.union([z.number(), z.string()])),
});
export type AccessEvent = z.output<typeof accessEventAnswer>;
export const accessEventList = listOf(accessEventAnswer);

/** One column: what the registry says and what PostgreSQL's catalogue says, role by role. */
export const fieldPolicyAnswer = z.strictObject({
  items: z.array(
    z.strictObject({
      table: z.string(),
      column: z.string(),
      key: z.string().nullable(),
      class: z.string(),
      retention: z.string(),
      registry: z.record(z.enum(ROLES), z.string()),
      catalogue: z.record(z.enum(ROLES), z.string()),
      agrees: z.boolean(),
    }),
  ),
  disagreements: z.int(),
});
export type FieldPolicy = z.output<typeof fieldPolicyAnswer>;
