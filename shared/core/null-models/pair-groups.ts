import type { SampledNetwork } from "./sampled-network.ts";

/**
 * Connected groups straight from a list of pairs: union–find over one array that is used again for
 * every network. A root holds minus the size of its group, everyone else the person above them.
 *
 * Cost: near O(n + m). Source: Tarjan 1975 (union by size, path halving); methods C.6.1.
 */
export class PairGroups {
  #above = new Int32Array(0);
  /** Groups found; people without a pair are groups of one. */
  groups = 0;
  /** Sizes of the groups in no particular order: the first `groups` entries. */
  sizes = new Int32Array(0);

  /** Finds the groups; `groups` and `sizes` hold them afterwards. */
  find(network: SampledNetwork): void {
    const { a, b, length, people } = network;
    if (this.#above.length < people) {
      this.#above = new Int32Array(people);
      this.sizes = new Int32Array(people);
    }
    const above = this.#above;
    above.fill(-1, 0, people);
    let left = people;
    for (let k = 0; k < length; k++) {
      let u = a[k]!;
      let v = b[k]!;
      let up = above[u]!;
      while (up >= 0) {
        const next = above[up]!;
        if (next < 0) {
          u = up;
          break;
        }
        above[u] = next;
        u = next;
        up = above[u]!;
      }
      up = above[v]!;
      while (up >= 0) {
        const next = above[up]!;
        if (next < 0) {
          v = up;
          break;
        }
        above[v] = next;
        v = next;
        up = above[v]!;
      }
      if (u === v) continue;
      left--;
      if (above[u]! <= above[v]!) {
        above[u]! += above[v]!;
        above[v] = u;
      } else {
        above[v]! += above[u]!;
        above[u] = v;
      }
    }
    const sizes = this.sizes;
    let found = 0;
    for (let u = 0; u < people; u++) {
      const held = above[u]!;
      if (held < 0) sizes[found++] = -held;
    }
    this.groups = left;
  }
}
