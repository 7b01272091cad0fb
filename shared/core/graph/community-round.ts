import type { RandomStream } from "../random/random-stream.ts";
import { aggregated, type Level, packLabels, type SearchSpace } from "./community-level.ts";
import { moveNodes, refine } from "./community-moves.ts";

/**
 * One round of the Leiden search: move single nodes, split what came together into well-tied sets,
 * make each set one node, and again with those nodes, until every community is one node. The next
 * level starts from the communities, not from the sets, so people who came along with a community
 * can leave it as a set.
 *
 * @param first the people as a level
 * @param membership label of each person's community, below n, to start from; receives the result
 * @param twoM link ends, > 0
 * @returns whether anything moved on any level; when not, the search has settled
 *
 * Cost: near O(n + m) a level, and each level is a fraction of the one below. Source: Traag,
 * Waltman & van Eck 2019.
 */
export function communityRound(
  first: Level,
  membership: Int32Array,
  twoM: number,
  stream: RandomStream,
  space: SearchSpace,
): boolean {
  const people = first.n;
  let level = first;
  // Node of the present level that each person is in; the first level is the people themselves.
  let place: Int32Array | null = null;
  let community = membership.slice();
  let any = false;
  for (;;) {
    any = moveNodes(level, community, twoM, stream, space) || any;
    const set = new Int32Array(level.n);
    let sets = refine(level, community, set, twoM, stream, space);
    const communities = packLabels(community, level.n, space.free);
    if (sets === level.n && communities < level.n) {
      // Nobody is tied well enough to join anybody: the communities are the next nodes.
      set.set(community);
      sets = communities;
    } else {
      packLabels(set, level.n, space.free);
    }
    if (communities === level.n) break;
    const next = new Int32Array(sets);
    for (let u = 0; u < level.n; u++) next[set[u]!] = community[u]!;
    if (place === null) place = set;
    else for (let u = 0; u < people; u++) place[u] = set[place[u]!]!;
    level = aggregated(level, set, sets, space);
    community = next;
  }
  for (let u = 0; u < people; u++) membership[u] = community[place === null ? u : place[u]!]!;
  return any;
}
