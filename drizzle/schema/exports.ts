import { boolean, index, integer, jsonb, primaryKey, real, text, uuid } from "drizzle-orm/pg-core";
import { investigationId } from "./investigations.ts";
import { at, bytea, core, identity, recordedAt } from "./shared.ts";

/** A file taken out of an investigation: what was asked for, by whom and why, and what came of it. */
export const fileExport = core.table(
  "export",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    kind: text("kind").notNull(),
    identified: boolean("identified").notNull(),
    purpose: text("purpose").notNull(),
    reason: text("reason"),
    // The role it was made in: the file holds what that role may read, and is that role's alone.
    role: text("role").notNull(),
    // Coded values of the line list's filters; never anything that was searched for.
    filter: jsonb("filter").notNull().default({}),
    columns: text("columns").array().notNull(),
    state: text("state").notNull(),
    progress: real("progress").notNull().default(0),
    failure: text("failure"),
    rowCount: integer("row_count").notNull().default(0),
    bytes: integer("bytes").notNull().default(0),
    parts: integer("parts").notNull().default(0),
    sha256: text("sha256"),
    downloads: integer("downloads").notNull().default(0),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by").notNull(),
    finishedAt: at("finished_at"),
    expiresAt: at("expires_at"),
  },
  (t) => [index("export_recorded").on(t.investigationId, t.recordedAt)],
);

/** The bytes of a made file, encrypted in parts, deleted after a day. */
export const exportPart = identity.table(
  "export_part",
  {
    // No reference: checking it would lock the export's row for as long as the file is being made.
    exportId: uuid("export_id").notNull(),
    investigationId: uuid("investigation_id").notNull(),
    part: integer("part").notNull(),
    bodyCipher: bytea("body_cipher").notNull(),
  },
  (t) => [primaryKey({ columns: [t.exportId, t.part] })],
);
