import {
  boolean,
  index,
  integer,
  jsonb,
  primaryKey,
  real,
  text,
  uniqueIndex,
  uuid,
} from "drizzle-orm/pg-core";
import { investigation } from "./investigations.ts";
import { person } from "./people.ts";
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
    // Encoding, separator, and which of our columns each column is; never a heading.
    reading: jsonb("reading"),
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

/**
 * Rows of a people file that look like somebody on record, or like an earlier row of the file: set
 * aside until a person decides. The row is encrypted, and deleted with the decision.
 */
export const importMatch = identity.table(
  "import_match",
  {
    id: uuid("id").primaryKey(),
    importId: uuid("import_id")
      .notNull()
      .references(() => fileImport.id),
    investigationId: uuid("investigation_id").notNull(),
    line: integer("line").notNull(),
    refToken: bytea("ref_token").notNull(),
    // The person it looks like; null when that is an earlier row, whose reference is in the body.
    otherId: uuid("other_id").references(() => person.id),
    matchedOn: text("matched_on").notNull(),
    bodyCipher: bytea("body_cipher"),
    state: text("state").notNull().default("open"),
    decidedBy: uuid("decided_by"),
    decidedAt: at("decided_at"),
  },
  (t) => [
    uniqueIndex("import_match_line").on(t.importId, t.line),
    index("import_match_ref").on(t.investigationId, t.refToken),
  ],
);

/** Further references of a person: those of rows that were decided to be the same person. */
export const refAlias = identity.table(
  "ref_alias",
  {
    investigationId: uuid("investigation_id").notNull(),
    refToken: bytea("ref_token").notNull(),
    personId: uuid("person_id")
      .notNull()
      .references(() => person.id),
  },
  (t) => [primaryKey({ columns: [t.investigationId, t.refToken] })],
);
