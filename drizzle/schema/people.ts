import { sql } from "drizzle-orm";
import {
  type AnyPgColumn,
  boolean,
  check,
  index,
  integer,
  primaryKey,
  smallint,
  text,
  uniqueIndex,
  uuid,
} from "drizzle-orm/pg-core";
import { investigation, investigationId, team } from "./investigations.ts";
import { at, bytea, core, identity, recordedAt } from "./shared.ts";

export const place = core.table(
  "place",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    number: integer("number").notNull(),
    // Null for a household: its name is identity and stands encrypted elsewhere.
    name: text("name"),
    setting: text("setting"),
    area: text("area"),
    version: integer("version").notNull().default(1),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
  },
  (t) => [
    uniqueIndex("place_number").on(t.investigationId, t.number),
    index("place_name").on(t.investigationId, sql`lower(${t.name})`),
  ],
);

/** An index of the people of an investigation in the order of one column. */
function listOrder(
  name: string,
  investigation: AnyPgColumn,
  column: AnyPgColumn,
  { id, withdrawnAt }: { id: AnyPgColumn; withdrawnAt: AnyPgColumn },
) {
  return index(`person_list_${name}`)
    .on(investigation, column, id)
    .where(sql`${withdrawnAt} is null`);
}

export const person = core.table(
  "person",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    studyNumber: text("study_number").notNull(),
    sex: text("sex"),
    ageBand: text("age_band"),
    area: text("area"),
    occupation: text("occupation"),
    householdId: uuid("household_id").references(() => place.id),
    classification: text("classification"),
    caseDefinitionVersion: integer("case_definition_version").notNull().default(1),
    onsetDate: text("onset_date"),
    // Copies of the reference test (first positive, else the latest), kept for sorting in SQL.
    specimenDate: text("specimen_date"),
    resultDate: text("result_date"),
    result: text("result"),
    reportDate: text("report_date"),
    // Copies of what the interviews say: state of the best one, and the day of the first complete.
    interviewDate: text("interview_date"),
    interviewed: text("interviewed"),
    interviewState: text("interview_state"),
    isolationDate: text("isolation_date"),
    outcome: text("outcome"),
    outcomeDate: text("outcome_date"),
    becameCase: boolean("became_case").notNull().default(false),
    assignedAccountId: uuid("assigned_account_id"),
    assignedTeamId: uuid("assigned_team_id").references(() => team.id),
    source: text("source").notNull().default("form"),
    version: integer("version").notNull().default(1),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
    updatedAt: at("updated_at").notNull().defaultNow(),
    withdrawnAt: at("withdrawn_at"),
  },
  (t) => [
    uniqueIndex("person_study_number").on(t.investigationId, t.studyNumber),
    // One for each order that somebody works in: any page of it, and its total, are
    // then read from the index alone. Other orders are sorted for each question.
    listOrder("recorded", t.investigationId, t.recordedAt, t),
    listOrder("study", t.investigationId, t.studyNumber, t),
    listOrder("class", t.investigationId, t.classification, t),
    listOrder("onset", t.investigationId, t.onsetDate, t),
    listOrder("report", t.investigationId, t.reportDate, t),
    listOrder("age", t.investigationId, t.ageBand, t),
    listOrder("sex", t.investigationId, t.sex, t),
    listOrder("area", t.investigationId, t.area, t),
    listOrder("result", t.investigationId, t.result, t),
    listOrder("interview", t.investigationId, t.interviewState, t),
    listOrder("occupation", t.investigationId, t.occupation, t),
    listOrder("outcome", t.investigationId, t.outcome, t),
    listOrder("specimen", t.investigationId, t.specimenDate, t),
    listOrder("isolation", t.investigationId, t.isolationDate, t),
    index("person_household").on(t.householdId),
    index("person_assigned").on(t.assignedAccountId),
    index("person_team").on(t.assignedTeamId),
    check(
      "person_classification_known",
      sql`${t.classification} in ('confirmed','probable','suspected','not_a_case','contact')`,
    ),
  ],
);

export const classification = core.table(
  "classification",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id),
    classification: text("classification").notNull(),
    caseDefinitionVersion: integer("case_definition_version").notNull(),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
  },
  (t) => [
    index("classification_person").on(t.personId, t.recordedAt),
    index("classification_investigation").on(t.investigationId),
  ],
);

export const testResult = core.table(
  "test_result",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id),
    specimenDate: text("specimen_date"),
    kind: text("kind"),
    result: text("result"),
    resultDate: text("result_date"),
    resultAt: at("result_at"),
    version: integer("version").notNull().default(1),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
    withdrawnAt: at("withdrawn_at"),
  },
  (t) => [index("test_result_person").on(t.personId)],
);

export const identityPerson = identity.table(
  "person",
  {
    personId: uuid("person_id")
      .primaryKey()
      .references(() => person.id),
    investigationId: uuid("investigation_id").notNull(),
    refCipher: bytea("ref_cipher"),
    refToken: bytea("ref_token"),
    nameCipher: bytea("name_cipher"),
    nameMasked: text("name_masked"),
    phoneCipher: bytea("phone_cipher"),
    phoneLast2: text("phone_last2"),
    emailCipher: bytea("email_cipher"),
    emailMasked: text("email_masked"),
    birthDateCipher: bytea("birth_date_cipher"),
    birthYear: integer("birth_year"),
    addressCipher: bytea("address_cipher"),
    noteCipher: bytea("note_cipher"),
  },
  (t) => [uniqueIndex("identity_person_ref").on(t.investigationId, t.refToken)],
);

/** Keyed tokens: what a person is found by. Kinds: see server/identity/tokens.ts. */
export const searchToken = identity.table(
  "search_token",
  {
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id),
    investigationId: uuid("investigation_id").notNull(),
    kind: smallint("kind").notNull(),
    token: bytea("token").notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.investigationId, t.token, t.kind, t.personId] }),
    index("search_token_person").on(t.personId),
  ],
);

export const identityPlace = identity.table(
  "place",
  {
    placeId: uuid("place_id")
      .primaryKey()
      .references(() => place.id),
    investigationId: uuid("investigation_id").notNull(),
    nameCipher: bytea("name_cipher").notNull(),
    nameToken: bytea("name_token").notNull(),
  },
  (t) => [uniqueIndex("identity_place_name").on(t.investigationId, t.nameToken)],
);

export const dataKey = identity.table("data_key", {
  investigationId: uuid("investigation_id")
    .primaryKey()
    .references(() => investigation.id),
  wrappedKey: bytea("wrapped_key").notNull(),
  recordedAt: recordedAt(),
});

export const matchReview = core.table(
  "match_review",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id),
    otherId: uuid("other_id")
      .notNull()
      .references(() => person.id),
    matchedOn: text("matched_on").array().notNull(),
    state: text("state").notNull().default("open"),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
  },
  (t) => [uniqueIndex("match_review_pair").on(t.personId, t.otherId)],
);
