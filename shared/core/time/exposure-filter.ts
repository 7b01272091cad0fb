import { MISSING_DAY } from "./day-number.ts";

/** Pairs and their tellings as columns. All exposure columns have the same length. */
export type ExposureTable = {
  /** Ends of each pair, by pair index. */
  readonly pairA: Int32Array;
  readonly pairB: Int32Array;
  /** Pair index of each exposure. */
  readonly pair: Int32Array;
  /** First and last exposure day as day numbers, or `MISSING_DAY`. */
  readonly firstDay: Int32Array;
  readonly lastDay: Int32Array;
  /** When it was entered and withdrawn, ms since the epoch; never withdrawn = Infinity or NaN. */
  readonly recordedAt: Float64Array;
  readonly withdrawnAt: Float64Array;
};

export type ExposureRange = {
  /** First and last day of the chosen range, inclusive; null = open on that side. */
  readonly from: number | null;
  readonly to: number | null;
  /** Instant (ms) whose state of the record is asked for; null = the current record. */
  readonly asOf: number | null;
};

export type FilteredPairs = {
  /** Ends of the distinct pairs that hold, by ascending pair index; ready for `buildGraph`. */
  readonly a: Int32Array;
  readonly b: Int32Array;
  /** Their pair indices. */
  readonly pair: Int32Array;
  /** Exposures that were counted. */
  readonly exposures: number;
  /** Exposures without any day on record at that instant; they count only without a range. */
  readonly undated: number;
};

function check(table: ExposureTable, range: ExposureRange): void {
  const { length } = table.pair;
  for (const column of [table.firstDay, table.lastDay, table.recordedAt, table.withdrawnAt]) {
    if (column.length !== length) throw new RangeError("exposure columns differ in length");
  }
  if (table.pairA.length !== table.pairB.length) {
    throw new RangeError("pair columns differ in length");
  }
  for (let k = 0; k < length; k++) {
    const p = table.pair[k]!;
    if (p < 0 || p >= table.pairA.length) throw new RangeError(`exposure ${k} has no pair`);
  }
  if (range.from !== null && range.to !== null && range.from > range.to) {
    throw new RangeError("from lies after to");
  }
}

/**
 * The distinct pairs with at least one exposure inside a day range, as the record stood at an
 * instant. An exposure counts when its days [first, last] meet [from, to]; with one of its days
 * missing the other stands for both. It is on record at `asOf` when recorded at or before it and
 * not withdrawn at or before it.
 *
 * @throws RangeError when columns differ in length, an exposure names no pair, or from > to
 *
 * Edge cases: undated exposures count only when no range is chosen and are always reported. A range
 * open on one side is a range. Days written the wrong way round (first after last) meet every range
 * that holds a day between them. Cost: O(exposures + pairs). Source: methods, box at the head of
 * C.8; two clocks (when it happened, when it was known).
 */
export function exposureFilter(table: ExposureTable, range: ExposureRange): FilteredPairs {
  check(table, range);
  const { pairA, pairB, pair, firstDay, lastDay, recordedAt, withdrawnAt } = table;
  const hasRange = range.from !== null || range.to !== null;
  const from = range.from ?? MISSING_DAY;
  const to = range.to ?? 2147483647;
  const asOf = range.asOf ?? Number.MAX_VALUE;

  const held = new Uint8Array(pairA.length);
  let exposures = 0;
  let undated = 0;
  let count = 0;
  for (let k = 0; k < pair.length; k++) {
    if (!(recordedAt[k]! <= asOf) || withdrawnAt[k]! <= asOf) continue;
    let first = firstDay[k]!;
    let last = lastDay[k]!;
    if (first === MISSING_DAY) first = last;
    if (last === MISSING_DAY) last = first;
    if (first === MISSING_DAY) {
      undated++;
      if (hasRange) continue;
    } else if (first > last) {
      const swap = first;
      first = last;
      last = swap;
    }
    if (hasRange && (last < from || first > to)) continue;
    exposures++;
    const p = pair[k]!;
    if (held[p] === 0) {
      held[p] = 1;
      count++;
    }
  }

  const kept = { a: new Int32Array(count), b: new Int32Array(count), pair: new Int32Array(count) };
  let at = 0;
  for (let p = 0; p < held.length; p++) {
    if (held[p] === 0) continue;
    kept.a[at] = pairA[p]!;
    kept.b[at] = pairB[p]!;
    kept.pair[at++] = p;
  }
  return { ...kept, exposures, undated };
}
