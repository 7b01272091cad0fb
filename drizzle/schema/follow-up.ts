import { sql } from "drizzle-orm";
import { check, index, text, uuid } from "drizzle-orm/pg-core";
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
