import { z } from "zod";
import { COMPARISON_KEYS, OBSERVATION_STATES, STANDINGS, STATISTICS } from "../core/index.ts";
import { day, LIMITS, listOf, listQuery, text, uuid } from "./common.ts";
import { POPULATIONS } from "./network.ts";

/** Attributes by which mixing can be compared; all of them are told to the epidemiologist. */
export const MIXING_ATTRIBUTES = [
  "age_band",
  "area",
  "setting",
  "interviewed",
  "household",
] as const;
export type MixingAttribute = (typeof MIXING_ATTRIBUTES)[number];

/** How many networks are drawn: a quick look, the default, before publication (methods C.7.4). */
export const REPLICATE_CHOICES = [199, 999, 9999] as const;

/** What is held fixed while the rest falls at random, in the order in which they are shown. */
export const BASELINES = [
  "traced",
  "gnm",
  "degreePreserving",
  "degreePreservingInterviewedEnd",
  "mixing",
] as const;
export type Baseline = (typeof BASELINES)[number];

export const RUN_STATES = ["running", "ready", "cancelled", "failed"] as const;

/** What to compare. Days as in the network report: `from`/`to` make a free range. */
export const compareRunInput = z.strictObject({
  name: text(LIMITS.name, 1),
  population: z.enum(POPULATIONS, { error: "not_in_list" }).default("all"),
  from: day.optional(),
  to: day.optional(),
  asOf: z.union([day, z.iso.datetime({ offset: true })], { error: "not_an_instant" }).optional(),
  window: z.enum(["preset", "all"], { error: "not_in_list" }).optional(),
  attribute: z.enum(MIXING_ATTRIBUTES, { error: "not_in_list" }).nullable().default(null),
  replicates: z
    .union(
      REPLICATE_CHOICES.map((one) => z.literal(one)),
      { error: "not_in_list" },
    )
    .default(999),
  seed: z
    .number({ error: "not_a_number" })
    .int({ error: "not_a_whole_number" })
    .min(0, { error: "too_small" })
    .max(Number.MAX_SAFE_INTEGER, { error: "too_big" })
    .default(1),
});
export type CompareRunInput = z.output<typeof compareRunInput>;

/** Another name for a run. */
export const compareRunPatch = z.strictObject({ name: text(LIMITS.name, 1) });
/** Query of the list; `q` looks into names. The order is fixed: newest first. */
export const compareRunQuery = listQuery;

const nullable = z.number().nullable();

/** A run as the list tells it. */
export const compareRunItem = z.strictObject({
  id: uuid,
  name: z.string(),
  state: z.enum(RUN_STATES),
  progress: z.number().min(0).max(1),
  /** Replicates of each baseline that are ready; fewer than wanted where time ran out. */
  reached: z.int(),
  replicates: z.int(),
  seed: z.int(),
  population: z.enum(POPULATIONS),
  window: z.enum(["preset", "all", "free"]),
  from: z.string().nullable(),
  to: z.string().nullable(),
  attribute: z.enum(MIXING_ATTRIBUTES).nullable(),
  asOf: z.string(),
  cutOff: z.string(),
  graphVersion: z.int(),
  /** Version of the numeric core, and the name of its generator of random numbers. */
  coreVersion: z.string(),
  generator: z.string(),
  people: z.int(),
  pairs: z.int(),
  /** Who asked, by display name. */
  by: z.string().nullable(),
  recordedAt: z.string(),
  finishedAt: z.string().nullable(),
  /** What the acting person may do with it; the download and "run again" are every reader's. */
  can: z.strictObject({ change: z.boolean() }).optional(),
});
export type CompareRunItem = z.output<typeof compareRunItem>;
export const compareRunList = listOf(compareRunItem);

/** One figure over the replicates of one baseline. */
const baselineFigure = z.strictObject({
  mean: nullable,
  sd: nullable,
  low: nullable,
  high: nullable,
  pUpper: nullable,
  pLower: nullable,
  pTwoSided: nullable,
  /** Adjusted over all measures of the table and this baseline (Holm 1979). */
  pHolm: nullable,
  undefinedReplicates: z.int(),
  /** Equal bins from the least to the largest replicate; null without any. */
  histogram: z
    .strictObject({ from: z.number(), to: z.number(), counts: z.array(z.int()) })
    .nullable(),
});

const compareMeasure = z.strictObject({
  statistic: z.enum(STATISTICS),
  observed: nullable,
  reason: z.string().nullable(),
  /** What adding a contact pair between known people can do to it. */
  monotone: z.enum(["up", "down", "either"]),
  baselines: z.partialRecord(z.enum(BASELINES), baselineFigure),
});
export type CompareMeasure = z.output<typeof compareMeasure>;

/** A curve with its bands: pointwise 95 %, and the global envelope by extreme rank length. */
const curveBand = z.strictObject({
  low: z.array(z.number()),
  high: z.array(z.number()),
  globalLow: z.array(z.number()).nullable(),
  globalHigh: z.array(z.number()).nullable(),
  /** p-value of the whole curve; null below the replicates that it needs. */
  p: nullable,
  /** True below 999 replicates. */
  quickLook: z.boolean(),
});
const curve = z.strictObject({
  /** Entry k: people with k pairs, or groups of k + 1 people; the last entry "that many or more". */
  observed: z.array(z.number()),
  baselines: z.partialRecord(z.enum(BASELINES), curveBand),
});

export const compareRunAnswer = compareRunItem.extend({
  failure: z.string().nullable(),
  result: z
    .strictObject({
      seen: z.strictObject({
        state: z.enum(OBSERVATION_STATES),
        n: z.int(),
        interviewed: z.int(),
        coverage: nullable,
        /** Pairs with two interviewed ends that both named, as a share; and the recall from them. */
        doubleNamedShare: nullable,
        recall: nullable,
        unresolvedGroupExposures: z.int(),
        undated: z.int(),
        /** On record, and not compared: seen through no interview (people, pairs). */
        leftOutPeople: z.int().optional(),
        leftOutPairs: z.int().optional(),
        /** What to print beside every comparison. */
        cautions: z.array(z.string()),
      }),
      comparisons: z.array(
        z.strictObject({
          key: z.enum(COMPARISON_KEYS),
          standing: z.enum(STANDINGS),
          /** Most weighty first; empty with `show`. */
          reasons: z.array(z.string()),
          instead: z.enum(COMPARISON_KEYS).nullable(),
        }),
      ),
      /** Baselines in the order of the screen; those that were not drawn say why. */
      baselines: z.array(
        z.strictObject({
          baseline: z.enum(BASELINES),
          standing: z.enum(STANDINGS),
          reasons: z.array(z.string()),
          drawn: z.boolean(),
          /** Parameters in words and numbers: burn-in, thinning, p, sigma, q … */
          parameters: z.record(z.string(), z.union([z.number(), z.string(), z.null()])),
        }),
      ),
      measures: z.array(compareMeasure),
      degrees: curve.extend({
        /** Expected people with k pairs under the laws of random mixing (methods C.1.2). */
        binomial: z.array(z.number()).nullable(),
        poisson: z.array(z.number()).nullable(),
      }),
      sizes: curve,
    })
    .nullable(),
});
export type CompareRun = z.output<typeof compareRunAnswer>;
