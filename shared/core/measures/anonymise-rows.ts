import { checkCount } from "./check-count.ts";
import { type CodeColumn, kAnonymity } from "./k-anonymity.ts";

/** A quasi-identifier from as it is to ever coarser: year, decade, "any" … */
export type CodeLadder = readonly CodeColumn[];

export type AnonymisedRows = {
  /** Step of the ladder used for each quasi-identifier; 0 = as it is. */
  readonly levels: readonly number[];
  /** One flag per row, non-zero = may be exported. */
  readonly kept: Uint8Array;
  readonly dropped: number;
};

/**
 * Makes a person table k-anonymous: generalises first, then drops the rows that still stand out.
 *
 * While more than `mostDropped` rows stand in classes below k, the quasi-identifier with the most
 * distinct codes takes a step up its ladder (tie: the first); when the ladders end, all rows that
 * stand out are dropped, however many.
 *
 * @param ladders per quasi-identifier its codes at each step; at least one step each
 * @param k fewest rows that must look alike (default setting 5; 10 for the public)
 * @param mostDropped rows that may be dropped instead of generalising on
 * @throws RangeError for a k below 1, an empty ladder, or columns that do not hold one code per row
 *
 * Cost: O(rows × columns) per step. Source: the order generalise, then drop: methods C.12.2; which
 * column steps up first: Sweeney 2002, *Achieving k-anonymity privacy protection using
 * generalization and suppression* (a heuristic, not the least loss).
 */
export function anonymiseRows(
  rows: number,
  ladders: readonly CodeLadder[],
  k: number,
  mostDropped: number,
): AnonymisedRows {
  checkCount("rows", rows);
  checkCount("mostDropped", mostDropped);
  if (!Number.isSafeInteger(k) || k < 1) throw new RangeError("k must be a whole number >= 1");
  if (ladders.some((ladder) => ladder.length === 0)) throw new RangeError("a ladder has no step");
  const levels = ladders.map(() => 0);
  const columnOf = (ladder: CodeLadder, at: number): CodeColumn => ladder[levels[at]!]!;
  const steps = ladders.reduce((total, ladder) => total + ladder.length - 1, 0);
  for (let step = 0; ; step++) {
    const { classSize } = kAnonymity(rows, ladders.map(columnOf));
    const kept = Uint8Array.from(classSize, (size) => (size >= k ? 1 : 0));
    const dropped = rows - kept.reduce((total, flag) => total + flag, 0);
    if (dropped <= mostDropped || step === steps) return { levels, kept, dropped };
    let widest = -1;
    let most = 0;
    ladders.forEach((ladder, at) => {
      if (levels[at]! + 1 >= ladder.length) return;
      const distinct = new Set(Array.from(columnOf(ladder, at))).size;
      if (distinct > most) {
        most = distinct;
        widest = at;
      }
    });
    levels[widest]!++;
  }
}
