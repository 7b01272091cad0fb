import { defined, type Measured, undefinedBecause } from "./measured.ts";
import type { MixingCounts } from "./mixing-counts.ts";

/** Homophily of one group. */
export type Homophily = {
  /** s: share of the group's link ends whose pair stays inside. */
  readonly insideShare: Measured;
  /** Against w = n_i/n, as first published. */
  readonly original: Measured;
  /** Against w = (n_i − 1)/(n − 1): nobody can be their own contact. */
  readonly corrected: Measured;
};

function against(share: number, baseline: number): Measured {
  const gain = share - baseline;
  return defined(gain >= 0 ? gain / (1 - baseline) : gain / baseline);
}

/**
 * Coleman's homophily of each group: how far the share of its link ends that stay inside, s, lies
 * from the share w that random mixing would give, as part of the distance possible on that side;
 * −1 none stay … 0 as at random … 1 all stay. n and n_i count people with a known attribute.
 *
 * Edge cases: no link end in the group (`no_pairs`, for s too); everyone in one group
 * (`one_group`); a group of one person (`one_in_group`). Cost: O(groups). Source: Coleman 1958,
 * *Relational analysis*; methods C.5.3.
 */
export function colemanHomophily(counts: MixingCounts): Homophily[] {
  const { groups, people, members, ends, insideOf } = counts;
  return Array.from({ length: groups }, (_, g) => {
    const size = members[g]!;
    if (ends[g] === 0) {
      const none = undefinedBecause("no_pairs");
      return { insideShare: none, original: none, corrected: none };
    }
    const share = (2 * insideOf[g]!) / ends[g]!;
    const insideShare = defined(share);
    if (size === people || size === 1) {
      const none = undefinedBecause(size === people ? "one_group" : "one_in_group");
      return { insideShare, original: none, corrected: none };
    }
    return {
      insideShare,
      original: against(share, size / people),
      corrected: against(share, (size - 1) / (people - 1)),
    };
  });
}
