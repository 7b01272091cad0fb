import {
  boolean,
  integer,
  jsonb,
  primaryKey,
  real,
  text,
  uniqueIndex,
  uuid,
} from "drizzle-orm/pg-core";
import { investigation } from "./investigations.ts";
import { at, bytea, core, identity, recordedAt } from "./shared.ts";

export const fileImport = core.table(
  "import",
  {
    id: uuid("id").primaryKey(),
    investigationId: uuid("investigation_id")
      .notNull()
      .references(() => investigation.id),
    kind: text("kind").notNull(),
    sha256: text("sha256").notNull(),
    state: text("state").notNull(),
    rowCount: integer("row_count").notNull().default(0),
    counts: jsonb("counts").notNull().default({}),
    // Line, column and code; never a value.
    problems: jsonb("problems").notNull().default([]),
    progress: real("progress").notNull().default(0),
    createMissing: boolean("create_missing").notNull().default(false),
    recordedAt: recordedAt(),
    recordedBy: uuid("recorded_by"),
    committedAt: at("committed_at"),
  },
  (t) => [uniqueIndex("import_file").on(t.investigationId, t.kind, t.sha256)],
);

/** Checked rows of a staged file, encrypted in chunks, deleted at commit or after a day. */
export const importStage = identity.table(
  "import_stage",
  {
    importId: uuid("import_id")
      .notNull()
      .references(() => fileImport.id),
    investigationId: uuid("investigation_id").notNull(),
    chunk: integer("chunk").notNull(),
    bodyCipher: bytea("body_cipher").notNull(),
  },
  (t) => [primaryKey({ columns: [t.importId, t.chunk] })],
);
