import type { Baseline, CompareMeasure, CompareRun } from "../../../shared/contracts/compare.ts";
import { noValue } from "../../lib/formatters.ts";
import { reasonWords } from "../../lib/reason-words.ts";

export type RunResult = NonNullable<CompareRun["result"]>;
export type BaselineFigure = NonNullable<CompareMeasure["baselines"][Baseline]>;
export type DrawnBaseline = RunResult["baselines"][number];

/** p-values up to this are called a difference; the usual convention. */
const level = 0.05;

/** "0.001": enough places to tell a p-value, by locale; "—" for null. */
export function formatP(p: number | null, locale?: string): string {
  if (p === null) return noValue;
  return new Intl.NumberFormat(locale, { maximumSignificantDigits: p < 0.1 ? 1 : 2 }).format(p);
}

/** Random networks in which this figure had a value. */
export function countedReplicates(figure: BaselineFigure, reached: number): number {
  return Math.max(0, reached - figure.undefinedReplicates);
}

/** Random networks at least as far out, read back from (r + 1)/(N + 1). */
function asFarOut(p: number, counted: number): number {
  return Math.max(0, Math.round(p * (counted + 1)) - 1);
}

/**
 * One plain sentence on a figure and its random networks: "0 of 999 random networks had a value as
 * high: p ≤ 0.001". The side told is the one on which fewer lie.
 */
export function replicateSentence(figure: BaselineFigure, reached: number): string {
  const { pUpper, pLower } = figure;
  const counted = countedReplicates(figure, reached);
  if (pUpper === null || pLower === null || counted === 0) {
    return "No random network gave a value to compare with.";
  }
  const left =
    figure.undefinedReplicates > 0
      ? ` In ${figure.undefinedReplicates} more it had no value, and they are left out.`
      : "";
  if (isFixed(figure)) return `All ${counted} random networks have this very value.${left}`;
  const side = pUpper <= pLower ? "high" : "low";
  const p = Math.min(pUpper, pLower);
  const far = asFarOut(p, counted);
  const sign = far === 0 ? "≤" : "=";
  const networks = counted === 1 ? "random network" : "random networks";
  return `${far} of ${counted} ${networks} had a value as ${side}: p ${sign} ${formatP(p)}.${left}`;
}

/** A figure that the baseline keeps, such as the number of pairs: nothing can be said with it. */
export function isFixed({ low, high, sd, pTwoSided }: BaselineFigure): boolean {
  return low !== null && low === high && (sd === null || sd < 1e-12) && (pTwoSided ?? 1) >= 1;
}

/** p of the table: two-sided, with its sign where no random network lay as far out. */
export function tableP(figure: BaselineFigure, reached: number): string {
  const { pUpper, pLower, pTwoSided } = figure;
  if (pUpper === null || pLower === null || pTwoSided === null) return noValue;
  const none = asFarOut(Math.min(pUpper, pLower), countedReplicates(figure, reached)) === 0;
  return `${none ? "≤ " : ""}${formatP(pTwoSided)}`;
}

type Side = "higher" | "lower" | "usual" | "kept";

function sideOf(figure: BaselineFigure | undefined): Side | null {
  if (!figure || figure.pTwoSided === null || figure.pUpper === null) return null;
  if (isFixed(figure)) return "kept";
  if (figure.pTwoSided > level) return "usual";
  return figure.pUpper <= (figure.pLower ?? 1) ? "higher" : "lower";
}

/** The baseline shown first: random mixing as far as it may be held against this network. */
export function firstBaseline({ baselines }: RunResult): DrawnBaseline | undefined {
  const open = baselines.filter((one) => one.drawn && isOpen(one));
  return open.find(({ baseline }) => baseline === "traced" || baseline === "gnm") ?? open[0];
}

/**
 * A baseline without random figures of a measure keeps it as it is on record; save the traced one,
 * in which invented people have no attributes.
 */
export function isKept(baseline: Baseline): boolean {
  return baseline !== "traced";
}

/** The first baseline, or the next open one where the first has nothing to say on a measure. */
function baselineFor(measure: CompareMeasure, result: RunResult): DrawnBaseline | undefined {
  const first = firstBaseline(result);
  if (!first || measure.baselines[first.baseline] || isKept(first.baseline)) return first;
  const others = result.baselines.filter((one) => one.drawn && isOpen(one));
  return others.find(({ baseline }) => measure.baselines[baseline]) ?? first;
}

/** Whether a baseline may carry a verdict; greyed ones are shown without. */
export function isOpen({ standing }: Pick<DrawnBaseline, "standing">): boolean {
  return standing === "show" || standing === "warn";
}

const againstWords: Readonly<Record<Baseline, string>> = {
  traced: "random mixing seen the same way",
  gnm: "random mixing",
  degreePreserving: "networks with the same numbers of pairs",
  degreePreservingInterviewedEnd: "networks with the same numbers of pairs",
  mixing: "networks with the same mixing",
};

const keptWords: Partial<Record<Baseline, string>> = {
  degreePreserving: "each person's number of contact pairs is kept",
  degreePreservingInterviewedEnd: "each person's number of contact pairs is kept",
  mixing: "who mixes with whom is kept",
};

/** What may be said of a measure, in words; greyed and refused baselines take no part in it. */
export function verdictWords(measure: CompareMeasure, result: RunResult): string {
  if (measure.observed === null) {
    return `no value: ${reasonWords(measure.reason ?? undefined) ?? "no reason was given"}`;
  }
  const first = baselineFor(measure, result);
  if (!first) return "not compared: no baseline may be held against this network";
  const figure = measure.baselines[first.baseline];
  const side = figure ? sideOf(figure) : isKept(first.baseline) ? "kept" : null;
  if (side === null) return "not compared: no random network gave a value";
  const against = againstWords[first.baseline];
  if (side === "kept") return "the same in every random network, which keeps it";
  if (side === "usual") return `not told apart from ${against}`;
  const parts = [`${side} than in ${against}`];
  for (const other of result.baselines) {
    const kept = keptWords[other.baseline];
    if (!kept || other.baseline === first.baseline || !other.drawn || !isOpen(other)) continue;
    const then = sideOf(measure.baselines[other.baseline]);
    if (then === "usual") parts.push(`ordinary once ${kept}`);
    else if (then === side) parts.push(`also when ${kept}`);
    else if (then === "higher" || then === "lower") parts.push(`but ${then} when ${kept}`);
  }
  if (figure?.pHolm !== null && figure?.pHolm !== undefined && figure.pHolm > level) {
    parts.push("taken alone");
  }
  return parts.join("; ");
}
