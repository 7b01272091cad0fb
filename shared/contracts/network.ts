import { z } from "zod";
import { day, listOf } from "./common.ts";

export const POPULATIONS = ["all", "cases", "interviewed"] as const;
export const VERDICTS = ["below", "inside_window", "above", "not_distinguishable"] as const;

/**
 * `asOf` is a day (its end in the investigation's zone) or an instant; `from`/`to` bound the
 * exposure days. Without `from` and `to` the preset window (length of the infectious window) holds;
 * `range=all` asks for every exposure, dated or not.
 */
export const summaryQuery = z.strictObject({
  population: z.enum(POPULATIONS, { error: "not_in_list" }).default("all"),
  from: day.optional(),
  to: day.optional(),
  asOf: z.union([day, z.iso.datetime({ offset: true })], { error: "not_an_instant" }).optional(),
  window: z.enum(["preset", "all"], { error: "not_in_list" }).optional(),
});
export type SummaryQuery = z.output<typeof summaryQuery>;

const nullableNumber = z.number().nullable();
export const thresholdAnswer = z.strictObject({
  population: z.enum(["complete", "interviewed"]),
  n: z.int(),
  interviewed: z.int(),
  pairsPerPerson: nullableNumber,
  pairsPerPersonInterval: z.tuple([z.number(), z.number()]).nullable(),
  criticalHalfWidth: nullableNumber,
  expectedGiantShare: nullableNumber,
  verdict: z.enum(VERDICTS).nullable(),
  openVerdicts: z.array(z.string()).optional(),
  recall: nullableNumber.optional(),
  pairsPerPersonRecallCorrected: nullableNumber.optional(),
  connectivity: nullableNumber.optional(),
});

export const summaryAnswer = z.strictObject({
  people: z.int(),
  pairs: z.int(),
  meanDegree: nullableNumber,
  density: nullableNumber,
  componentSizes: z.array(z.int()),
  isolates: z.int(),
  degreeCounts: z.array(z.int()),
  transitivity: nullableNumber,
  largestShare: nullableNumber,
  threshold: thresholdAnswer,
  reasons: z.record(z.string(), z.string()),
  population: z.enum(POPULATIONS),
  n: z.int(),
  from: z.string().nullable(),
  to: z.string().nullable(),
  asOf: z.string(),
  cutOff: z.string(),
  graphVersion: z.int(),
  window: z.enum(["preset", "all", "free"]),
  interviewed: z.int(),
  coverage: nullableNumber,
  meanDegreeInterviewed: nullableNumber,
  undated: z.int(),
  unresolvedGroupExposures: z.int(),
  trail: z.array(z.strictObject({ day: z.string(), pairsPerPerson: nullableNumber })),
});
export type NetworkSummary = z.output<typeof summaryAnswer>;

export const groupAnswer = z.strictObject({
  id: z.string(),
  size: z.int(),
  cases: z.int(),
  contacts: z.int(),
  grownSince: z.int(),
});
export type Group = z.output<typeof groupAnswer>;
export const groupList = listOf(groupAnswer).extend({ graphVersion: z.int(), since: z.string() });

export const graphQuery = summaryQuery.extend({ group: z.string().max(64).optional() });
export const graphAnswer = z.strictObject({
  graphVersion: z.int(),
  cutOff: z.string(),
  level: z.enum(["people", "groups"]),
  nodes: z.array(
    z.strictObject({
      id: z.string(),
      studyNumber: z.string(),
      classification: z.string().nullable(),
      becameCase: z.boolean(),
      group: z.string(),
      groupRank: z.int(),
      size: z.int(),
      x: z.number(),
      y: z.number(),
    }),
  ),
  pairs: z.array(z.strictObject({ id: z.string(), source: z.string(), target: z.string() })),
});
export type NetworkGraph = z.output<typeof graphAnswer>;
