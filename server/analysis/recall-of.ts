import { recall } from "../../shared/core/index.ts";
import { type GraphSnapshot, NAMED_BY } from "./graph-store.ts";
import { type DayRange, meets, type Selection } from "./selection.ts";

/** Pairs of two interviewed people: how many both named, and how many one of them only. */
export type NamingsOfPairs = { readonly both: number; readonly one: number };

/**
 * Counts who named whom among the pairs of a selection whose two people were both interviewed.
 * Tellings whose teller is not known do not count.
 *
 * @param interviewed flags by person number of the selection's graph; a pair with an end whose flag
 *   is 0 is left out
 * @param at instant (ms) up to which tellings count
 *
 * Source: methods C.8.2.
 */
export function namingsOf(
  snapshot: GraphSnapshot,
  selection: Selection,
  interviewed: Uint8Array,
  at: number,
  range: DayRange,
): NamingsOfPairs {
  const sides = new Uint8Array(snapshot.pairs.a.length);
  const { pair, namedBy, firstDay, lastDay, recordedAt, withdrawnAt } = snapshot.exposures;
  for (let k = 0; k < pair.length; k++) {
    if ((recordedAt[k] as number) > at || (withdrawnAt[k] as number) <= at) continue;
    if (!meets(firstDay[k] as number, lastDay[k] as number, range)) continue;
    const side = namedBy[k] === NAMED_BY.low ? 1 : namedBy[k] === NAMED_BY.high ? 2 : 0;
    const p = pair[k] as number;
    sides[p] = (sides[p] as number) | side;
  }
  let both = 0;
  let one = 0;
  for (let k = 0; k < selection.pair.length; k++) {
    if (interviewed[selection.a[k] as number] === 0) continue;
    if (interviewed[selection.b[k] as number] === 0) continue;
    const named = sides[selection.pair[k] as number];
    if (named === 3) both++;
    else if (named !== 0) one++;
  }
  return { both, one };
}

/**
 * Recall q from the pairs that `namingsOf` counts.
 *
 * @returns q, or null when no pair was named by both
 */
export function recallOf(
  snapshot: GraphSnapshot,
  selection: Selection,
  interviewed: Uint8Array,
  at: number,
  range: DayRange,
): number | null {
  const { both, one } = namingsOf(snapshot, selection, interviewed, at, range);
  return recall(both, one).value;
}
