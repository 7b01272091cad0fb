import { z } from "zod";
import { ROLES } from "../roles.ts";
import { LIMITS, listOf, optionalText, uuid } from "./common.ts";
import { IMPORT_KINDS } from "./imports.ts";
import { filterSet } from "./people-filters.ts";

/** What an export is for; `other` is said in words. */
export const EXPORT_PURPOSES = [
  "analysis",
  "handover",
  "laboratory",
  "authority",
  "correction",
  "other",
] as const;
export type ExportPurpose = (typeof EXPORT_PURPOSES)[number];

export const EXPORT_STATES = [
  "building",
  "ready",
  "cancelled",
  "failed",
  "deleted",
  "expired",
] as const;

/** Hours after which the bytes of a made file are deleted. */
export const EXPORT_HOURS = 24;

const choice = <const T extends readonly [string, ...string[]]>(values: T) =>
  z.enum(values, { error: "not_in_list" });

/** The line list's filters, all of them. What was searched for is no part of them. */
export const exportFilter = filterSet;
export type ExportFilter = z.output<typeof exportFilter>;

export const exportInput = z
  .strictObject({
    kind: choice(IMPORT_KINDS),
    identified: z.boolean({ error: "wrong_type" }).default(false),
    purpose: z.enum(EXPORT_PURPOSES, {
      error: ({ input }) => (input === undefined || input === "" ? "required" : "not_in_list"),
    }),
    reason: optionalText(LIMITS.shortText),
    filter: exportFilter.optional(),
  })
  .refine((body) => body.purpose !== "other" || body.reason !== null, {
    path: ["reason"],
    error: "required",
  })
  .refine((body) => body.kind === "people" || body.filter === undefined, {
    path: ["filter"],
    error: "only_for_people",
  });
export type ExportInput = z.output<typeof exportInput>;

/** A file taken out: what it holds, who asked and why, and what has come of it. */
export const exportAnswer = z.strictObject({
  id: uuid,
  kind: z.enum(IMPORT_KINDS),
  identified: z.boolean(),
  purpose: z.enum(EXPORT_PURPOSES),
  reason: z.string().nullable(),
  filter: exportFilter,
  /** Columns that hold something; the others of the file are blank. */
  columns: z.array(z.string()),
  role: z.enum(ROLES),
  accountId: uuid,
  /** Null where the acting role does not read the names of members. */
  displayName: z.string().nullable(),
  state: z.enum(EXPORT_STATES),
  progress: z.number().min(0).max(1),
  failure: z.string().nullable(),
  rows: z.int(),
  bytes: z.int(),
  sha256: z.string().nullable(),
  fileName: z.string(),
  downloads: z.int(),
  recordedAt: z.string(),
  finishedAt: z.string().nullable(),
  expiresAt: z.string().nullable(),
  can: z.strictObject({ download: z.boolean(), remove: z.boolean() }),
});
export type Export = z.output<typeof exportAnswer>;
export const exportList = listOf(exportAnswer);
