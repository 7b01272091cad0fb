import { sql } from "drizzle-orm";
import { boolean, check, index, integer, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { investigation } from "./investigations.ts";
import { person } from "./people.ts";
import { at, bytea, core, identity, recordedAt } from "./shared.ts";

/** One attempt to reach a contact on a due day; several a day are kept, and the best counts. */
export const followCheck = core.table(
  "follow_check",
  {
    id: uuid("id").primaryKey(),
    investigationId: uuid("investigation_id")
      .notNull()
      .references(() => investigation.id),
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id),
    day: text("day").notNull(),
    outcome: text("outcome").notNull(),
    symptoms: text("symptoms"),
    symptomCodes: text("symptom_codes").array().notNull().default([]),
    respondent: text("respondent"),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
    withdrawnAt: at("withdrawn_at"),
  },
  (t) => [
    index("follow_check_person").on(t.personId, t.day),
    // Few checks report symptoms, and the list asks for all of them each time.
    index("follow_check_symptoms")
      .on(t.investigationId, t.personId, t.day)
      .where(sql`${t.symptoms} = 'yes' and ${t.withdrawnAt} is null`),
    check("follow_check_outcome", sql`${t.outcome} in ('seen','spoken','message','not_reached')`),
    check("follow_check_symptoms_known", sql`${t.symptoms} in ('yes','no','unknown','refused')`),
  ],
);

/** What was noted beside a check: free text says who somebody is, so it stands encrypted here. */
export const identityFollowCheck = identity.table("follow_check", {
  checkId: uuid("check_id")
    .primaryKey()
    .references(() => followCheck.id),
  investigationId: uuid("investigation_id").notNull(),
  noteCipher: bytea("note_cipher").notNull(),
});

/** A follow-up that was ended for a reason no check can tell; taken back, it is reopened. */
export const followEnd = core.table(
  "follow_end",
  {
    id: uuid("id").primaryKey(),
    investigationId: uuid("investigation_id")
      .notNull()
      .references(() => investigation.id),
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id, { onDelete: "cascade" }),
    reason: text("reason").notNull(),
    day: text("day").notNull(),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
    withdrawnAt: at("withdrawn_at"),
    withdrawnBy: uuid("withdrawn_by"),
  },
  (t) => [
    index("follow_end_person").on(t.personId, t.recordedAt),
    uniqueIndex("follow_end_standing").on(t.personId).where(sql`${t.withdrawnAt} is null`),
    check("follow_end_reason", sql`${t.reason} in ('refused','moved','died','not_a_contact')`),
  ],
);

/**
 * What the due list needs of everyone under follow-up, kept by triggers (drizzle/access): derived
 * from exposures, classifications, checks, ends, households and telephone tokens, never typed.
 */
export const followUp = core.table(
  "follow_up",
  {
    personId: uuid("person_id")
      .primaryKey()
      .references(() => person.id, { onDelete: "cascade" }),
    investigationId: uuid("investigation_id").notNull(),
    // Day of the last exposure to a case; null while none is known to the day.
    dayZero: text("day_zero"),
    // The same as a number, YYYYMMDD, for order and range: beside row security an index is used only
    // with comparisons that cannot leak what they compare, and those of text are none.
    dayKey: integer("day_key")
      .notNull()
      .generatedAlwaysAs(sql`coalesce(replace(day_zero, '-', '')::integer, 99991231)`),
    // Still a contact, and the follow-up was not ended.
    open: boolean("open").notNull().default(true),
    // A symptom report that no later day has taken back.
    symptomatic: boolean("symptomatic").notNull().default(false),
    // The same word for contacts who share a household or a telephone number.
    together: text("together"),
  },
  (t) => [
    index("follow_up_all").on(t.investigationId, t.dayKey, t.personId),
    index("follow_up_open").on(t.investigationId, t.dayKey, t.personId).where(sql`${t.open}`),
    index("follow_up_symptoms").on(t.investigationId).where(sql`${t.symptomatic} and ${t.open}`),
    index("follow_up_together")
      .on(t.investigationId, t.together)
      .where(sql`${t.together} is not null`),
  ],
);
