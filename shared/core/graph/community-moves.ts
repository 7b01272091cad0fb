import type { RandomStream } from "../random/random-stream.ts";
import type { Level, SearchSpace } from "./community-level.ts";

/** Nodes are shuffled among this many; a power of two. */
const WINDOW = 2048;

/**
 * Shuffles the first `length` of `order` (Fisher and Yates), in windows: what lies far apart in
 * memory is then not visited by turns, and the starts differ as much as from one great shuffle.
 */
function shuffle(order: Int32Array, length: number, stream: RandomStream): void {
  for (let at = length - 1; at > 0; at--) {
    const other = at - stream.below((at & (WINDOW - 1)) + 1);
    const held = order[at]!;
    order[at] = order[other]!;
    order[other] = held;
  }
}

/** Queues the nodes with a neighbour in another community: nobody else can gain by moving. */
function queueBorder(level: Level, community: Int32Array, space: SearchSpace): number {
  const { n, offsets, neighbours } = level;
  const { queue, flags } = space;
  flags.fill(0, 0, n);
  let waiting = 0;
  for (let u = 0; u < n; u++) {
    const mine = community[u]!;
    const end = offsets[u + 1]!;
    let k = offsets[u]!;
    while (k < end && community[neighbours[k]!] === mine) k++;
    if (k === end) continue;
    flags[u] = 1;
    queue[waiting++] = u;
  }
  return waiting;
}

/**
 * Moves single nodes to the neighbouring community that raises modularity most, until no single
 * move raises it. After the first round only nodes are looked at whose neighbour has moved.
 *
 * What a move is worth is compared as w·2m − K·k in whole numbers, so there is no rounding and no
 * pair of moves can undo each other for ever.
 *
 * @param community label of each node, below n; changed in place
 * @returns whether anybody moved
 *
 * Cost: near O(arcs) a round, in practice two to four rounds. Source: fast local moving of Traag,
 * Waltman & van Eck 2019, *From Louvain to Leiden: guaranteeing well-connected communities*.
 */
export function moveNodes(
  level: Level,
  community: Int32Array,
  twoM: number,
  stream: RandomStream,
  space: SearchSpace,
): boolean {
  const { n, offsets, neighbours, weights, strength } = level;
  const { ends, toward, touched, queue, flags, free } = space;
  ends.fill(0, 0, n);
  flags.fill(0, 0, n);
  for (let u = 0; u < n; u++) {
    ends[community[u]!]! += strength[u]!;
    flags[community[u]!] = 1;
  }
  let empty = 0;
  for (let c = n - 1; c >= 0; c--) if (flags[c] === 0) free[empty++] = c;
  let waiting = queueBorder(level, community, space);
  shuffle(queue, waiting, stream);

  let moved = false;
  let head = 0;
  while (waiting > 0) {
    const u = queue[head]!;
    if (++head === n) head = 0;
    waiting--;
    flags[u] = 0;
    const begin = offsets[u]!;
    const end = offsets[u + 1]!;

    let found = 0;
    for (let k = begin; k < end; k++) {
      const c = community[neighbours[k]!]!;
      const before = toward[c]!;
      if (before === 0) touched[found++] = c;
      toward[c] = before + weights[k]!;
    }
    const own = community[u]!;
    const mine = strength[u]!;
    const left = ends[own]! - mine;
    ends[own] = left;
    let best = own;
    let bestWorth = toward[own]! * twoM - left * mine;
    for (let at = 0; at < found; at++) {
      const c = touched[at]!;
      const worth = toward[c]! * twoM - ends[c]! * mine;
      toward[c] = 0;
      if (worth > bestWorth) {
        bestWorth = worth;
        best = c;
      }
    }
    if (bestWorth < 0) {
      // Better alone; some label is free, since a community of several holds it.
      best = free[--empty]!;
    }
    ends[best]! += mine;
    if (best === own) continue;
    if (left === 0) free[empty++] = own;
    community[u] = best;
    moved = true;
    for (let k = begin; k < end; k++) {
      const v = neighbours[k]!;
      if (flags[v] !== 0 || community[v] === best) continue;
      flags[v] = 1;
      let tail = head + waiting;
      if (tail >= n) tail -= n;
      queue[tail] = v;
      waiting++;
    }
  }
  return moved;
}

/**
 * Splits each community into sets that hang together well: every node starts alone, and a node
 * still alone joins the set within its community that raises modularity most, if both are tied well
 * enough to the rest of the community. Sets are connected, because only neighbours join.
 *
 * @param community label of each node, below n
 * @param set receives the label of each node's set (a node of it)
 * @returns how many sets there are
 *
 * Cost: O(arcs). Source: refinement of Traag, Waltman & van Eck 2019, with the best join in place
 * of a random good one: for unweighted pairs the random choice at its usual setting is nearly that.
 */
export function refine(
  level: Level,
  community: Int32Array,
  set: Int32Array,
  twoM: number,
  stream: RandomStream,
  space: SearchSpace,
): number {
  const { n, offsets, neighbours, weights, strength } = level;
  const { ends, toward, touched, queue, flags, free } = space;
  const setEnds = strength.slice();
  // Weight from a set to the rest of its community.
  const outward = free;
  ends.fill(0, 0, n);
  for (let u = 0; u < n; u++) ends[community[u]!]! += strength[u]!;
  for (let u = 0; u < n; u++) {
    const mine = community[u]!;
    set[u] = u;
    let sum = 0;
    const end = offsets[u + 1]!;
    for (let k = offsets[u]!; k < end; k++)
      if (community[neighbours[k]!] === mine) sum += weights[k]!;
    outward[u] = sum;
  }
  for (let u = 0; u < n; u++) queue[u] = u;
  shuffle(queue, n, stream);
  flags.fill(0, 0, n);

  let count = n;
  for (let at = 0; at < n; at++) {
    const u = queue[at]!;
    if (flags[u] !== 0) continue;
    const c = community[u]!;
    const all = ends[c]!;
    const mine = strength[u]!;
    if (outward[u]! * twoM < mine * (all - mine)) continue;
    const end = offsets[u + 1]!;
    let found = 0;
    for (let k = offsets[u]!; k < end; k++) {
      const v = neighbours[k]!;
      if (community[v] !== c) continue;
      const s = set[v]!;
      const before = toward[s]!;
      if (before === 0) touched[found++] = s;
      toward[s] = before + weights[k]!;
    }
    let best = -1;
    let bestWorth = -1;
    let bestTie = 0;
    for (let which = 0; which < found; which++) {
      const s = touched[which]!;
      const tie = toward[s]!;
      toward[s] = 0;
      const theirs = setEnds[s]!;
      const worth = tie * twoM - theirs * mine;
      if (worth <= bestWorth || outward[s]! * twoM < theirs * (all - theirs)) continue;
      best = s;
      bestWorth = worth;
      bestTie = tie;
    }
    if (best < 0) continue;
    set[u] = best;
    setEnds[best]! += mine;
    outward[best] = outward[best]! + outward[u]! - 2 * bestTie;
    flags[u] = 1;
    flags[best] = 1;
    count--;
  }
  return count;
}
