import type { Graph } from "./build-graph.ts";

/** Sources that advance together: one bit of a 32-bit word each. */
export const SOURCES_PER_PASS = 32;

/**
 * What one level of a pass reached. `people[0] … people[count - 1]` are those whom at least one
 * source reached just now; bit `b` of `fresh[u]` says that source `b` of the pass is at exactly
 * this `distance` from `u`. The arrays are reused: read them, keep nothing.
 */
export type LevelVisitor = (
  distance: number,
  people: Int32Array,
  count: number,
  fresh: Int32Array,
) => void;

/** Bits set in a 32-bit word. */
export function bitCount(word: number): number {
  let bits = word - ((word >>> 1) & 0x55555555);
  bits = (bits & 0x33333333) + ((bits >>> 2) & 0x33333333);
  return Math.imul((bits + (bits >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24;
}

/**
 * Breadth-first search from up to 32 sources at once. A word per person holds who has been there;
 * a level hands the words of the people just reached to their neighbours, so a pair is looked at
 * once for all sources that arrive together.
 *
 * A level with few people pushes along their rows. Once a level holds much of the graph it is
 * cheaper to let everyone who is still missing a source look at their own row (the turn of
 * direction of Beamer, Asanović & Patterson 2012).
 *
 * Cost of a pass: O((n + m) · levels) at most, far less when sources lie close together; memory
 * four words per person. Source: Then et al. 2014, *The more the merrier: efficient multi-source
 * graph traversal* (recalled).
 */
export class ManySourceSearch {
  readonly #graph: Graph;
  readonly #seen: Int32Array;
  #fresh: Int32Array;
  #next: Int32Array;
  #people: Int32Array;
  #nextPeople: Int32Array;

  constructor(graph: Graph) {
    this.#graph = graph;
    this.#seen = new Int32Array(graph.n);
    this.#fresh = new Int32Array(graph.n);
    this.#next = new Int32Array(graph.n);
    this.#people = new Int32Array(graph.n);
    this.#nextPeople = new Int32Array(graph.n);
  }

  /**
   * One pass from `sources[from] … sources[to - 1]`, at most 32 different people. `visit` is
   * called for distance 1, 2, … until nobody new is reached; the sources themselves (distance 0)
   * are not reported.
   */
  run(sources: Int32Array, from: number, to: number, visit: LevelVisitor): void {
    const { n, offsets } = this.#graph;
    const seen = this.#seen.fill(0);
    const all = (-1 >>> (SOURCES_PER_PASS - (to - from))) | 0;
    let count = 0;
    let arcs = 0;
    for (let s = from; s < to; s++) {
      const u = sources[s]!;
      seen[u] = 1 << (s - from);
      this.#fresh[u] = 1 << (s - from);
      this.#people[count++] = u;
      arcs += offsets[u + 1]! - offsets[u]!;
    }
    for (let distance = 1; count > 0; distance++) {
      const reached = arcs > n ? this.#pull(all) : this.#push(count);
      const people = this.#people;
      const fresh = this.#fresh;
      for (let k = 0; k < count; k++) fresh[people[k]!] = 0;
      this.#people = this.#nextPeople;
      this.#fresh = this.#next;
      this.#nextPeople = people;
      this.#next = fresh;
      count = reached;
      arcs = this.#settle(count);
      if (count > 0) visit(distance, this.#people, count, this.#fresh);
    }
  }

  /** Marks what a level reached as seen; answers with the length of its people's rows. */
  #settle(count: number): number {
    const { offsets } = this.#graph;
    const seen = this.#seen;
    const people = this.#people;
    const fresh = this.#fresh;
    let arcs = 0;
    for (let k = 0; k < count; k++) {
      const u = people[k]!;
      seen[u]! |= fresh[u]!;
      arcs += offsets[u + 1]! - offsets[u]!;
    }
    return arcs;
  }

  #push(count: number): number {
    const { offsets, neighbours } = this.#graph;
    const seen = this.#seen;
    const fresh = this.#fresh;
    const next = this.#next;
    const people = this.#people;
    const reached = this.#nextPeople;
    let found = 0;
    for (let k = 0; k < count; k++) {
      const u = people[k]!;
      const word = fresh[u]!;
      const end = offsets[u + 1]!;
      for (let at = offsets[u]!; at < end; at++) {
        const v = neighbours[at]!;
        const news = word & ~seen[v]!;
        if (news === 0) continue;
        const held = next[v]!;
        if (held === 0) reached[found++] = v;
        next[v] = held | news;
      }
    }
    return found;
  }

  #pull(all: number): number {
    const { n, offsets, neighbours } = this.#graph;
    const seen = this.#seen;
    const fresh = this.#fresh;
    const next = this.#next;
    const reached = this.#nextPeople;
    let found = 0;
    for (let u = 0; u < n; u++) {
      const known = seen[u]!;
      if (known === all) continue;
      let word = 0;
      const end = offsets[u + 1]!;
      for (let at = offsets[u]!; at < end; at++) word |= fresh[neighbours[at]!]!;
      word &= ~known;
      if (word === 0) continue;
      next[u] = word;
      reached[found++] = u;
    }
    return found;
  }
}
