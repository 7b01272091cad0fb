import {
  buildGraph,
  exposureFilter,
  type Graph,
  inducedSubgraph,
  MISSING_DAY,
} from "../../shared/core/index.ts";
import { type GraphSnapshot, INTERVIEWED_ANSWER, isCaseCode } from "./graph-store.ts";

/** A stretch of exposure days, inclusive, open on a side that is null; null = every exposure. */
export type DayRange = { readonly from: number | null; readonly to: number | null } | null;

/** True when an exposure's days meet a range; without any day it meets only "every exposure". */
export function meets(first: number, last: number, range: DayRange): boolean {
  if (range === null) return true;
  const one = first === MISSING_DAY ? last : first;
  const other = last === MISSING_DAY ? first : last;
  if (one === MISSING_DAY) return false;
  const low = Math.min(one, other);
  const high = Math.max(one, other);
  return (range.to === null || low <= range.to) && (range.from === null || high >= range.from);
}

/** Who is on record at an instant (ms): one flag per person. */
export function onRecord(snapshot: GraphSnapshot, at: number): Uint8Array {
  const { recordedAt, withdrawnAt } = snapshot.people;
  const flags = new Uint8Array(recordedAt.length);
  for (let k = 0; k < flags.length; k++) {
    if ((recordedAt[k] as number) <= at && (withdrawnAt[k] as number) > at) flags[k] = 1;
  }
  return flags;
}

/** What the record says about interviews at an instant. */
export type Interviewed = {
  /** One flag per person: a complete interview stands. */
  readonly flags: Uint8Array;
  /** Some interview, or some answer to "interviewed?", is on record. */
  readonly known: boolean;
};

/**
 * Who counts as interviewed at an instant: a complete interview was recorded and not withdrawn. A
 * person whose own column says yes without any interview row counts from when they were recorded.
 */
export function interviewedAt(snapshot: GraphSnapshot, at: number): Interviewed {
  const { recordedAt: entered, interviewedAnswer } = snapshot.people;
  const { person, complete, recordedAt, withdrawnAt } = snapshot.interviews;
  const flags = new Uint8Array(entered.length);
  const hasRow = new Uint8Array(entered.length);
  let known = false;
  for (let k = 0; k < person.length; k++) {
    const who = person[k] as number;
    if (recordedAt[k] !== Number.POSITIVE_INFINITY) hasRow[who] = 1;
    if ((recordedAt[k] as number) > at) continue;
    known = true;
    if (complete[k] === 1 && (withdrawnAt[k] as number) > at) flags[who] = 1;
  }
  for (let k = 0; k < flags.length; k++) {
    if (interviewedAnswer[k] === INTERVIEWED_ANSWER.blank || (entered[k] as number) > at) continue;
    known = true;
    if (interviewedAnswer[k] === INTERVIEWED_ANSWER.yes && hasRow[k] === 0) flags[k] = 1;
  }
  return { flags, known };
}

/**
 * Classification of each person at an instant (null = now), as codes: the latest entry of the
 * history up to then. A person without any history has what their record says.
 */
export function classifiedAt(snapshot: GraphSnapshot, at: number | null): Uint8Array {
  const codes = Uint8Array.from(snapshot.people.classification);
  if (at === null) return codes;
  const { person, code, recordedAt } = snapshot.classified;
  const latest = new Float64Array(codes.length).fill(Number.NEGATIVE_INFINITY);
  for (let k = 0; k < person.length; k++) {
    const who = person[k] as number;
    const when = recordedAt[k] as number;
    if (when === Number.POSITIVE_INFINITY) continue;
    if (latest[who] === Number.NEGATIVE_INFINITY) {
      // The first entry met: what the record says now need not have been said yet.
      latest[who] = -Number.MAX_VALUE;
      codes[who] = 0;
    }
    if (when <= at && when >= (latest[who] as number)) {
      latest[who] = when;
      codes[who] = code[k] as number;
    }
  }
  return codes;
}

/** Flags of cases among classification codes. */
export function casesOf(codes: Uint8Array): Uint8Array {
  return codes.map((code) => (isCaseCode(code) ? 1 : 0));
}

/** The graph of everyone on record at a cut-off, with the pairs of a range of days. */
export type Selection = {
  /** Person number in the snapshot of each person of the graph. */
  readonly original: Int32Array;
  readonly graph: Graph;
  /** Pair number in the snapshot of each distinct pair of the graph, and its ends in the graph. */
  readonly pair: Int32Array;
  readonly a: Int32Array;
  readonly b: Int32Array;
  /** Exposures without any day on record then. */
  readonly undated: number;
};

/**
 * Selects people and pairs as the record stood at an instant.
 *
 * @param asOf ms, or null for the current record
 */
export function select(snapshot: GraphSnapshot, asOf: number | null, range: DayRange): Selection {
  const there = onRecord(snapshot, asOf ?? Number.MAX_VALUE);
  const number = new Int32Array(there.length).fill(-1);
  let n = 0;
  for (let k = 0; k < there.length; k++) if (there[k] === 1) number[k] = n++;
  const original = new Int32Array(n);
  for (let k = 0; k < there.length; k++) if (there[k] === 1) original[number[k] as number] = k;

  const found = exposureFilter(
    { pairA: snapshot.pairs.a, pairB: snapshot.pairs.b, ...snapshot.exposures },
    { from: range?.from ?? null, to: range?.to ?? null, asOf },
  );
  const a = new Int32Array(found.a.length);
  const b = new Int32Array(found.a.length);
  const pair = new Int32Array(found.a.length);
  let m = 0;
  for (let k = 0; k < found.a.length; k++) {
    const u = number[found.a[k] as number] as number;
    const v = number[found.b[k] as number] as number;
    if (u < 0 || v < 0) continue;
    a[m] = u;
    b[m] = v;
    pair[m++] = found.pair[k] as number;
  }
  return {
    original,
    graph: buildGraph(n, { a, b }, m),
    pair: pair.subarray(0, m),
    a: a.subarray(0, m),
    b: b.subarray(0, m),
    undated: found.undated,
  };
}

/**
 * Whether any telling is on record at an instant, and whether any of them carries a day.
 */
export function tellingsAt(
  snapshot: GraphSnapshot,
  at: number,
): { readonly any: boolean; readonly dated: boolean } {
  const { firstDay, lastDay, recordedAt, withdrawnAt } = snapshot.exposures;
  let any = false;
  for (let k = 0; k < firstDay.length; k++) {
    if ((recordedAt[k] as number) > at || (withdrawnAt[k] as number) <= at) continue;
    any = true;
    if (firstDay[k] !== MISSING_DAY || lastDay[k] !== MISSING_DAY) return { any, dated: true };
  }
  return { any, dated: false };
}

/** Narrows a selection to the flagged people (numbered as in the selection). */
export function narrow(selection: Selection, keep: Uint8Array): Selection {
  const { graph, original } = inducedSubgraph(selection.graph, keep);
  const number = new Int32Array(keep.length).fill(-1);
  original.forEach((from, to) => {
    number[from] = to;
  });
  const kept: number[] = [];
  selection.a.forEach((u, k) => {
    if (keep[u] === 1 && keep[selection.b[k] as number] === 1) kept.push(k);
  });
  return {
    graph,
    original: original.map((from) => selection.original[from] as number),
    pair: Int32Array.from(kept, (k) => selection.pair[k] as number),
    a: Int32Array.from(kept, (k) => number[selection.a[k] as number] as number),
    b: Int32Array.from(kept, (k) => number[selection.b[k] as number] as number),
    undated: selection.undated,
  };
}

/** Flags by person number of the snapshot → flags by person number of a selection. */
export function flagsOf(selection: Selection, flags: Uint8Array): Uint8Array {
  return Uint8Array.from(selection.original, (person) => flags[person] as number);
}
