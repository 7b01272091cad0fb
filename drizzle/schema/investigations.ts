import { sql } from "drizzle-orm";
import {
  bigint,
  boolean,
  check,
  index,
  integer,
  jsonb,
  text,
  uniqueIndex,
  uuid,
} from "drizzle-orm/pg-core";
import { at, core, recordedAt } from "./shared.ts";

export const investigation = core.table("investigation", {
  id: uuid("id").primaryKey(),
  name: text("name").notNull(),
  invented: boolean("invented").notNull().default(false),
  timeZone: text("time_zone").notNull(),
  countryCode: text("country_code").notNull(),
  populationAtRisk: integer("population_at_risk"),
  infectiousBefore: integer("infectious_before").notNull(),
  infectiousAfter: integer("infectious_after").notNull(),
  incubationMin: integer("incubation_min").notNull(),
  incubationMax: integer("incubation_max").notNull(),
  monitoringDays: integer("monitoring_days").notNull(),
  // Due days in a row without being reached after which a contact counts as lost.
  lostAfterDays: integer("lost_after_days").notNull().default(3),
  clusterWindowDays: integer("cluster_window_days").notNull().default(14),
  clusterMinimumCases: integer("cluster_minimum_cases").notNull().default(2),
  // Null: twice the longest incubation.
  closureDays: integer("closure_days"),
  smallCellThreshold: integer("small_cell_threshold").notNull().default(5),
  // Shapes: shared/contracts/settings.ts. Empty: the defaults there.
  exposureGrading: jsonb("exposure_grading"),
  symptoms: jsonb("symptoms"),
  texts: jsonb("texts").notNull().default([]),
  // For learning: may be emptied, sends nothing, counts nowhere.
  practice: boolean("practice").notNull().default(false),
  caseDefinitionVersion: integer("case_definition_version").notNull().default(1),
  graphVersion: bigint("graph_version", { mode: "number" }).notNull().default(0),
  nextNumber: integer("next_number").notNull().default(1),
  version: integer("version").notNull().default(1),
  recordedAt: recordedAt(),
  recordedBy: uuid("recorded_by"),
});

/** The column by which a row belongs to an investigation. */
export const investigationId = () =>
  uuid("investigation_id")
    .notNull()
    .references(() => investigation.id);

export const caseDefinition = core.table(
  "case_definition",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    number: integer("number").notNull(),
    wording: text("wording").notNull(),
    // What each class asks for (shared/contracts/settings.ts); empty: the defaults there.
    rules: jsonb("rules"),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
  },
  (t) => [uniqueIndex("case_definition_number").on(t.investigationId, t.number)],
);

/** Every change of the settings, in order: which ones, from what and to what. */
export const settingChange = core.table(
  "setting_change",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    // The version of the investigation that the change made.
    version: integer("version").notNull(),
    changes: jsonb("changes").notNull(),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
  },
  (t) => [uniqueIndex("setting_change_version").on(t.investigationId, t.version)],
);

export const team = core.table("team", {
  id: uuid("id").primaryKey(),
  investigationId: investigationId(),
  name: text("name").notNull(),
  version: integer("version").notNull().default(1),
  recordedAt: recordedAt(),
  // Taken off the list; kept for the memberships of the past that name it.
  removedAt: at("removed_at"),
});

export const member = core.table(
  "member",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    accountId: uuid("account_id").notNull(),
    role: text("role").notNull(),
    teamId: uuid("team_id").references(() => team.id),
    since: at("since").notNull().defaultNow(),
    // Last day of the role, in the investigation's zone; it ends by itself when that day does.
    endsOn: text("ends_on"),
    endedAt: at("ended_at"),
    version: integer("version").notNull().default(1),
    recordedBy: uuid("recorded_by"),
  },
  (t) => [
    uniqueIndex("member_live")
      .on(t.investigationId, t.accountId, t.role)
      .where(sql`${t.endedAt} is null`),
    index("member_account").on(t.accountId),
    check("member_role", sql`${t.role} in ('tracer','supervisor','epidemiologist','officer')`),
  ],
);

/** What happened to the graph, in order; the live graphs follow it by version. */
export const graphChange = core.table(
  "graph_change",
  {
    id: bigint("id", { mode: "number" }).primaryKey().generatedAlwaysAsIdentity(),
    investigationId: investigationId(),
    graphVersion: bigint("graph_version", { mode: "number" }).notNull(),
    // person | pair | exposure | interview | classification | withdrawn | bulk
    kind: text("kind").notNull(),
    personA: uuid("person_a"),
    personB: uuid("person_b"),
    recordedAt: recordedAt(),
  },
  (t) => [index("graph_change_version").on(t.investigationId, t.graphVersion)],
);

/** The message of each event; the dispatcher claims undone rows. */
export const outbox = core.table(
  "outbox",
  {
    id: bigint("id", { mode: "number" }).primaryKey().generatedAlwaysAsIdentity(),
    investigationId: uuid("investigation_id").notNull(),
    topic: text("topic").notNull(),
    entityId: uuid("entity_id"),
    graphVersion: bigint("graph_version", { mode: "number" }),
    recordedAt: recordedAt(),
    doneAt: at("done_at"),
  },
  (t) => [index("outbox_undone").on(t.id).where(sql`${t.doneAt} is null`)],
);
