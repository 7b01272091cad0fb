import type { Graph } from "../graph/build-graph.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";
import { triangles } from "./triangles.ts";
import { twoPaths } from "./two-paths.ts";

/**
 * Transitivity: 3 × triangles ÷ 2-paths, the share of "two contacts of one person" who are
 * contacts of each other; between 0 and 1. Under random mixing it is near the density.
 *
 * Edge cases: no 2-path → undefined (`no_two_paths`). It is not the average of the people's own
 * clustering, which weights people alike. Cost: that of `triangles`. Source: Barrat & Weigt 2000;
 * methods C.5.1.
 */
export function transitivity(graph: Graph): Measured {
  const paths = twoPaths(graph);
  if (paths === 0) return undefinedBecause("no_two_paths");
  return defined((3 * triangles(graph)) / paths);
}
