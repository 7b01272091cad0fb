import { allCases, checkWeights, infectiousness } from "./case-series.ts";

export type CaseR = {
  /** Expected number infected by one case of each day. */
  readonly r: Float64Array;
  /** Share of the serial interval that had passed for each day by the end of the series, 0 … 1. */
  readonly seen: Float64Array;
  /** First day whose offspring are not all to be expected yet: hide or grey from there on. */
  readonly incompleteFrom: number;
  /** Local cases on days on which nobody could have infected them. */
  readonly withoutInfector: number;
};

/** Share of the serial interval that must have passed for a day to count as complete (convention). */
export const COMPLETE_SHARE = 0.95;

/**
 * Case (cohort) reproduction number: each case is shared out over the earlier cases by how well the
 * serial interval fits, R_j = Σ_{t > j} I_t w_{t−j}/Λ_t for a case of day j.
 *
 * The last serial interval's length is too low, since infected people have not fallen ill yet;
 * days of which less than 95 % of the serial interval has passed count as incomplete. Cases on a
 * day with Λ = 0 get no infector. Imported cases infect and have no infector here.
 *
 * Not the same as `instantaneousR`; never both on one axis without saying so.
 *
 * @param local cases by day of onset, infected here
 * @param imported cases infected elsewhere by the same days, or null
 * @param weights w_0 … w_last of the serial interval
 * @throws RangeError for counts or weights that are none
 *
 * Edge cases: no days → empty. Cost: O(days × length of the weights). Source: Wallinga & Teunis
 * 2004, *Different epidemic curves for severe acute respiratory syndrome reveal similar impacts of
 * control measures*; methods C.9.5.
 */
export function caseR(
  local: ArrayLike<number>,
  imported: ArrayLike<number> | null,
  weights: ArrayLike<number>,
): CaseR {
  const all = allCases(local, imported);
  checkWeights(weights);
  const pressure = infectiousness(all, weights);
  const days = all.length;
  const r = new Float64Array(days);
  const seen = new Float64Array(days);
  let total = 0;
  for (let s = 1; s < weights.length; s++) total += weights[s]!;
  let incompleteFrom = days;
  let withoutInfector = 0;
  let passed = 0;
  for (let day = days - 1; day >= 0; day--) {
    const left = days - 1 - day;
    if (left >= 1 && left < weights.length) passed += weights[left]!;
    seen[day] = Math.min(1, passed / total);
    if (seen[day]! < COMPLETE_SHARE) incompleteFrom = day;
    const last = Math.min(left, weights.length - 1);
    let sum = 0;
    for (let s = 1; s <= last; s++) {
      if (pressure[day + s]! > 0) sum += (local[day + s]! * weights[s]!) / pressure[day + s]!;
    }
    r[day] = sum;
    if (pressure[day] === 0) withoutInfector += local[day]!;
  }
  return { r, seen, incompleteFrom, withoutInfector };
}

/**
 * The same for a line list: R of each case from the days of onset, in their order. Cases of one day
 * share one R.
 *
 * @param onsets day numbers, whole and at most 100 years apart
 * @throws RangeError for days that are none
 *
 * Edge cases: no case → empty. Cost: O(cases + days × length of the weights).
 */
export function caseRByCase(onsets: ArrayLike<number>, weights: ArrayLike<number>): Float64Array {
  const days = Float64Array.from(onsets);
  if (days.length === 0) return days;
  if (!days.every((day) => Number.isSafeInteger(day))) throw new RangeError("onsets: whole days");
  const first = days.reduce((least, day) => Math.min(least, day));
  const span = days.reduce((most, day) => Math.max(most, day)) - first + 1;
  if (span > 36600) throw new RangeError("onsets lie more than 100 years apart");
  const counts = new Float64Array(span);
  for (const day of days) counts[day - first]!++;
  const { r } = caseR(counts, null, weights);
  return days.map((day) => r[day - first]!);
}
