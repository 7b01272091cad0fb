/**
 * The numeric core: typed arrays in, numbers and typed arrays out. It imports nothing outside its
 * folder and reads no clock; what is random comes from a seed and the number of a replicate.
 */
export { buildGraph, type Graph, type PairEnds } from "./graph/build-graph.ts";
export { type Components, components } from "./graph/components.ts";
export { foldLeaves } from "./graph/fold-leaves.ts";
export { type InducedSubgraph, inducedSubgraph } from "./graph/induced-subgraph.ts";
export { type Relabelled, searchOrder } from "./graph/search-order.ts";
export { SOURCE_CHUNKS } from "./graph/source-chunks.ts";
export { UnionFind, type UnionResult } from "./graph/union-find.ts";
export {
  addChunks,
  type BetweennessPlan,
  betweenness,
  betweennessChunk,
  betweennessPlan,
  normalisedBetweenness,
} from "./measures/betweenness.ts";
export {
  type Closeness,
  type ClosenessSums,
  closeness,
  closenessChunk,
  closenessOf,
} from "./measures/closeness.ts";
export { countedPairs } from "./measures/counted-pairs.ts";
export { degreeCounts } from "./measures/degree-counts.ts";
export { density, possiblePairs } from "./measures/density.ts";
export {
  EIGENVECTOR_STEPS,
  EIGENVECTOR_TOLERANCE,
  type EigenvectorCentrality,
  eigenvectorCentrality,
} from "./measures/eigenvector-centrality.ts";
export type { Estimate, EstimatePerPerson } from "./measures/estimate.ts";
export { isolates } from "./measures/isolates.ts";
export { largestShare } from "./measures/largest-share.ts";
export { meanDegree } from "./measures/mean-degree.ts";
export { meanDegreeInterviewed } from "./measures/mean-degree-interviewed.ts";
export type { Measured, UndefinedReason } from "./measures/measured.ts";
export {
  type NetworkReport,
  networkReport,
  type ReportOptions,
} from "./measures/network-report.ts";
export {
  addDistances,
  EXACT_UP_TO_PEOPLE,
  type PathFigures,
  pathFigures,
  pathFiguresOf,
} from "./measures/path-figures.ts";
export { recall } from "./measures/recall.ts";
export {
  addSampledChunks,
  type DrawnSources,
  drawSources,
  type SampledChunk,
  sampledBetweenness,
  sampledBetweennessChunk,
} from "./measures/sampled-betweenness.ts";
export { sampledCloseness } from "./measures/sampled-closeness.ts";
export { type SampledPathFigures, sampledPathFigures } from "./measures/sampled-path-figures.ts";
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
export { triangles } from "./measures/triangles.ts";
export { twoPaths } from "./measures/two-paths.ts";
export { type Region, regionsMet, type Verdict, verdictOf } from "./measures/verdict.ts";
export { drawPeople } from "./random/draw-people.ts";
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
