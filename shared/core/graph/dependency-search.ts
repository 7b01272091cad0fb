import type { Graph } from "./build-graph.ts";

const UNREACHED = 0x7fffffff;
// Path counts beyond LARGE are scaled, a whole level at a time, long before a double overflows.
const LARGE = 2 ** 400;
const SCALE = 2 ** -400;
const SMALLEST = 2 ** -900;

/**
 * Shortest paths from one person at a time, counted, and how much each other person stands on them.
 *
 * Forwards, level by level, the steps that lead one further are written down, so that the way back
 * touches only those. On the way back each person `v` carries
 * `g(v) = weight(v) / paths(v) + Σ g(child)`; the dependency of the source on `v` is then
 * `paths(v) · Σ g(child)`.
 *
 * Whether a step leads further is a coin toss to the processor, so the loops over steps do not
 * branch on it: a step is always written and the place moves on by the sign bit of a difference.
 * Everything but the rows is kept by place in the order of arrival, so that a level lies in one
 * stretch of memory.
 *
 * Path counts are doubles: exact to 2^53, a relative 1e-16 a step beyond. Above 2^400 a level is
 * scaled by 2^-400, as only ratios of neighbouring levels matter; counts that fall 2^-900 below
 * their level's scale are rounded up to it, which no network but an artificial one can notice.
 *
 * Cost of a source: O(people and pairs of its group). Source: Brandes 2001, *A faster algorithm
 * for betweenness centrality*.
 */
export class DependencySearch {
  /** People reached by the last `run`, the source first, by distance. */
  readonly order: Int32Array;
  /** Dependency of the last source on each person, by place in `order`; [0] means nothing. */
  readonly dependency: Float64Array;
  readonly #graph: Graph;
  readonly #weight: Float64Array;
  // Place of each person in `order`; between runs UNREACHED for everyone.
  readonly #place: Int32Array;
  // By place; between runs 0 everywhere.
  readonly #paths: Float64Array;
  readonly #sums: Float64Array;
  readonly #carried: Float64Array;
  // Steps from a parent to a child one further away, level by level; by place once written.
  readonly #parents: Int32Array;
  readonly #children: Int32Array;
  // Level d: people order[levelStart[d]] …, steps stepStart[d] …, scale of its children.
  readonly #levelStart: Int32Array;
  readonly #stepStart: Int32Array;
  readonly #childScale: Float64Array;

  /** @param weight how many people each person of `graph` stands for as an end of paths */
  constructor(graph: Graph, weight: Float64Array) {
    const { n, m } = graph;
    this.#graph = graph;
    this.#weight = weight;
    // One place more than needed where a value is written before it is known to count.
    this.order = new Int32Array(n + 1);
    this.dependency = new Float64Array(n);
    this.#place = new Int32Array(n).fill(UNREACHED);
    this.#paths = new Float64Array(n);
    this.#sums = new Float64Array(n);
    this.#carried = new Float64Array(n);
    this.#parents = new Int32Array(m + 1);
    this.#children = new Int32Array(m + 1);
    this.#levelStart = new Int32Array(n + 2);
    this.#stepStart = new Int32Array(n + 2);
    this.#childScale = new Float64Array(n + 1);
  }

  /** Searches from `source`; answers with the number of people reached, the source included. */
  run(source: number): number {
    const levels = this.#forwards(source);
    this.#backwards(levels);
    this.#place[source] = UNREACHED;
    this.#paths[0] = 0;
    return this.#levelStart[levels]!;
  }

  #forwards(source: number): number {
    const { offsets, neighbours } = this.#graph;
    const place = this.#place;
    const paths = this.#paths;
    const order = this.order;
    const parents = this.#parents;
    const children = this.#children;
    const levelStart = this.#levelStart;
    const stepStart = this.#stepStart;
    place[source] = 0;
    paths[0] = 1;
    order[0] = source;
    let from = 0;
    let tail = 1;
    let steps = 0;
    let level = 0;
    while (from < tail) {
      levelStart[level] = from;
      stepStart[level] = steps;
      const to = tail;
      const first = steps;
      let most = 0;
      for (let at = from; at < to; at++) {
        const u = order[at]!;
        if (paths[at]! > most) most = paths[at]!;
        const end = offsets[u + 1]!;
        for (let k = offsets[u]!; k < end; k++) {
          const v = neighbours[k]!;
          parents[steps] = at;
          children[steps] = v;
          // 1 when v has no place before `to`, so lies beyond this level.
          steps += (to - 1 - place[v]!) >>> 31;
        }
      }
      for (let k = first; k < steps; k++) {
        const v = children[k]!;
        const held = place[v]!;
        // 1 when v has no place yet: they get the next one.
        const fresh = (tail - 1 - held) >>> 31;
        const at = held + ((tail - held) & -fresh);
        order[tail] = v;
        tail += fresh;
        place[v] = at;
        children[k] = at;
        paths[at]! += paths[parents[k]!]!;
      }
      this.#childScale[level] = most > LARGE ? this.#scale(to, tail) : 1;
      from = to;
      level++;
    }
    levelStart[level] = tail;
    stepStart[level] = steps;
    return level;
  }

  /** Scales the path counts of one level. */
  #scale(from: number, to: number): number {
    const paths = this.#paths;
    for (let at = from; at < to; at++) paths[at] = Math.max(paths[at]! * SCALE, SMALLEST);
    return SCALE;
  }

  /** The way back over all levels but the source's; leaves the scratch arrays as it found them. */
  #backwards(levels: number): void {
    const weight = this.#weight;
    const place = this.#place;
    const paths = this.#paths;
    const sums = this.#sums;
    const carried = this.#carried;
    const order = this.order;
    const dependency = this.dependency;
    const parents = this.#parents;
    const children = this.#children;
    for (let level = levels - 1; level > 0; level--) {
      const lastStep = this.#stepStart[level + 1]!;
      for (let k = this.#stepStart[level]!; k < lastStep; k++) {
        sums[parents[k]!]! += carried[children[k]!]!;
      }
      const scale = this.#childScale[level]!;
      const end = this.#levelStart[level + 1]!;
      for (let at = this.#levelStart[level]!; at < end; at++) {
        const v = order[at]!;
        const count = paths[at]!;
        const sum = sums[at]! * scale;
        carried[at] = weight[v]! / count + sum;
        dependency[at] = count * sum;
        place[v] = UNREACHED;
        paths[at] = 0;
        sums[at] = 0;
      }
    }
  }
}
