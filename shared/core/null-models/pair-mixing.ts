import type { SampledNetwork } from "./sampled-network.ts";

/** Mixing by an attribute; NaN = undefined. */
export type MixingFigures = {
  readonly assortativity: number;
  readonly ei: number;
  readonly modularity: number;
};

/**
 * Attribute assortativity, E–I index and modularity of the partition, straight from a list of pairs.
 * Pairs with a missing value at either end are left out.
 *
 * Edge cases: no pair with both values → all undefined; all ends in one class → assortativity
 * undefined. Cost: O(m + classes). Source: Newman 2003 *Mixing patterns in networks*; Krackhardt &
 * Stern 1988; Newman & Girvan 2004; methods C.5.3, C.6.4.
 *
 * @param classOf class of each person, −1 = missing
 */
export function mixingFigures(network: SampledNetwork, classOf: Int32Array): MixingFigures {
  const { a, b, length } = network;
  const ends: number[] = [];
  let inside = 0;
  let known = 0;
  for (let k = 0; k < length; k++) {
    const x = classOf[a[k]!]!;
    const y = classOf[b[k]!]!;
    if (x < 0 || y < 0) continue;
    known++;
    if (x === y) inside++;
    while (ends.length <= x || ends.length <= y) ends.push(0);
    ends[x]!++;
    ends[y]!++;
  }
  if (known === 0) return { assortativity: Number.NaN, ei: Number.NaN, modularity: Number.NaN };
  let squares = 0;
  for (const count of ends) squares += count * count;
  const all = 4 * known * known;
  const shared = 4 * known * inside - squares;
  return {
    assortativity: all === squares ? Number.NaN : shared / (all - squares),
    ei: (known - 2 * inside) / known,
    modularity: shared / all,
  };
}
