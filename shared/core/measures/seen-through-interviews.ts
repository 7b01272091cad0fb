import { buildGraph, type PairEnds } from "../graph/build-graph.ts";
import { type SampleSummary, sampleSummary } from "../stats/sample-summary.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";
import { recall } from "./recall.ts";
import { unresolvedShare } from "./unresolved-share.ts";

export type InterviewRecord = {
  /** Population at risk when declared, else people on record; at least the people in `isInterviewed`. */
  readonly n: number;
  /** One flag per person on record, non-zero = interviewed. */
  readonly isInterviewed: Uint8Array;
  /** Each naming: `a[k]` named `b[k]`. Repeats do not matter; namings by others are left out. */
  readonly named: PairEnds;
  /** People in group exposures who could not be named. */
  readonly unresolvedHeads: number;
};

export type SeenThroughInterviews = {
  readonly interviewed: number;
  /** i/n. */
  readonly coverage: Measured;
  /** Recorded contact pairs of each interviewed person, whoever told. */
  readonly pairsOfInterviewed: SampleSummary;
  /** Share of interviewed people without any recorded pair. */
  readonly withoutPair: Measured;
  /** Distinct people each interviewed person named. */
  readonly namedPerInterview: SampleSummary;
  /** Pairs of two interviewed people told by both of them, and by one. */
  readonly namedByBoth: number;
  readonly namedByOne: number;
  /** namedByBoth over both. */
  readonly doubleNamedShare: Measured;
  /** q from those. */
  readonly recall: Measured;
  /** Distinct people named, and those named by exactly one and two interviewed people. */
  readonly named: number;
  readonly namedOnce: number;
  readonly namedTwice: number;
  readonly unresolved: Measured;
};

/** Distinct namings by interviewed people, sorted by teller then named. */
function distinctNamings(record: InterviewRecord): { teller: Int32Array; told: Int32Array } {
  const { isInterviewed, named } = record;
  const people = isInterviewed.length;
  const keys = new Float64Array(named.a.length);
  let count = 0;
  for (let k = 0; k < named.a.length; k++) {
    if (isInterviewed[named.a[k]!] !== 0) keys[count++] = named.a[k]! * people + named.b[k]!;
  }
  const sorted = keys.subarray(0, count).sort();
  const teller = new Int32Array(count);
  const told = new Int32Array(count);
  let kept = 0;
  for (let k = 0; k < count; k++) {
    if (k > 0 && sorted[k] === sorted[k - 1]) continue;
    teller[kept] = Math.floor(sorted[k]! / people);
    told[kept++] = sorted[k]! % people;
  }
  return { teller: teller.subarray(0, kept), told: told.subarray(0, kept) };
}

/**
 * What was seen through interviews, to be stated before any comparison: coverage, how many pairs
 * and names an interview brought, how many pairs both sides told, what stayed a head count.
 *
 * @throws RangeError for a naming of nobody on record or of oneself, an n below the people on
 *   record, or a head count that is none
 *
 * Edge cases: nobody interviewed → coverage 0, the summaries undefined (`no_values`); no pair of
 * two interviewed people → double-named share undefined (`no_pairs`). Cost: O(namings log namings).
 * Source: methods C.8.5 ("Report apart"), C.8.2, C.8.3.
 */
export function seenThroughInterviews(record: InterviewRecord): SeenThroughInterviews {
  const { n, isInterviewed, named } = record;
  const people = isInterviewed.length;
  if (!Number.isSafeInteger(n) || n < people) {
    throw new RangeError("n must be a whole number, at least the people on record");
  }
  if (named.a.length !== named.b.length) throw new RangeError("naming columns differ in length");
  buildGraph(people, named); // checks every end before keys are made of them
  const { teller, told } = distinctNamings(record);
  const { offsets } = buildGraph(people, { a: teller, b: told });

  const namedBy = new Int32Array(people);
  const names = new Int32Array(people);
  let directed = 0;
  for (let k = 0; k < teller.length; k++) {
    names[teller[k]!]!++;
    namedBy[told[k]!]!++;
    if (isInterviewed[told[k]!] !== 0) directed++;
  }
  const degrees: number[] = [];
  const perInterview: number[] = [];
  let distinct = 0;
  let once = 0;
  let twice = 0;
  let alone = 0;
  for (let u = 0; u < people; u++) {
    const times = namedBy[u]!;
    if (times > 0) distinct++;
    if (times === 1) once++;
    if (times === 2) twice++;
    if (isInterviewed[u] === 0) continue;
    const degree = offsets[u + 1]! - offsets[u]!;
    degrees.push(degree);
    perInterview.push(names[u]!);
    if (degree === 0) alone++;
  }
  const both = doubleNamed(isInterviewed, teller, told);
  const one = directed - 2 * both;
  const interviewed = degrees.length;
  return {
    interviewed,
    coverage: n === 0 ? undefinedBecause("no_people") : defined(interviewed / n),
    pairsOfInterviewed: sampleSummary(degrees),
    withoutPair:
      interviewed === 0 ? undefinedBecause("no_one_interviewed") : defined(alone / interviewed),
    namedPerInterview: sampleSummary(perInterview),
    namedByBoth: both,
    namedByOne: one,
    doubleNamedShare:
      both + one === 0 ? undefinedBecause("no_pairs") : defined(both / (both + one)),
    recall: recall(both, one),
    named: distinct,
    namedOnce: once,
    namedTwice: twice,
    unresolved: unresolvedShare(record.unresolvedHeads, distinct),
  };
}

/** Pairs of two interviewed people that each end named. */
function doubleNamed(isInterviewed: Uint8Array, teller: Int32Array, told: Int32Array): number {
  const people = isInterviewed.length;
  const lower = new Set<number>();
  for (let k = 0; k < teller.length; k++) {
    const [u, v] = [teller[k]!, told[k]!];
    if (u < v && isInterviewed[v] !== 0) lower.add(u * people + v);
  }
  let both = 0;
  for (let k = 0; k < teller.length; k++) {
    const [u, v] = [teller[k]!, told[k]!];
    if (u > v && lower.has(v * people + u)) both++;
  }
  return both;
}
