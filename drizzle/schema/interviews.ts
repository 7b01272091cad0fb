import { sql } from "drizzle-orm";
import {
  bigint,
  check,
  index,
  integer,
  primaryKey,
  real,
  text,
  uniqueIndex,
  uuid,
} from "drizzle-orm/pg-core";
import { investigationId } from "./investigations.ts";
import { person, place } from "./people.ts";
import { at, bytea, core, identity, recordedAt } from "./shared.ts";

export const interview = core.table(
  "interview",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id),
    outcome: text("outcome").notNull(),
    channel: text("channel"),
    heldAt: at("held_at").notNull(),
    day: text("day").notNull(),
    source: text("source").notNull().default("form"),
    graphVersion: bigint("graph_version", { mode: "number" }),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
    withdrawnAt: at("withdrawn_at"),
  },
  (t) => [
    index("interview_person").on(t.personId),
    index("interview_investigation").on(t.investigationId, t.recordedAt),
  ],
);

export const contactPair = core.table(
  "contact_pair",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    personA: uuid("person_a")
      .notNull()
      .references(() => person.id),
    personB: uuid("person_b")
      .notNull()
      .references(() => person.id),
    recordedAt: recordedAt(),
    withdrawnAt: at("withdrawn_at"),
  },
  (t) => [
    uniqueIndex("contact_pair_people").on(t.investigationId, t.personA, t.personB),
    index("contact_pair_a").on(t.personA),
    index("contact_pair_b").on(t.personB),
    // One row for two people, whichever of them told of it.
    check("contact_pair_order", sql`${t.personA} < ${t.personB}`),
  ],
);

/** One telling of a contact pair. */
export const exposure = core.table(
  "exposure",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    pairId: uuid("pair_id")
      .notNull()
      .references(() => contactPair.id),
    interviewId: uuid("interview_id").references(() => interview.id),
    importId: uuid("import_id"),
    namedBy: uuid("named_by").references(() => person.id),
    firstExposure: text("first_exposure"),
    lastExposure: text("last_exposure"),
    setting: text("setting"),
    placeId: uuid("place_id").references(() => place.id),
    minutes: integer("minutes"),
    minutesMissing: text("minutes_missing"),
    distanceM: real("distance_m"),
    distanceMissing: text("distance_missing"),
    physical: text("physical"),
    indoors: text("indoors"),
    relation: text("relation"),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
    withdrawnAt: at("withdrawn_at"),
  },
  (t) => [
    index("exposure_pair").on(t.pairId),
    index("exposure_interview").on(t.interviewId),
    index("exposure_place").on(t.placeId),
    index("exposure_investigation").on(t.investigationId),
    check(
      "exposure_setting_known",
      sql`${t.setting} in ('household','workplace','school','health_care','social','transport','other','unknown','refused')`,
    ),
  ],
);

/** People who cannot be named: a count, kept apart from the graph. */
export const groupExposure = core.table(
  "group_exposure",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    interviewId: uuid("interview_id")
      .notNull()
      .references(() => interview.id),
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id),
    setting: text("setting"),
    placeId: uuid("place_id").references(() => place.id),
    firstExposure: text("first_exposure"),
    lastExposure: text("last_exposure"),
    countMin: integer("count_min"),
    countMax: integer("count_max"),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
    withdrawnAt: at("withdrawn_at"),
  },
  (t) => [
    index("group_exposure_person").on(t.personId),
    index("group_exposure_interview").on(t.interviewId),
  ],
);

/** What an interviewer has typed and not yet submitted; encrypted, one per person and account. */
export const interviewDraft = identity.table(
  "interview_draft",
  {
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id),
    accountId: uuid("account_id").notNull(),
    investigationId: uuid("investigation_id").notNull(),
    bodyCipher: bytea("body_cipher").notNull(),
    version: integer("version").notNull().default(1),
    updatedAt: at("updated_at").notNull().defaultNow(),
  },
  (t) => [primaryKey({ columns: [t.personId, t.accountId] })],
);
