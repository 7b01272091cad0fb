/**
 * The numeric core: typed arrays in, numbers and typed arrays out. It imports nothing outside its
 * folder and reads no clock; what is random comes from a seed and the number of a replicate.
 */
export { type Articulation, articulation } from "./graph/articulation.ts";
export { buildGraph, type Graph, type PairEnds } from "./graph/build-graph.ts";
export {
  type Communities,
  type CommunityStart,
  communities,
  communitySearch,
  FEWEST_STARTS,
} from "./graph/communities.ts";
export { type Components, components, connectedParts } from "./graph/components.ts";
export { coreNumbers } from "./graph/core-numbers.ts";
export { type InducedSubgraph, inducedSubgraph } from "./graph/induced-subgraph.ts";
export { UnionFind, type UnionResult } from "./graph/union-find.ts";
export { attributeAssortativity } from "./measures/attribute-assortativity.ts";
export { type Clustering, clustering } from "./measures/clustering.ts";
export { colemanHomophily, type Homophily } from "./measures/coleman-homophily.ts";
export { countedPairs } from "./measures/counted-pairs.ts";
export { degreeAssortativity } from "./measures/degree-assortativity.ts";
export { degreeCounts } from "./measures/degree-counts.ts";
export { density, possiblePairs } from "./measures/density.ts";
export { type EiIndex, eiIndex } from "./measures/ei-index.ts";
export { isolates } from "./measures/isolates.ts";
export { largestShare } from "./measures/largest-share.ts";
export { meanDegree } from "./measures/mean-degree.ts";
export { meanDegreeInterviewed } from "./measures/mean-degree-interviewed.ts";
export type { Measured, UndefinedReason } from "./measures/measured.ts";
export {
  MISSING_GROUP,
  type MixingCounts,
  mixingCounts,
} from "./measures/mixing-counts.ts";
export { modularity } from "./measures/modularity.ts";
export {
  type NetworkReport,
  networkReport,
  type ReportOptions,
} from "./measures/network-report.ts";
export { recall } from "./measures/recall.ts";
export {
  FEWEST_FOR_VERDICT,
  FULL_COVERAGE,
  type Threshold,
  type ThresholdFigures,
  type ThresholdInput,
  type ThresholdPopulation,
  threshold,
} from "./measures/threshold.ts";
export { transitivity } from "./measures/transitivity.ts";
export { triangles, trianglesByPerson } from "./measures/triangles.ts";
export { twoPaths } from "./measures/two-paths.ts";
export { type Region, regionsMet, type Verdict, verdictOf } from "./measures/verdict.ts";
export { createStream, type RandomStream, Xoshiro } from "./random/random-stream.ts";
export { lambertGiantShare } from "./stats/lambert-giant-share.ts";
export { type Interval, wilsonInterval, Z_95 } from "./stats/wilson-interval.ts";
export { dayNumber, dayString, MISSING_DAY } from "./time/day-number.ts";
export {
  type ExposureRange,
  type ExposureTable,
  exposureFilter,
  type FilteredPairs,
} from "./time/exposure-filter.ts";
