import { isMissingWord } from "./check-cell.ts";
import type { StagedPair } from "./staged-row.ts";

/** A number cell as stored: the number, or the word that stands for it. */
export function splitNumber(cell: string | undefined): {
  number: number | null;
  missing: string | null;
} {
  if (cell === undefined) return { number: null, missing: null };
  return isMissingWord(cell)
    ? { number: null, missing: cell }
    : { number: Number(cell), missing: null };
}

/**
 * What makes two rows the same telling: the two people in either order, who told of it, days,
 * setting, place, minutes and distance (as precise as it is stored).
 */
export function tellingKey({ cells }: StagedPair): string {
  const [low, high] =
    cells.ref_a < cells.ref_b ? [cells.ref_a, cells.ref_b] : [cells.ref_b, cells.ref_a];
  const distance = splitNumber(cells.distance_m);
  return JSON.stringify([
    low,
    high,
    cells.named_by ?? null,
    cells.first_exposure ?? null,
    cells.last_exposure ?? null,
    cells.setting ?? null,
    cells.place?.toLowerCase() ?? null,
    cells.minutes ?? null,
    distance.missing ?? (distance.number === null ? null : Math.fround(distance.number)),
  ]);
}
