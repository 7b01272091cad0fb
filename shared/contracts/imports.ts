import { z } from "zod";
import { uuid } from "./common.ts";

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

/** A staged file: what it holds, what is wrong with it, and how far its commit is. */
export const importAnswer = z.strictObject({
  id: uuid,
  kind: z.enum(IMPORT_KINDS),
  state: z.enum(IMPORT_STATES),
  rows: z.int(),
  counts: z.record(z.string(), z.int()),
  problems: z.array(importProblem),
  problemCount: z.int(),
  progress: z.number().min(0).max(1),
  createMissing: z.boolean(),
  recordedAt: z.string(),
  committedAt: z.string().nullable(),
});
export type Import = z.output<typeof importAnswer>;

export const importCommitInput = z.strictObject({
  createMissing: z.boolean({ error: "wrong_type" }).default(false),
});
