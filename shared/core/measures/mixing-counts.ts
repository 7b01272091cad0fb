import type { Graph } from "../graph/build-graph.ts";

/** Stands for "not known" among the groups of an attribute. */
export const MISSING_GROUP = -1;

/** Who meets whom, counted by the groups of one attribute. Arrays are by group. */
export type MixingCounts = {
  readonly groups: number;
  /** People whose attribute is known, and by group. */
  readonly people: number;
  readonly members: Int32Array;
  /** Pairs with the attribute known at both ends. */
  readonly pairs: number;
  /** Pairs among them with both ends in one group, and by group. */
  readonly inside: number;
  readonly insideOf: Int32Array;
  /** Link ends of each group in the pairs counted; they sum to 2 × pairs. */
  readonly ends: Int32Array;
  /** What was left out because the attribute is not known; to be shown beside every figure. */
  readonly peopleLeftOut: number;
  readonly pairsLeftOut: number;
};

/**
 * Counts pairs inside and between the groups of an attribute. People whose attribute is not known
 * are left out, with all their pairs, and counted.
 *
 * @param group number of each person's group, 0 … groups − 1, or `MISSING_GROUP`
 * @param groups how many groups there are; some may have nobody
 * @throws RangeError when the numbers do not match the people or the groups
 *
 * Cost: O(n + m). Source: methods C.5.3.
 */
export function mixingCounts(graph: Graph, group: Int32Array, groups: number): MixingCounts {
  const { n, m, offsets, neighbours } = graph;
  if (group.length !== n) throw new RangeError("group must hold one number per person");
  if (!Number.isSafeInteger(groups) || groups < 0) {
    throw new RangeError("groups must be a whole number >= 0");
  }
  const members = new Int32Array(groups);
  let people = 0;
  for (let u = 0; u < n; u++) {
    const mine = group[u]!;
    if (mine === MISSING_GROUP) continue;
    if (mine < 0 || mine >= groups) {
      throw new RangeError(`group ${mine} lies outside 0 … ${groups - 1}`);
    }
    members[mine]!++;
    people++;
  }
  const insideOf = new Int32Array(groups);
  const ends = new Int32Array(groups);
  let bothEnds = 0;
  let inside = 0;
  for (let u = 0; u < n; u++) {
    const mine = group[u]!;
    if (mine === MISSING_GROUP) continue;
    const end = offsets[u + 1]!;
    let known = 0;
    let within = 0;
    for (let k = offsets[u]!; k < end; k++) {
      const other = group[neighbours[k]!]!;
      if (other === MISSING_GROUP) continue;
      known++;
      if (other === mine) within++;
    }
    ends[mine]! += known;
    insideOf[mine]! += within;
    bothEnds += known;
    inside += within;
  }
  // Every pair was met from both of its ends.
  for (let g = 0; g < groups; g++) insideOf[g]! /= 2;
  const pairs = bothEnds / 2;
  return {
    groups,
    people,
    members,
    pairs,
    inside: inside / 2,
    insideOf,
    ends,
    peopleLeftOut: n - people,
    pairsLeftOut: m - pairs,
  };
}
