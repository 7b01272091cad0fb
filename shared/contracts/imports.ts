import { z } from "zod";
import { listQuery, uuid } from "./common.ts";

export const PEOPLE_COLUMNS = [
  "ref",
  "name",
  "phone",
  "email",
  "birth_date",
  "sex",
  "address",
  "area",
  "occupation",
  "household",
  "classification",
  "onset_date",
  "specimen_date",
  "result_date",
  "result",
  "report_date",
  "interview_date",
  "interviewed",
  "isolation_date",
  "died_date",
] as const;
export const PAIR_COLUMNS = [
  "ref_a",
  "ref_b",
  "first_exposure",
  "last_exposure",
  "setting",
  "place",
  "minutes",
  "distance_m",
  "named_by",
] as const;
export const IMPORT_KINDS = ["people", "pairs"] as const;
export const IMPORT_STATES = [
  "checking",
  "ready",
  "refused",
  "committing",
  "committed",
  "failed",
] as const;

/** One problem of a file: where, which column, and a code; never the value. */
export const importProblem = z.strictObject({
  line: z.int(),
  column: z.string(),
  code: z.string(),
});

const encoding = z.enum(["utf-8", "utf-16le", "utf-16be"]);
const delimiter = z.enum(["comma", "semicolon", "tab"]);

/**
 * How a file is read. `columns` by position: our column, or null for one that is left out, and how
 * that came about. The file's own headings are not kept: in a file without any they are data.
 */
export const importReading = z.strictObject({
  encoding,
  mark: z.boolean(),
  delimiter,
  columns: z.array(
    z.strictObject({
      column: z.string().nullable(),
      how: z.enum(["exact", "alike", "chosen", "left_out"]),
    }),
  ),
});
export type ImportReading = z.output<typeof importReading>;

/**
 * What the first line of a file says, before anything is checked or kept. Headings go back to the
 * one who sent them and nowhere else.
 */
export const headingsAnswer = z.strictObject({
  encoding,
  mark: z.boolean(),
  delimiter,
  columns: z.array(
    z.strictObject({
      heading: z.string(),
      column: z.string().nullable(),
      how: z.enum(["exact", "alike", "unknown"]),
    }),
  ),
});
export type HeadingsAnswer = z.output<typeof headingsAnswer>;

const kind = z.enum(IMPORT_KINDS, { error: "not_in_list" });

/** Fields beside a file: what it lists, and by position the column each of its columns is. */
export const headingsInput = z.strictObject({ kind });
export const importInput = z.strictObject({
  kind,
  columns: z
    .string({ error: "not_text" })
    .transform((value, context) => {
      try {
        return JSON.parse(value) as unknown;
      } catch {
        context.issues.push({ code: "custom", message: "not_text", input: "" });
        return z.NEVER;
      }
    })
    .pipe(
      z
        .array(
          z
            .enum([...PEOPLE_COLUMNS, ...PAIR_COLUMNS], { error: "not_in_list" })
            .nullable()
            .optional(),
          { error: "wrong_type" },
        )
        .max(256, { error: "too_many" })
        .transform((list) => list.map((column) => column ?? null)),
    )
    .optional(),
});

/** A staged file: what it holds, what is wrong with it, and how far its commit is. */
export const importAnswer = z.strictObject({
  id: uuid,
  kind: z.enum(IMPORT_KINDS),
  state: z.enum(IMPORT_STATES),
  rows: z.int(),
  counts: z.record(z.string(), z.int()),
  problems: z.array(importProblem),
  problemCount: z.int(),
  /** Null for files that were brought in before this was kept. */
  reading: importReading.nullable(),
  progress: z.number().min(0).max(1),
  createMissing: z.boolean(),
  recordedAt: z.string(),
  committedAt: z.string().nullable(),
});
export type Import = z.output<typeof importAnswer>;

export const importCommitInput = z.strictObject({
  createMissing: z.boolean({ error: "wrong_type" }).default(false),
});

/** What makes a row doubtful, the strongest first. */
export const MATCHED_ON = ["phone_and_name", "name_and_birth_year", "phone", "name"] as const;
export type MatchedOn = (typeof MATCHED_ON)[number];

/** As far as the acting role may see: whole values, or initials, last digits and the year. */
const likeness = z.strictObject({
  name: z.string().nullable(),
  phone: z.string().nullable(),
  born: z.string().nullable(),
});

/**
 * Rows of a people file that may be somebody on record or an earlier row: they wait for a person to
 * say so. `other` is null while an earlier row itself waits.
 */
export const importMatchList = z.strictObject({
  items: z.array(
    z.strictObject({
      id: uuid,
      line: z.int(),
      matchedOn: z.enum(MATCHED_ON),
      row: likeness,
      other: likeness.extend({ personId: uuid, studyNumber: z.string() }).nullable(),
    }),
  ),
  total: z.int(),
  page: z.int(),
  pageSize: z.int(),
  kinds: z.array(z.strictObject({ matchedOn: z.enum(MATCHED_ON), waiting: z.int() })),
});
export type ImportMatchList = z.output<typeof importMatchList>;
export const importMatchQuery = listQuery.pick({ page: true, pageSize: true });

/** A decision about some rows by id, or about the next of a kind in the order of the file. */
export const matchDecisionInput = z
  .strictObject({
    decision: z.enum(["same", "other"], { error: "not_in_list" }),
    ids: z.array(uuid).min(1, { error: "required" }).max(200, { error: "too_many" }).optional(),
    matchedOn: z.enum(MATCHED_ON, { error: "not_in_list" }).optional(),
  })
  .refine((body) => (body.ids === undefined) !== (body.matchedOn === undefined), {
    path: ["ids"],
    error: "required",
  });
/** `waiting`: rows passed over since the earlier row they look like is not decided yet. */
export const matchDecisionAnswer = z.strictObject({
  decided: z.int(),
  waiting: z.int(),
  left: z.int(),
  conflicts: z.int(),
});
