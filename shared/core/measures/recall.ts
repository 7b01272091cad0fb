import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Recall from double reports: among pairs whose two ends were both interviewed, the chance q that
 * one of them names the other, q = 2a / (2a + b).
 *
 * Assumes both sides recall independently and equally well; household pairs are recalled better,
 * so one figure over all settings flatters.
 *
 * @param namedByBoth a, pairs each end named
 * @param namedByOne b, pairs only one end named
 * @throws RangeError for counts that are not whole numbers >= 0
 *
 * Edge cases: a = 0 undefined (`no_double_reports`). Cost: O(1). Source: two-occasion
 * capture–recapture (Lincoln–Petersen logic); methods C.8.2.
 */
export function recall(namedByBoth: number, namedByOne: number): Measured {
  for (const count of [namedByBoth, namedByOne]) {
    if (!Number.isSafeInteger(count) || count < 0) {
      throw new RangeError("counts must be whole numbers >= 0");
    }
  }
  if (namedByBoth === 0) return undefinedBecause("no_double_reports");
  return defined((2 * namedByBoth) / (2 * namedByBoth + namedByOne));
}
