import { MISSING_DAY } from "./day-number.ts";
import type { ExposureTable } from "./exposure-filter.ts";

/** When each pair stood: from `from[k]` (inclusive) to `until[k]` (exclusive; Infinity = still). */
export type PairSpans = {
  readonly a: Int32Array;
  readonly b: Int32Array;
  readonly from: Float64Array;
  readonly until: Float64Array;
};

/** `PairSpans` and the pairs that could not be placed in time. */
export type DatedSpans = { readonly spans: PairSpans; readonly undated: number };

function spansOf(table: ExposureTable, rows: readonly [number, number, number][]): PairSpans {
  return {
    a: Int32Array.from(rows, ([pair]) => table.pairA[pair]!),
    b: Int32Array.from(rows, ([pair]) => table.pairB[pair]!),
    from: Float64Array.from(rows, ([, from]) => from),
    until: Float64Array.from(rows, ([, , until]) => until),
  };
}

/**
 * The film "as it happened": each pair stands from the day of its first exposure on and for good,
 * by the record as it stood at an instant. Unit of time: day numbers.
 *
 * @param asOf instant in ms, or null for the current record
 *
 * Edge cases: a pair without any dated exposure is left out and counted as `undated`. Cost:
 * O(exposures + pairs). Source: methods C.11.
 */
export function spansAsItHappened(table: ExposureTable, asOf: number | null): DatedSpans {
  const until = asOf ?? Number.MAX_VALUE;
  const first = new Float64Array(table.pairA.length).fill(Number.POSITIVE_INFINITY);
  const held = new Uint8Array(table.pairA.length);
  for (let k = 0; k < table.pair.length; k++) {
    if (!(table.recordedAt[k]! <= until) || table.withdrawnAt[k]! <= until) continue;
    const pair = table.pair[k]!;
    held[pair] = 1;
    for (const day of [table.firstDay[k]!, table.lastDay[k]!]) {
      if (day !== MISSING_DAY && day < first[pair]!) first[pair] = day;
    }
  }
  const rows: [number, number, number][] = [];
  let undated = 0;
  for (let pair = 0; pair < held.length; pair++) {
    if (held[pair] === 0) continue;
    if (first[pair] === Number.POSITIVE_INFINITY) undated++;
    else rows.push([pair, first[pair]!, Number.POSITIVE_INFINITY]);
  }
  return { spans: spansOf(table, rows), undated };
}

/**
 * The film "as we knew it": each pair stands while at least one telling of it is on record, from
 * entry to withdrawal. A pair withdrawn and told again has two spans. Unit of time: ms.
 *
 * Cost: O(exposures log exposures). Source: methods C.11.
 */
export function spansAsWeKnewIt(table: ExposureTable): PairSpans {
  const order = Array.from({ length: table.pair.length }, (_, k) => k).sort(
    (x, y) => table.pair[x]! - table.pair[y]! || table.recordedAt[x]! - table.recordedAt[y]!,
  );
  const rows: [number, number, number][] = [];
  for (const k of order) {
    const pair = table.pair[k]!;
    const from = table.recordedAt[k]!;
    const withdrawn = table.withdrawnAt[k]!;
    const until = Number.isNaN(withdrawn) ? Number.POSITIVE_INFINITY : withdrawn;
    if (!(from < until)) continue;
    const last = rows.at(-1);
    // Tellings that overlap or touch are one span: the pair never left the record.
    if (last && last[0] === pair && from <= last[2]) last[2] = Math.max(last[2], until);
    else rows.push([pair, from, until]);
  }
  return spansOf(table, rows);
}
