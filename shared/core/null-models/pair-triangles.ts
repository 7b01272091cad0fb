import type { SampledNetwork } from "./sampled-network.ts";

/**
 * Triangles straight from a list of pairs, without building a graph first: made to be run thousands
 * of times in the same arrays.
 *
 * Every pair is pointed from the person with fewer pairs to the one with more (equal: lower to
 * higher number), as in `triangles`; what a person points at is dropped into rows by counting.
 *
 * Cost: O(n + m·√m), in practice near linear. Source: forward algorithm, Schank & Wagner 2005
 * (recalled); methods C.5.1.
 */
export class PairTriangles {
  #starts = new Int32Array(0);
  #targets = new Int32Array(0);
  #marked = new Int32Array(0);
  /** Triangles at each person, filled by `countByPerson`. */
  byPerson = new Int32Array(0);

  #point(network: SampledNetwork, degrees: Int32Array): void {
    const { a, b, length, people } = network;
    if (this.#starts.length < people + 2) {
      this.#starts = new Int32Array(people + 2);
      this.#marked = new Int32Array(people);
    }
    if (this.#targets.length < length) this.#targets = new Int32Array(length);
    const starts = this.#starts;
    const targets = this.#targets;
    starts.fill(0, 0, people + 2);
    for (let k = 0; k < length; k++) {
      const u = a[k]!;
      const v = b[k]!;
      const difference = degrees[u]! - degrees[v]!;
      const from = difference < 0 || (difference === 0 && u < v) ? u : v;
      starts[from + 2]!++;
    }
    for (let u = 2; u < people + 2; u++) starts[u]! += starts[u - 1]!;
    // Row u begins at starts[u + 1] while it is filled, and at starts[u] once it is full.
    for (let k = 0; k < length; k++) {
      const u = a[k]!;
      const v = b[k]!;
      const difference = degrees[u]! - degrees[v]!;
      if (difference < 0 || (difference === 0 && u < v)) targets[starts[u + 1]!++] = v;
      else targets[starts[v + 1]!++] = u;
    }
    this.#marked.fill(-1, 0, people);
  }

  /** Number of triangles. @param degrees pairs of each person */
  count(network: SampledNetwork, degrees: Int32Array): number {
    this.#point(network, degrees);
    const starts = this.#starts;
    const targets = this.#targets;
    const marked = this.#marked;
    let count = 0;
    for (let u = 0; u < network.people; u++) {
      const begin = starts[u]!;
      const end = starts[u + 1]!;
      if (end - begin < 2) continue;
      for (let k = begin; k < end; k++) marked[targets[k]!] = u;
      for (let k = begin; k < end; k++) {
        const v = targets[k]!;
        const last = starts[v + 1]!;
        for (let j = starts[v]!; j < last; j++) if (marked[targets[j]!] === u) count++;
      }
    }
    return count;
  }

  /** Number of triangles, with those at each person left in `byPerson`. */
  countByPerson(network: SampledNetwork, degrees: Int32Array): number {
    this.#point(network, degrees);
    const starts = this.#starts;
    const targets = this.#targets;
    const marked = this.#marked;
    if (this.byPerson.length < network.people) this.byPerson = new Int32Array(network.people);
    const at = this.byPerson.fill(0, 0, network.people);
    let count = 0;
    for (let u = 0; u < network.people; u++) {
      const begin = starts[u]!;
      const end = starts[u + 1]!;
      if (end - begin < 2) continue;
      for (let k = begin; k < end; k++) marked[targets[k]!] = u;
      for (let k = begin; k < end; k++) {
        const v = targets[k]!;
        const last = starts[v + 1]!;
        for (let j = starts[v]!; j < last; j++) {
          const w = targets[j]!;
          if (marked[w] !== u) continue;
          count++;
          at[u]!++;
          at[v]!++;
          at[w]!++;
        }
      }
    }
    return count;
  }
}
