import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Mean degree c = 2m / n of a recorded graph, in contact pairs per person; isolates count in n.
 *
 * Edge cases: n = 0 undefined (`no_people`); n = 1 gives 0. Only for a complete network may it be
 * held against 1; for interviewed people see `threshold`. Cost: O(1). Source: methods C.1.1.
 */
export function meanDegree(n: number, m: number): Measured {
  return n === 0 ? undefinedBecause("no_people") : defined((2 * m) / n);
}
