import { sql } from "drizzle-orm";
import {
  boolean,
  check,
  index,
  integer,
  json,
  jsonb,
  primaryKey,
  smallint,
  text,
  uniqueIndex,
  uuid,
} from "drizzle-orm/pg-core";
import { at, audit, auth, bytea, recordedAt } from "./shared.ts";

export const account = auth.table(
  "account",
  {
    id: uuid("id").primaryKey(),
    email: text("email").notNull(),
    displayName: text("display_name").notNull(),
    passwordHash: text("password_hash").notNull(),
    demo: boolean("demo").notNull().default(false),
    // Compared on every request: raising it ends all of an account's sessions at once.
    epoch: integer("epoch").notNull().default(1),
    disabledAt: at("disabled_at"),
    recordedAt: recordedAt(),
  },
  (t) => [uniqueIndex("account_email").on(sql`lower(${t.email})`)],
);

export const session = auth.table(
  "session",
  {
    sid: text("sid").primaryKey(),
    sess: json("sess").notNull(),
    expire: at("expire").notNull(),
    accountId: uuid("account_id"),
  },
  (t) => [index("session_expire").on(t.expire), index("session_account").on(t.accountId)],
);

/** Live contexts: a random nonce stands for (account, investigation, role) inside a transaction. */
export const ctxLive = auth.table(
  "ctx_live",
  {
    nonce: uuid("nonce").primaryKey(),
    accountId: uuid("account_id").notNull(),
    investigationId: uuid("investigation_id").notNull(),
    role: text("role").notNull(),
    expiresAt: at("expires_at").notNull(),
  },
  (t) => [index("ctx_live_account").on(t.accountId), index("ctx_live_expires").on(t.expiresAt)],
);

export const idempotency = auth.table(
  "idempotency",
  {
    accountId: uuid("account_id").notNull(),
    key: uuid("key").notNull(),
    route: text("route").notNull(),
    requestHash: text("request_hash").notNull(),
    status: smallint("status").notNull(),
    // Ids and versions only, never a body.
    receipt: jsonb("receipt").notNull(),
    recordedAt: recordedAt(),
  },
  (t) => [primaryKey({ columns: [t.accountId, t.key] }), index("idempotency_age").on(t.recordedAt)],
);

export const firstOfficerLink = auth.table("first_officer_link", {
  tokenHash: text("token_hash").primaryKey(),
  expiresAt: at("expires_at").notNull(),
  usedAt: at("used_at"),
});

/** Links sent by mail: an invitation into an investigation, or leave to choose a new password. */
export const invitation = auth.table(
  "invitation",
  {
    id: uuid("id").primaryKey(),
    // SHA-256 of the token; the token itself is in the letter only.
    tokenHash: text("token_hash").notNull(),
    kind: text("kind").notNull(),
    email: text("email").notNull(),
    accountId: uuid("account_id"),
    investigationId: uuid("investigation_id"),
    role: text("role"),
    teamId: uuid("team_id"),
    // Last day of the role it offers.
    endsOn: text("ends_on"),
    expiresAt: at("expires_at").notNull(),
    usedAt: at("used_at"),
    recordedBy: uuid("recorded_by"),
    recordedAt: recordedAt(),
  },
  (t) => [
    uniqueIndex("invitation_token").on(t.tokenHash),
    index("invitation_investigation").on(t.investigationId),
    index("invitation_account").on(t.accountId),
    check("invitation_kind", sql`${t.kind} in ('invitation', 'reset')`),
  ],
);

/** Letters to be sent: who gets which, with its token, sealed by the application. */
export const mail = auth.table(
  "mail",
  {
    id: uuid("id").primaryKey(),
    sealed: bytea("sealed").notNull(),
    attempts: smallint("attempts").notNull().default(0),
    dueAt: at("due_at").notNull().defaultNow(),
    expiresAt: at("expires_at").notNull(),
    recordedAt: recordedAt(),
  },
  (t) => [index("mail_due").on(t.dueAt)],
);

/** Failed attempts of the last hour by a hashed key: an address, or an address with an account. */
export const attempt = auth.table("attempt", {
  key: text("key").primaryKey(),
  failures: integer("failures").notNull(),
  since: at("since").notNull().defaultNow(),
  // When a known device may try again.
  freeAt: at("free_at").notNull().defaultNow(),
});

export const meta = auth.table("meta", {
  key: text("key").primaryKey(),
  value: text("value").notNull(),
});

/** Which role may open which identity field in full; written from the field registry. */
export const fieldRight = auth.table(
  "field_right",
  { role: text("role").notNull(), field: text("field").notNull() },
  (t) => [primaryKey({ columns: [t.role, t.field] })],
);

export const accessEvent = audit.table(
  "event",
  {
    id: uuid("id").primaryKey().defaultRandom(),
    at: at("at").notNull().defaultNow(),
    investigationId: uuid("investigation_id"),
    accountId: uuid("account_id"),
    role: text("role"),
    action: text("action").notNull(),
    personIds: uuid("person_ids").array().notNull().default(sql`'{}'::uuid[]`),
    fields: text("fields").array().notNull().default(sql`'{}'::text[]`),
    counts: jsonb("counts").notNull().default({}),
  },
  (t) => [
    index("event_investigation_at").on(t.investigationId, t.at.desc()),
    index("event_persons").using("gin", t.personIds),
  ],
);
