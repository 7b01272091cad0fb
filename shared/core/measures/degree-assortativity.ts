import type { Graph } from "../graph/build-graph.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Degree assortativity: Pearson correlation of the numbers of contact pairs at the two ends of a
 * pair, each pair read both ways; −1 … 1. Above 0, people with many pairs meet people with many.
 *
 * Under random mixing it lies slightly below 0 in small networks, and further below once degrees
 * are kept, so it is compared with simulation and never with 0. Not monotone.
 *
 * Degrees are centred on their mean over link ends before they are multiplied: the sums of squares
 * and cubes of a large network leave the whole numbers a double can hold.
 *
 * Edge cases: no pair (`no_pairs`); every person with a pair has equally many (`equal_degrees`,
 * 0/0). Cost: O(n + m). Source: Newman 2002, *Assortative mixing in networks*; methods C.5.2.
 */
export function degreeAssortativity(graph: Graph): Measured {
  const { n, m, offsets, neighbours } = graph;
  if (m === 0) return undefinedBecause("no_pairs");
  const degrees = new Int32Array(n);
  let squares = 0;
  let least = n;
  let most = 0;
  for (let u = 0; u < n; u++) {
    const degree = offsets[u + 1]! - offsets[u]!;
    degrees[u] = degree;
    squares += degree * degree;
    if (degree > most) most = degree;
    if (degree > 0 && degree < least) least = degree;
  }
  if (least === most) return undefinedBecause("equal_degrees");

  const mean = squares / (2 * m);
  let spread = 0;
  let together = 0;
  for (let u = 0; u < n; u++) {
    const degree = degrees[u]!;
    spread += degree * (degree - mean) * (degree - mean);
    // Rows ascend, so the later ends of u's pairs are the tail of its row.
    const begin = offsets[u]!;
    let k = offsets[u + 1]!;
    const last = k;
    let sum = 0;
    while (k > begin) {
      const v = neighbours[k - 1]!;
      if (v < u) break;
      sum += degrees[v]!;
      k--;
    }
    together += (degree - mean) * (sum - (last - k) * mean);
  }
  return defined((2 * together) / spread);
}
