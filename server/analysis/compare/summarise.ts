import type { Baseline, CompareMeasure, CompareRun } from "../../../shared/contracts/compare.ts";
import {
  binomialDegrees,
  COMPARISON_KEYS,
  holm,
  observedRow,
  pointwiseEnvelope,
  poissonDegrees,
  possiblePairs,
  rankEnvelope,
  replicateSummary,
  type Statistic,
} from "../../../shared/core/index.ts";
import type { CompareInput } from "./compare-input.ts";
import { type Observation, observe, seenOf } from "./observe.ts";
import { heldFixed, keepsDegrees, type PlannedBaseline } from "./plan-baselines.ts";
import { DIRECTION_OF, whyUndefined } from "./statistic-words.ts";

export type CompareResult = NonNullable<CompareRun["result"]>;

/** A baseline's replicates: rows one after another, as many as were reached. */
export type DrawnBaseline = Omit<PlannedBaseline, "plan"> & {
  /** Null = not drawn. */
  readonly table: Float64Array | null;
  readonly reached: number;
};

const HISTOGRAM_BINS = 24;
/** Below this a curve cannot have p <= 0.05, so no global envelope is drawn. */
const FEWEST_FOR_CURVE = 19;
const LEVEL = 0.05;

/** One column of a table of rows. */
function column(table: Float64Array, width: number, at: number): Float64Array {
  const values = new Float64Array(table.length / width);
  for (let k = 0; k < values.length; k++) values[k] = table[k * width + at] as number;
  return values;
}

/** A stretch of every row, one after another. */
function stretch(table: Float64Array, width: number, from: number, length: number): Float64Array {
  const rows = table.length / width;
  const out = new Float64Array(rows * length);
  for (let k = 0; k < rows; k++) {
    out.set(table.subarray(k * width + from, k * width + from + length), k * length);
  }
  return out;
}

function histogramOf(values: Float64Array) {
  let from = Number.POSITIVE_INFINITY;
  let to = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (value < from) from = value;
    if (value > to) to = value;
  }
  if (from > to) return null;
  const counts = new Array<number>(HISTOGRAM_BINS).fill(0);
  const step = (to - from) / HISTOGRAM_BINS;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    const bin = step === 0 ? 0 : Math.min(HISTOGRAM_BINS - 1, Math.floor((value - from) / step));
    counts[bin] = (counts[bin] as number) + 1;
  }
  return { from, to, counts };
}

type Figures = CompareMeasure["baselines"];

/** Figures of one baseline by statistic, with p-values adjusted over all of them. */
function figuresOf(
  drawn: DrawnBaseline,
  observation: Observation,
  observed: Float64Array,
): Map<Statistic, NonNullable<Figures[Baseline]>> {
  const figures = new Map<Statistic, NonNullable<Figures[Baseline]>>();
  const { table, reached } = drawn;
  if (table === null || reached === 0) return figures;
  const width = observed.length;
  const fixed = heldFixed(drawn.baseline, observation);
  observation.choice.statistics.forEach((statistic, at) => {
    if (fixed.includes(statistic)) return;
    const values = column(table, width, at);
    const { replicates: _all, ...summary } = replicateSummary(observed[at] as number, values);
    figures.set(statistic, { ...summary, pHolm: null, histogram: histogramOf(values) });
  });
  const tested = [...figures].filter(([, { pTwoSided }]) => pTwoSided !== null);
  holm(tested.map(([, { pTwoSided }]) => pTwoSided ?? 1)).forEach((pHolm, k) => {
    const [statistic, figure] = tested[k] as (typeof tested)[number];
    figures.set(statistic, { ...figure, pHolm });
  });
  return figures;
}

/** Bands of one curve under one baseline. */
function bandOf(table: Float64Array, width: number, from: number, observed: Float64Array) {
  const curves = stretch(table, width, from, observed.length);
  const { low, high } = pointwiseEnvelope(curves, observed.length, LEVEL);
  const replicates = table.length / width;
  const whole = replicates < FEWEST_FOR_CURVE ? null : rankEnvelope(observed, curves, LEVEL);
  return {
    low: Array.from(low),
    high: Array.from(high),
    globalLow: whole && Array.from(whole.low),
    globalHigh: whole && Array.from(whole.high),
    p: whole === null ? null : whole.p,
    quickLook: whole?.quickLook ?? true,
  };
}

/** A law's shares as expected people, the last entry standing for "that many or more". */
function expectedPeople(law: Float64Array, people: number): number[] {
  const out = Array.from(law, (share) => share * people);
  const before = out.slice(0, -1).reduce((sum, value) => sum + value, 0);
  out[out.length - 1] = Math.max(0, people - before);
  return out;
}

/** Expected people with k pairs under random mixing; null where its rule refuses the comparison. */
function lawsOf(observation: Observation, observed: Float64Array) {
  const { network, judged, design } = observation;
  const none = { binomial: null, poisson: null };
  const { people, length: pairs } = network;
  if (judged.judgements.degree_law.standing === "refuse" || people < 2) return none;
  // On a traced record p is that of the design: the pairs recorded are not all there are.
  const traced = judged.state === "traced" && design !== null ? design : null;
  const n = traced?.population ?? people;
  const p = traced?.pairProbability ?? pairs / possiblePairs(people);
  const asked = observed.reduce((sum, count) => sum + count, 0);
  const last = observed.length - 1;
  return {
    binomial: expectedPeople(binomialDegrees(n, p, last), asked),
    poisson: expectedPeople(poissonDegrees((n - 1) * p, last), asked),
  };
}

/** A baseline as the result tells it. Where time left only a few replicates, no verdict rests on them. */
function toldBaseline(drawn: DrawnBaseline): CompareResult["baselines"][number] {
  const { baseline, standing, reasons, parameters, table, reached } = drawn;
  if (table === null) {
    return { baseline, standing, reasons: [...reasons], drawn: false, parameters };
  }
  const few = reached < FEWEST_FOR_CURVE;
  return {
    baseline,
    standing: few ? "grey" : standing,
    reasons: few ? ["few_replicates", ...reasons] : [...reasons],
    drawn: reached > 0,
    parameters: { ...parameters, reached },
  };
}

/**
 * The result of a comparison. It depends on input and rows alone: the same bytes whenever and
 * wherever it is worked out.
 */
export function summarise(input: CompareInput, drawn: readonly DrawnBaseline[]): CompareResult {
  const observation = observe(input);
  const { choice, judged } = observation;
  const observed = observedRow(choice, observation.network);
  const degreesAt = choice.statistics.length;
  const sizesAt = degreesAt + choice.degreeBins;
  const degrees = observed.subarray(degreesAt, sizesAt);
  const sizes = observed.subarray(sizesAt);
  const figures = drawn.map(
    (one) => [one.baseline, figuresOf(one, observation, observed)] as const,
  );
  const measures = choice.statistics.map((statistic, at): CompareMeasure => {
    const value = observed[at] as number;
    const baselines: Figures = {};
    for (const [baseline, found] of figures) {
      const figure = found.get(statistic);
      if (figure) baselines[baseline] = figure;
    }
    const reason = Number.isNaN(value) ? whyUndefined(statistic, observation) : null;
    const monotone = DIRECTION_OF[statistic];
    return { statistic, observed: reason === null ? value : null, reason, monotone, baselines };
  });
  const degreeBands: CompareResult["degrees"]["baselines"] = {};
  const sizeBands: CompareResult["sizes"]["baselines"] = {};
  for (const { baseline, table, reached } of drawn) {
    if (table === null || reached === 0) continue;
    if (!keepsDegrees(baseline)) {
      degreeBands[baseline] = bandOf(table, observed.length, degreesAt, degrees);
    }
    sizeBands[baseline] = bandOf(table, observed.length, sizesAt, sizes);
  }
  return {
    seen: seenOf(input, judged),
    comparisons: COMPARISON_KEYS.map((key) => {
      const { standing, reasons, instead } = judged.judgements[key];
      return { key, standing, reasons: [...reasons], instead };
    }),
    baselines: drawn.map(toldBaseline),
    measures,
    degrees: {
      observed: Array.from(degrees),
      baselines: degreeBands,
      ...lawsOf(observation, degrees),
    },
    sizes: { observed: Array.from(sizes), baselines: sizeBands },
  };
}
