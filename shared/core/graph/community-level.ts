import type { Graph } from "./build-graph.ts";

/**
 * A graph as the community search sees it: at first the people and their pairs, later each node a
 * set of people found to belong together and each weight the pairs between two sets. Pairs within
 * a node are left out; they count in its strength only.
 */
export type Level = {
  readonly n: number;
  readonly offsets: Int32Array;
  readonly neighbours: Int32Array;
  readonly weights: Int32Array;
  /** Link ends of each node, those within it included; they sum to 2m. */
  readonly strength: Int32Array;
};

/** Arrays that every step of a search shares, so that many starts allocate little. */
export type SearchSpace = {
  /** Link ends of each community. */
  readonly ends: Int32Array;
  /** Weight from the node at hand to each community; zero between nodes. */
  readonly toward: Int32Array;
  /** Communities with a weight in `toward`. */
  readonly touched: Int32Array;
  readonly queue: Int32Array;
  readonly flags: Uint8Array;
  readonly free: Int32Array;
};

/** Room for a search on n people. */
export function searchSpace(n: number): SearchSpace {
  return {
    ends: new Int32Array(n),
    toward: new Int32Array(n),
    touched: new Int32Array(n),
    queue: new Int32Array(n),
    flags: new Uint8Array(n),
    free: new Int32Array(n),
  };
}

/** The people themselves as a level: every pair has weight 1. Cost: O(n + m). */
export function firstLevel(graph: Graph): Level {
  const { n, offsets, neighbours } = graph;
  const strength = new Int32Array(n);
  for (let u = 0; u < n; u++) strength[u] = offsets[u + 1]! - offsets[u]!;
  return { n, offsets, neighbours, weights: new Int32Array(neighbours.length).fill(1), strength };
}

/** Renumbers labels 0, 1, 2, … in order of appearance, in place; `seen` is scratch. */
export function packLabels(labels: Int32Array, n: number, seen: Int32Array): number {
  seen.fill(-1, 0, n);
  let count = 0;
  for (let u = 0; u < n; u++) {
    const label = labels[u]!;
    if (seen[label]! < 0) seen[label] = count++;
    labels[u] = seen[label]!;
  }
  return count;
}

/**
 * The level in which every set of nodes is one node.
 *
 * @param set label of each node's set, 0 … count − 1
 *
 * Cost: O(n + arcs) of the level given.
 */
export function aggregated(
  level: Level,
  set: Int32Array,
  count: number,
  space: SearchSpace,
): Level {
  const { n, offsets, neighbours, weights, strength } = level;
  const { toward, touched } = space;
  const starts = new Int32Array(count + 1);
  for (let u = 0; u < n; u++) starts[set[u]! + 1]!++;
  for (let s = 0; s < count; s++) starts[s + 1]! += starts[s]!;
  const members = new Int32Array(n);
  const cursor = starts.slice(0, count);
  for (let u = 0; u < n; u++) members[cursor[set[u]!]!++] = u;

  const newOffsets = new Int32Array(count + 1);
  const newStrength = new Int32Array(count);
  const newNeighbours = new Int32Array(neighbours.length);
  const newWeights = new Int32Array(neighbours.length);
  let filled = 0;
  for (let s = 0; s < count; s++) {
    const last = starts[s + 1]!;
    let found = 0;
    let ends = 0;
    for (let at = starts[s]!; at < last; at++) {
      const u = members[at]!;
      ends += strength[u]!;
      const end = offsets[u + 1]!;
      for (let k = offsets[u]!; k < end; k++) {
        const other = set[neighbours[k]!]!;
        if (other === s) continue;
        const before = toward[other]!;
        if (before === 0) touched[found++] = other;
        toward[other] = before + weights[k]!;
      }
    }
    for (let at = 0; at < found; at++) {
      const other = touched[at]!;
      newNeighbours[filled] = other;
      newWeights[filled++] = toward[other]!;
      toward[other] = 0;
    }
    newOffsets[s + 1] = filled;
    newStrength[s] = ends;
  }
  return {
    n: count,
    offsets: newOffsets,
    neighbours: newNeighbours.subarray(0, filled),
    weights: newWeights.subarray(0, filled),
    strength: newStrength,
  };
}
