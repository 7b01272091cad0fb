import { MISSING_DAY } from "./day-number.ts";

/** Days of each case as day numbers, `MISSING_DAY` where there is none; one row per case. */
export type CaseDays = {
  readonly onset: Int32Array;
  readonly specimen: Int32Array;
  readonly report: Int32Array;
};

export type CurveOptions = {
  /** Days per bin, whole, >= 1. */
  readonly binDays: number;
  /** Last day of the curve; cases that stand on a later day are left out and counted. */
  readonly lastDay: number;
  /** Days up to `lastDay` that are still filling up through reporting delay. */
  readonly delayDays: number;
};

export type CurveBin = {
  /** First day of the bin. */
  readonly day: number;
  /** Cases by the day they stand on: never added up unmarked. */
  readonly onset: number;
  readonly specimen: number;
  readonly report: number;
  /** Holds a day that is still filling up. */
  readonly provisional: boolean;
};

export type EpidemicCurve = {
  readonly bins: readonly CurveBin[];
  /** Cases without an onset day, whether or not another day stands in. */
  readonly withoutOnset: number;
  /** Cases without any of the three days: in no bin. */
  readonly undated: number;
  /** Cases that stand on a day after `lastDay`. */
  readonly later: number;
};

/** The longest curve that is made: a hundred years of days. */
const MOST_BINS = 36600;

/**
 * Epidemic curve: cases by onset day, else by specimen day, else by report day, the three kept
 * apart. Bins run without a gap from the first case's to the one that holds `lastDay`, and end on
 * `lastDay`.
 *
 * @throws RangeError when columns differ in length, for a bin of no days, or a curve of more than
 *   36,600 bins
 *
 * Edge cases: no dated case → no bins. Cost: O(cases + bins). Source: methods C.9.1.
 */
export function epidemicCurve(cases: CaseDays, options: CurveOptions): EpidemicCurve {
  const { onset, specimen, report } = cases;
  const { binDays, lastDay, delayDays } = options;
  if (specimen.length !== onset.length || report.length !== onset.length) {
    throw new RangeError("day columns differ in length");
  }
  if (!Number.isSafeInteger(binDays) || binDays < 1) throw new RangeError("binDays: at least one");
  if (!Number.isSafeInteger(lastDay)) throw new RangeError("lastDay must be a day number");
  if (!Number.isSafeInteger(delayDays) || delayDays < 0) throw new RangeError("delayDays: >= 0");

  let [withoutOnset, undated, later, first] = [0, 0, 0, lastDay + 1];
  const basis = new Uint8Array(onset.length);
  const day = new Int32Array(onset.length);
  for (let k = 0; k < onset.length; k++) {
    if (onset[k] === MISSING_DAY) withoutOnset++;
    basis[k] = onset[k] !== MISSING_DAY ? 1 : specimen[k] !== MISSING_DAY ? 2 : 3;
    day[k] = basis[k] === 1 ? onset[k]! : basis[k] === 2 ? specimen[k]! : report[k]!;
    if (day[k] === MISSING_DAY) {
      undated++;
      basis[k] = 0;
    } else if (day[k]! > lastDay) {
      later++;
      basis[k] = 0;
    } else if (day[k]! < first) first = day[k]!;
  }
  const length = Math.ceil((lastDay - first + 1) / binDays);
  if (length > MOST_BINS) throw new RangeError("the curve would have more than 36,600 bins");
  const start = lastDay + 1 - length * binDays;
  const counts = new Int32Array(3 * length);
  for (let k = 0; k < onset.length; k++) {
    if (basis[k] === 0) continue;
    counts[3 * Math.floor((day[k]! - start) / binDays) + basis[k]! - 1]!++;
  }
  const bins = Array.from({ length }, (_, b): CurveBin => {
    const from = start + b * binDays;
    return {
      day: from,
      onset: counts[3 * b]!,
      specimen: counts[3 * b + 1]!,
      report: counts[3 * b + 2]!,
      provisional: from + binDays - 1 > lastDay - delayDays,
    };
  });
  return { bins, withoutOnset, undated, later };
}

/**
 * Days per bin by rule of thumb: 1 when the mean serial interval is at most 4 days, else a quarter
 * to a third of the incubation period (the whole number nearest to 7/24 of it).
 *
 * @param meanSerialInterval days, or null when unknown
 * @param incubation mean incubation period in days, > 0
 * @throws RangeError for an incubation period that is none
 *
 * Source: a rule of field epidemiology, recalled; methods C.9.1.
 */
export function curveBinDays(meanSerialInterval: number | null, incubation: number): number {
  if (!(incubation > 0 && Number.isFinite(incubation))) {
    throw new RangeError("incubation must be > 0 days");
  }
  if (meanSerialInterval !== null && meanSerialInterval <= 4) return 1;
  return Math.max(1, Math.round((7 / 24) * incubation));
}
