import type { PairEnds } from "../graph/build-graph.ts";
import type { RandomStream } from "../random/random-stream.ts";
import { PairSet } from "./pair-set.ts";
import { type PairSpace, pairsBetween, pairsWithin, placePairs } from "./pair-space.ts";
import { checkPeople, PairBuffer, type SampledNetwork, type Sampler } from "./sampled-network.ts";

/** The people of each class, ascending. */
function membersOf(classOf: Int32Array): Int32Array[] {
  let classes = 0;
  for (const label of classOf) {
    if (label < 0) throw new RangeError("classes are whole numbers >= 0");
    if (label >= classes) classes = label + 1;
  }
  if (classes > classOf.length)
    throw new RangeError("classes are numbered 0, 1, 2, … without gaps");
  const sizes = new Int32Array(classes);
  for (const label of classOf) sizes[label]!++;
  const members = Array.from(sizes, (size) => new Int32Array(size));
  sizes.fill(0);
  for (let u = 0; u < classOf.length; u++) {
    const label = classOf[u]!;
    members[label]![sizes[label]!++] = u;
  }
  return members;
}

type Cell = { readonly space: PairSpace; count: number };

/**
 * Random graphs that keep who mixes with whom: the number of pairs inside each class of an
 * attribute and between each two classes is that of the observed network; within these counts the
 * pairs fall at random, and every such graph is equally likely.
 *
 * People without a value make a class of their own; the caller numbers it.
 *
 * @param ends distinct pairs of the observed network
 * @param length pairs to use
 * @param classOf class of each person, 0, 1, 2, …
 * @throws RangeError for a negative or far-off class, a self pair or a repeated pair
 *
 * Cost: O(n + m) a draw; O(possible pairs) for classes whose pairs are more than half there. Source:
 * Holland, Laskey & Leinhardt 1983, *Stochastic blockmodels: first steps* (here with fixed counts).
 */
export function mixingSampler(ends: PairEnds, length: number, classOf: Int32Array): Sampler {
  const n = classOf.length;
  checkPeople(n);
  const members = membersOf(classOf);
  const cells = new Map<number, Cell>();
  const seen = new PairSet(length);
  for (let k = 0; k < length; k++) {
    const u = ends.a[k]!;
    const v = ends.b[k]!;
    if (!(u >= 0 && u < n && v >= 0 && v < n)) throw new RangeError(`pair ${k} names nobody`);
    if (u === v || !seen.add(u, v)) throw new RangeError(`pair ${k} is no pair or there twice`);
    const x = Math.min(classOf[u]!, classOf[v]!);
    const y = Math.max(classOf[u]!, classOf[v]!);
    const key = x * members.length + y;
    const cell = cells.get(key);
    if (cell) cell.count++;
    else {
      const space = x === y ? pairsWithin(members[x]!) : pairsBetween(members[x]!, members[y]!);
      cells.set(key, { space, count: 1 });
    }
  }
  // The order of the cells is part of what a seed means: by class, not by first pair.
  const ordered = [...cells].sort(([p], [q]) => p - q).map(([, cell]) => cell);
  const set = new PairSet(length);
  const pairs = new PairBuffer(length);
  return {
    sample(random: RandomStream): SampledNetwork {
      set.clear();
      pairs.length = 0;
      for (const { space, count } of ordered) placePairs(space, count, random, set, pairs);
      return { people: n, a: pairs.a, b: pairs.b, length: pairs.length, isInterviewed: null };
    },
  };
}
