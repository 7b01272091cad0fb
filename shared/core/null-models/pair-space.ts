import type { RandomStream } from "../random/random-stream.ts";
import type { TwoEnds } from "./pair-at.ts";
import type { PairSet } from "./pair-set.ts";
import type { PairBuffer } from "./sampled-network.ts";

/** A set of possible pairs in which a fixed number of pairs is placed at random. */
export type PairSpace = {
  /** Possible pairs. */
  readonly total: number;
  /** Puts one possible pair into `out`, each with the same chance. */
  draw(random: RandomStream, out: TwoEnds): void;
  /** Calls `visit` with every possible pair once. */
  each(visit: (u: number, v: number) => void): void;
};

/** All pairs among some people. */
export function pairsWithin(members: Int32Array): PairSpace {
  const { length } = members;
  return {
    total: (length * (length - 1)) / 2,
    draw(random, out) {
      const i = random.below(length);
      const j = random.below(length - 1);
      out[0] = members[i]!;
      out[1] = members[j < i ? j : j + 1]!;
    },
    each(visit) {
      for (let j = 1; j < length; j++) {
        for (let i = 0; i < j; i++) visit(members[i]!, members[j]!);
      }
    },
  };
}

/** All pairs with one end in each of two separate sets of people. */
export function pairsBetween(first: Int32Array, second: Int32Array): PairSpace {
  return {
    total: first.length * second.length,
    draw(random, out) {
      out[0] = first[random.below(first.length)]!;
      out[1] = second[random.below(second.length)]!;
    },
    each(visit) {
      for (const u of first) for (const v of second) visit(u, v);
    },
  };
}

/**
 * Appends `count` distinct pairs of a space, every choice equally likely: a set turns repeats away
 * up to half of the space; beyond, the pairs left out are drawn and the others listed. Spaces that
 * share no pair may share the set.
 *
 * Cost: O(count), or O(total) beyond half. Source: methods C.7.2.
 */
export function placePairs(
  space: PairSpace,
  count: number,
  random: RandomStream,
  set: PairSet,
  out: PairBuffer,
): void {
  const ends: TwoEnds = [0, 0];
  const sparse = count <= space.total / 2;
  const drawn = sparse ? count : space.total - count;
  for (let k = 0; k < drawn; ) {
    space.draw(random, ends);
    if (!set.add(ends[0], ends[1])) continue;
    k++;
    if (sparse) out.push(ends[0], ends[1]);
  }
  if (!sparse) {
    space.each((u, v) => {
      if (!set.has(u, v)) out.push(u, v);
    });
  }
}
