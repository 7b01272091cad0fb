import { z } from "zod";
import { SETTINGS } from "../vocabulary.ts";
import { day, listOf } from "./common.ts";

/** Kinds of place that joins rest on; `contact_only` where no join rests on a place. */
export const CLUSTER_KINDS = [...SETTINGS, "unknown", "contact_only"] as const;
export type ClusterKind = (typeof CLUSTER_KINDS)[number];

/** Study numbers told of one proposed cluster; `cases` counts all of its members. */
export const CLUSTER_MEMBERS_TOLD = 50;

/**
 * A proposed cluster: a suggestion by calculation, nobody's decision. `number` is its place in the
 * list of the moment and no identity: it moves when cases or contacts come on record. `onsets` are
 * reference days, each with how it is known; `newInLast7Days` counts those from six days before
 * today up to today. `members` are study numbers, earliest reference day first.
 */
export const clusterAnswer = z.strictObject({
  number: z.int().min(1),
  kind: z.enum(CLUSTER_KINDS),
  cases: z.int().min(2),
  firstDay: day,
  lastDay: day,
  onsets: z.array(
    z.strictObject({ day, count: z.int().min(1), basis: z.enum(["onset", "specimen"]) }),
  ),
  newInLast7Days: z.int().min(0),
  places: z.int().min(0),
  members: z.array(z.string()).max(CLUSTER_MEMBERS_TOLD),
});
export type Cluster = z.output<typeof clusterAnswer>;

export const clusterList = listOf(clusterAnswer).extend({
  graphVersion: z.int(),
  /** True when the record went on since; the live stream says when the next answer is there. */
  updating: z.boolean(),
  /** The investigation's day that `newInLast7Days` looks back from. */
  today: day,
  /** Days that the reference days of two joined cases differ by at most. */
  windowDays: z.int(),
  /** Cases that a proposed cluster has at least. */
  minimumCases: z.int(),
  /** Confirmed and probable cases without a whole onset or specimen day; they join nothing. */
  withoutReferenceDay: z.int(),
});
export type ClusterList = z.output<typeof clusterList>;
