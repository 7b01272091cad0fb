import { z } from "zod";
import { CLASSIFICATIONS } from "../vocabulary.ts";
import { listOf, listQuery, uuid } from "./common.ts";

export const followUpQuery = listQuery.extend({
  show: z.enum(["due", "all", "ended"], { error: "not_in_list" }).default("due"),
});

/** A contact under follow-up: day 0 is the last exposure day, due days run from day 1 to day M. */
export const followUpItem = z.strictObject({
  id: uuid,
  studyNumber: z.string(),
  name: z.string().nullable().optional(),
  phone: z.string().nullable().optional(),
  area: z.string().nullable(),
  classification: z.enum(CLASSIFICATIONS).nullable(),
  assignedTo: uuid.nullable(),
  dayZero: z.string(),
  lastDueDay: z.string(),
  dayNumber: z.int(),
  monitoringDays: z.int(),
});
export type FollowUpItem = z.output<typeof followUpItem>;
export const followUpList = listOf(followUpItem).extend({
  today: z.string(),
  withoutDayZero: z.int(),
});
