import type { Graph } from "../graph/build-graph.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";
import { trianglesByPerson } from "./triangles.ts";
import { twoPaths } from "./two-paths.ts";

/** How far the contacts of one person are contacts of each other, in all usual readings. */
export type Clustering = {
  readonly triangles: number;
  readonly twoPaths: number;
  /** 3 × triangles ÷ 2-paths. */
  readonly transitivity: Measured;
  /** Triangles ÷ pairs of contacts, by person; 0 for people with fewer than two contacts. */
  readonly local: Float64Array;
  /** Mean of `local` over everyone: fewer than two contacts counts as 0. */
  readonly averageZeros: Measured;
  /** Mean of `local` over people with at least two contacts; the others are left out. */
  readonly averageTwoOrMore: Measured;
};

/**
 * Transitivity, each person's clustering 2t/(k(k − 1)) and its average in both conventions, from
 * one count of triangles. The average weights people alike and transitivity weights 2-paths alike;
 * the two conventions differ whenever somebody has fewer than two contacts, so name the one shown.
 * None of them is monotone: one more pair may raise or lower it.
 *
 * Edge cases: nobody with two contacts → transitivity and `averageTwoOrMore` undefined
 * (`no_two_paths`); n = 0 → `averageZeros` undefined (`no_people`). Cost: that of `triangles`.
 * Source: Watts & Strogatz 1998, *Collective dynamics of small-world networks*; Barrat & Weigt
 * 2000; methods C.5.1.
 */
export function clustering(graph: Graph): Clustering {
  const { n, offsets } = graph;
  const { total, byPerson } = trianglesByPerson(graph);
  const paths = twoPaths(graph);
  const local = byPerson;
  let sum = 0;
  let people = 0;
  for (let u = 0; u < n; u++) {
    const degree = offsets[u + 1]! - offsets[u]!;
    if (degree < 2) continue;
    people++;
    const share = (2 * byPerson[u]!) / (degree * (degree - 1));
    local[u] = share;
    sum += share;
  }
  return {
    triangles: total,
    twoPaths: paths,
    transitivity: paths === 0 ? undefinedBecause("no_two_paths") : defined((3 * total) / paths),
    local,
    averageZeros: n === 0 ? undefinedBecause("no_people") : defined(sum / n),
    averageTwoOrMore: people === 0 ? undefinedBecause("no_two_paths") : defined(sum / people),
  };
}
