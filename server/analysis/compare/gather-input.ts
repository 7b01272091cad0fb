import type { MixingAttribute } from "../../../shared/contracts/compare.ts";
import { recall } from "../../../shared/core/index.ts";
import { countGroupExposures, dayRange, populationOf } from "../answer-report.ts";
import { type GraphSnapshot, NAMED_BY } from "../graph-store.ts";
import { namingsOf } from "../recall-of.ts";
import {
  type DayRange,
  interviewedAt,
  meets,
  narrow,
  type Selection,
  select,
  tellingsAt,
} from "../selection.ts";
import type { CompareInput, PairLists } from "./compare-input.ts";
import type { ComparedRecord } from "./read-record.ts";

/** Interviewed people of a selection in the order of their interviews. */
function interviewOrder(record: ComparedRecord, selection: Selection, flags: Uint8Array): number[] {
  const order: number[] = [];
  flags.forEach((flag, u) => {
    if (flag === 1) order.push(u);
  });
  const { interviewDay, heldAt } = record;
  const at = (u: number) => selection.original[u] as number;
  // Who has no day comes after those who have one; people are numbered by entry.
  const dayOf = (u: number) => interviewDay[at(u)] || "~";
  return order.sort((u, v) => {
    const [x, y] = [dayOf(u), dayOf(v)];
    if (x !== y) return x < y ? -1 : 1;
    const [first, second] = [heldAt[at(u)] as number, heldAt[at(v)] as number];
    return first === second ? u - v : first < second ? -1 : 1;
  });
}

/** Who named whom among the pairs of a selection, each telling once. */
function tellingsOf(
  snapshot: GraphSnapshot,
  selection: Selection,
  at: number,
  range: DayRange,
): PairLists {
  const sides = new Uint8Array(snapshot.pairs.a.length);
  const { pair, namedBy, firstDay, lastDay, recordedAt, withdrawnAt } = snapshot.exposures;
  for (let k = 0; k < pair.length; k++) {
    if ((recordedAt[k] as number) > at || (withdrawnAt[k] as number) <= at) continue;
    if (!meets(firstDay[k] as number, lastDay[k] as number, range)) continue;
    const side = namedBy[k] === NAMED_BY.low ? 1 : namedBy[k] === NAMED_BY.high ? 2 : 3;
    const p = pair[k] as number;
    sides[p] = (sides[p] as number) | side;
  }
  const a: number[] = [];
  const b: number[] = [];
  for (let k = 0; k < selection.pair.length; k++) {
    const side = sides[selection.pair[k] as number] as number;
    const u = selection.a[k] as number;
    const v = selection.b[k] as number;
    // The snapshot's pair and the selection's have the same first end: numbers keep their order.
    if ((side & 1) !== 0) {
      a.push(u);
      b.push(v);
    }
    if ((side & 2) !== 0) {
      a.push(v);
      b.push(u);
    }
  }
  return { a, b };
}

/** Flags of the people whom interviews have seen: interviewed, or in a pair with somebody who was. */
function seenThroughInterviews({ a, b }: Selection, flags: Uint8Array): Uint8Array {
  const seen = Uint8Array.from(flags);
  for (let k = 0; k < a.length; k++) {
    const [u, v] = [a[k] as number, b[k] as number];
    if (flags[u] === 0 && flags[v] === 0) continue;
    seen[u] = 1;
    seen[v] = 1;
  }
  return seen;
}

/** Leaves out the pairs between two people of whom neither was interviewed. */
function withInterviewedEnd(selection: Selection, flags: Uint8Array): Selection {
  const kept: number[] = [];
  for (let k = 0; k < selection.a.length; k++) {
    if (flags[selection.a[k] as number] === 1 || flags[selection.b[k] as number] === 1)
      kept.push(k);
  }
  const pick = (column: Int32Array) => Int32Array.from(kept, (k) => column[k] as number);
  return {
    ...selection,
    pair: pick(selection.pair),
    a: pick(selection.a),
    b: pick(selection.b),
  };
}

function classesOf(
  record: ComparedRecord,
  selection: Selection,
  flags: Uint8Array | null,
  attribute: MixingAttribute | null,
): Pick<CompareInput, "attribute" | "classes" | "classOf"> {
  if (attribute === null) return { attribute, classes: [], classOf: null };
  if (attribute === "interviewed") {
    const classOf = Array.from(selection.original, (_, u) => (flags ? (flags[u] as number) : -1));
    return { attribute, classes: flags ? ["no", "yes"] : [], classOf };
  }
  const values = Array.from(selection.original, (person) => record.values?.[person] ?? null);
  const words = new Set(values.filter((value) => value !== null));
  // By code unit, so that the same words have the same numbers everywhere.
  const classes = [...words].sort((x, y) => (x < y ? -1 : 1));
  const numberOf = new Map(classes.map((word, number) => [word, number]));
  return {
    attribute,
    classes,
    classOf: values.map((value) => (value === null ? -1 : (numberOf.get(value) ?? -1))),
  };
}

/** The people and pairs that are compared, out of those of the population. */
function comparedPart(
  selection: Selection,
  flags: Uint8Array,
  among: "everyone" | "interviewed" | "seen",
): { selection: Selection; flags: Uint8Array | null } {
  if (among === "everyone") return { selection, flags: null };
  const keep = among === "interviewed" ? flags : seenThroughInterviews(selection, flags);
  const seen = among === "interviewed" ? selection : withInterviewedEnd(selection, flags);
  return { selection: narrow(seen, keep), flags: flags.filter((_, u) => keep[u] === 1) };
}

/**
 * Gathers the input of a comparison. People, days and cut-off are selected as for the network report;
 * what is compared is the subgraph of the population, on a record made by interviews the part that
 * these have seen, since that is what a simulated round of interviews would record.
 */
export function gatherInput(
  record: ComparedRecord,
  attribute: MixingAttribute | null,
): CompareInput {
  const { snapshot, asked, studyNumbers } = record;
  const { question } = asked;
  const at = question.asOf ?? Number.MAX_VALUE;
  const { any, dated } = tellingsAt(snapshot, at);
  const range = dayRange(question, question.lastDay, dated);
  const whole = select(snapshot, question.asOf, range);
  const interviews = interviewedAt(snapshot, at);
  const complete = !interviews.known && any && question.population !== "interviewed";
  const { selection, flags } = populationOf(snapshot, question, whole, interviews.flags);
  const onRecord = selection.graph.n;
  const declared = question.population === "cases" ? null : question.declaredPopulation;
  const interviewedPeople = flags.reduce((sum, flag) => sum + flag, 0);

  const among =
    complete || interviewedPeople === 0
      ? "everyone"
      : question.population === "interviewed"
        ? "interviewed"
        : "seen";
  const part = comparedPart(selection, flags, among);
  const { both, one } = complete
    ? { both: 0, one: 0 }
    : namingsOf(snapshot, selection, flags, at, range);
  const compared = part.selection;
  return {
    format: 1,
    population: question.population,
    n: declared !== null && declared >= onRecord ? declared : onRecord,
    interviewedPeople,
    complete,
    presetWindow: question.window === "preset" || (range === null && complete && !dated),
    recall: complete ? null : recall(both, one).value,
    namedByBoth: both,
    namedByOne: one,
    unresolvedGroupExposures: countGroupExposures(snapshot, at, range),
    undated: whole.undated,
    leftOutPeople: onRecord - compared.original.length,
    leftOutPairs: selection.pair.length - compared.pair.length,
    studyNumbers: Array.from(compared.original, (person) => studyNumbers[person] ?? ""),
    interviewed: part.flags && Array.from(part.flags),
    order: part.flags ? interviewOrder(record, compared, part.flags) : [],
    ...classesOf(record, compared, part.flags, attribute),
    pairs: { a: Array.from(compared.a), b: Array.from(compared.b) },
    tellings: tellingsOf(snapshot, compared, at, range),
  };
}
