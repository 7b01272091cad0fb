import type { Graph } from "./build-graph.ts";

const UNREACHED = 0x7fffffff;
// Path counts beyond LARGE are scaled, a whole level at a time, long before a double overflows.
const LARGE = 2 ** 400;
const SCALE = 2 ** -400;
const SMALLEST = 2 ** -900;

/**
 * Shortest paths from one person at a time, counted, and how much each other person stands on them.
 *
 * Forwards, the pairs that lead one step further are written down, so that the way back touches
 * only those, and without asking again. On the way back each person `v` carries
 * `g(v) = weight(v) / paths(v) + Σ g(child)`; the dependency of the source on `v` is then
 * `paths(v) · Σ g(child)`.
 *
 * Path counts are doubles: exact to 2^53, a relative 1e-16 a step beyond. Above 2^400 a level is
 * scaled by 2^-400, as only ratios of neighbouring levels matter; counts that fall 2^-900 below
 * their level's scale are rounded up to it, which no network but an artificial one can notice.
 *
 * Cost of a source: O(n + m). Source: Brandes 2001, *A faster algorithm for betweenness
 * centrality*.
 */
export class DependencySearch {
  /** People reached by the last `run`, the source first, by distance. */
  readonly order: Int32Array;
  /** Dependency of the last source on each person reached; undefined for the source itself. */
  readonly dependency: Float64Array;
  readonly #graph: Graph;
  readonly #weight: Float64Array;
  readonly #distance: Int32Array;
  readonly #paths: Float64Array;
  readonly #carried: Float64Array;
  readonly #children: Int32Array;
  readonly #childEnds: Int32Array;
  /** Places in `order`, [from, to), of the levels whose children were scaled. */
  readonly #scaled: number[] = [];

  /** @param weight how many people each person of `graph` stands for as an end of paths */
  constructor(graph: Graph, weight: Float64Array) {
    const { n, m } = graph;
    this.#graph = graph;
    this.#weight = weight;
    this.order = new Int32Array(n);
    this.dependency = new Float64Array(n);
    this.#distance = new Int32Array(n);
    this.#paths = new Float64Array(n);
    this.#carried = new Float64Array(n);
    this.#children = new Int32Array(m);
    this.#childEnds = new Int32Array(n);
  }

  /** Searches from `source`; answers with the number of people reached, the source included. */
  run(source: number): number {
    const reached = this.#forwards(source);
    let end = reached;
    for (let k = this.#scaled.length - 2; k >= 0; k -= 2) {
      const from = this.#scaled[k]!;
      const to = this.#scaled[k + 1]!;
      this.#backwards(to, end, 1);
      this.#backwards(from, to, SCALE);
      end = from;
    }
    this.#backwards(0, end, 1);
    return reached;
  }

  #forwards(source: number): number {
    const { offsets, neighbours } = this.#graph;
    const distance = this.#distance.fill(UNREACHED);
    const paths = this.#paths;
    const order = this.order;
    const children = this.#children;
    const childEnds = this.#childEnds;
    this.#scaled.length = 0;
    distance[source] = 0;
    paths[source] = 1;
    order[0] = source;
    let from = 0;
    let tail = 1;
    let written = 0;
    for (let next = 1; from < tail; next++) {
      const to = tail;
      let most = 0;
      for (let at = from; at < to; at++) {
        const u = order[at]!;
        const count = paths[u]!;
        if (count > most) most = count;
        const end = offsets[u + 1]!;
        for (let k = offsets[u]!; k < end; k++) {
          const v = neighbours[k]!;
          const held = distance[v]!;
          if (held < next) continue;
          if (held === UNREACHED) {
            distance[v] = next;
            paths[v] = count;
            order[tail++] = v;
          } else {
            paths[v]! += count;
          }
          children[written++] = v;
        }
        childEnds[at] = written;
      }
      if (most > LARGE) {
        this.#scaled.push(from, to);
        for (let at = to; at < tail; at++) {
          paths[order[at]!] = Math.max(paths[order[at]!]! * SCALE, SMALLEST);
        }
      }
      from = to;
    }
    return tail;
  }

  #backwards(from: number, to: number, scale: number): void {
    const order = this.order;
    const weight = this.#weight;
    const paths = this.#paths;
    const carried = this.#carried;
    const dependency = this.dependency;
    const children = this.#children;
    const childEnds = this.#childEnds;
    for (let at = to - 1; at >= from; at--) {
      const v = order[at]!;
      const end = childEnds[at]!;
      let sum = 0;
      for (let k = at === 0 ? 0 : childEnds[at - 1]!; k < end; k++) sum += carried[children[k]!]!;
      sum *= scale;
      const count = paths[v]!;
      carried[v] = weight[v]! / count + sum;
      dependency[v] = count * sum;
    }
  }
}
