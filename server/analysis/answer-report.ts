import {
  dayString,
  meanDegreeInterviewed,
  type NetworkReport,
  networkReport,
} from "../../shared/core/index.ts";
import type { GraphSnapshot } from "./graph-store.ts";
import { recallOf } from "./recall-of.ts";
import type { CutOff, ReportQuestion } from "./report-question.ts";
import {
  casesOf,
  classifiedAt,
  type DayRange,
  flagsOf,
  interviewedAt,
  meets,
  narrow,
  type Selection,
  select,
  tellingsAt,
} from "./selection.ts";
import { type TrailPoint, trail } from "./trail.ts";

/** What a worker answers: the report and what else belongs to the same question. */
export type ReportAnswer = {
  readonly report: NetworkReport;
  /** First and last exposure day that were used, or null. */
  readonly from: string | null;
  readonly to: string | null;
  readonly interviewed: number;
  readonly coverage: number | null;
  readonly meanDegreeInterviewed: number | null;
  readonly undated: number;
  readonly unresolvedGroupExposures: number;
  /** What was decided about the record; values of the trail hold under the same basis only. */
  readonly basis: string;
  /** The asked-for earlier days, oldest first. */
  readonly trail: readonly TrailPoint[];
};

/** The population's graph and who of it was interviewed. */
type Population = { selection: Selection; flags: Uint8Array };

/** The exposure days that count at a cut-off. */
export function dayRange(question: ReportQuestion, lastDay: number, dated: boolean): DayRange {
  if (question.window === "free") return { from: question.from, to: question.to };
  // Where no telling at all has a day, no range can be applied: the whole record is the window.
  if (question.window === "all" || !dated) return null;
  return { from: lastDay - question.presetDays + 1, to: lastDay };
}

/** Group exposures on record whose days meet the range, or which have no day. */
export function countGroupExposures(snapshot: GraphSnapshot, at: number, range: DayRange): number {
  const { firstDay, lastDay, recordedAt, withdrawnAt } = snapshot.groupExposures;
  let count = 0;
  for (let k = 0; k < firstDay.length; k++) {
    if ((recordedAt[k] as number) > at || (withdrawnAt[k] as number) <= at) continue;
    const [first, last] = [firstDay[k] as number, lastDay[k] as number];
    if (meets(first, last, range) || !meets(first, last, { from: null, to: null })) count++;
  }
  return count;
}

/**
 * Restricts what was selected to the question's people. For "interviewed" the graph stays whole:
 * its threshold reads all pairs with an interviewed end, its descriptive measures the subgraph.
 */
export function populationOf(
  snapshot: GraphSnapshot,
  question: ReportQuestion,
  selection: Selection,
  interviewed: Uint8Array,
): Population {
  if (question.population !== "cases") {
    return { selection, flags: flagsOf(selection, interviewed) };
  }
  const cases = casesOf(classifiedAt(snapshot, question.asOf));
  const narrowed = narrow(selection, flagsOf(selection, cases));
  return { selection: narrowed, flags: flagsOf(narrowed, interviewed) };
}

/**
 * Answers one question on a snapshot: the network report, the threshold figure with what it rests
 * on, and its trail. What it is computed on is set down in docs/decisions/010.
 *
 * Cost: a few passes over people and tellings, and that of `networkReport`.
 */
export function answerReport(snapshot: GraphSnapshot, question: ReportQuestion): ReportAnswer {
  const at = question.asOf ?? Number.MAX_VALUE;
  const { any, dated } = tellingsAt(snapshot, at);
  const range = dayRange(question, question.lastDay, dated);
  const whole = select(snapshot, question.asOf, range);
  const interviews = interviewedAt(snapshot, at);
  // Pairs come from interviews or from files: pairs without any word on interviews are a complete
  // network that was imported.
  const complete = !interviews.known && any && question.population !== "interviewed";
  const { selection, flags } = populationOf(snapshot, question, whole, interviews.flags);
  const { graph } = selection;

  const declared = question.population === "cases" ? null : question.declaredPopulation;
  const report = networkReport(graph, complete ? null : flags, {
    // A declaration that the record has outgrown no longer says anything.
    declaredPopulation: declared !== null && declared >= graph.n ? declared : null,
    presetWindow: question.window === "preset" || (range === null && complete && !dated),
    recall: complete ? null : recallOf(snapshot, selection, flags, at, range),
    describe: question.population === "interviewed" ? "interviewed" : "everyone",
    coverageRequired: question.population !== "interviewed",
  });
  const { n, interviewed } = report.threshold;
  const rangeAt = (cutOff: CutOff) => dayRange(question, cutOff.number, dated);
  return {
    report,
    from: range?.from == null ? null : dayString(range.from),
    to: range?.to == null ? null : dayString(range.to),
    interviewed,
    coverage: n > 0 ? interviewed / n : null,
    meanDegreeInterviewed: complete ? report.meanDegree : meanDegreeInterviewed(graph, flags).value,
    undated: whole.undated,
    unresolvedGroupExposures: countGroupExposures(snapshot, at, range),
    basis: `${complete ? "complete" : "interviewed"} ${dated ? "dated" : "undated"}`,
    trail: trail(snapshot, question, question.trail, rangeAt, complete),
  };
}
