import { defined, type Measured, undefinedBecause } from "./measured.ts";
import type { MixingCounts } from "./mixing-counts.ts";

/** The E–I index with what two ways of mixing at random would give. */
export type EiIndex = {
  /** (E − I)/(E + I): −1 all pairs inside groups … 1 all between them. */
  readonly value: Measured;
  /** Exact mean when the pairs counted are placed at random among the people counted, G(n,m). */
  readonly expected: Measured;
  /** About what it is when everyone keeps their number of pairs; multi-links are not excluded. */
  readonly expectedKeepingDegrees: Measured;
};

/**
 * E–I index: pairs between groups (E) less pairs inside them (I), over all. It depends on how large
 * the groups are, so it is read against its expectations and not against 0:
 * 1 − 2·Σ n_i(n_i − 1)/(n(n − 1)) for G(n,m), about 1 − 2·Σ K_i²/(4m²) with degrees kept.
 *
 * Edge cases: no pair counted (`no_pairs`); for the expectation under G(n,m) nobody (`no_people`)
 * or one person (`one_person`) with a known attribute. Cost: O(groups). Source: Krackhardt & Stern
 * 1988, *Informal networks and organizational crises*; methods C.5.3.
 */
export function eiIndex(counts: MixingCounts): EiIndex {
  const { groups, people, pairs, inside, members, ends } = counts;
  let samePairs = 0;
  let squares = 0;
  for (let g = 0; g < groups; g++) {
    samePairs += members[g]! * (members[g]! - 1);
    squares += ends[g]! * ends[g]!;
  }
  const value = pairs === 0 ? undefinedBecause("no_pairs") : defined((pairs - 2 * inside) / pairs);
  const keeping =
    pairs === 0 ? undefinedBecause("no_pairs") : defined(1 - (2 * squares) / (4 * pairs * pairs));
  let expected: Measured;
  if (people === 0) expected = undefinedBecause("no_people");
  else if (people === 1) expected = undefinedBecause("one_person");
  else expected = defined(1 - (2 * samePairs) / (people * (people - 1)));
  return { value, expected, expectedKeepingDegrees: keeping };
}
