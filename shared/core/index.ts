/**
 * The numeric core: typed arrays in, numbers and typed arrays out. It imports nothing outside its
 * folder and reads no clock; what is random comes from a seed and the number of a replicate.
 */
export { buildGraph, type Graph, type PairEnds } from "./graph/build-graph.ts";
export { type Components, components } from "./graph/components.ts";
export { type InducedSubgraph, inducedSubgraph } from "./graph/induced-subgraph.ts";
export { UnionFind, type UnionResult } from "./graph/union-find.ts";
export { type AnonymisedRows, anonymiseRows, type CodeLadder } from "./measures/anonymise-rows.ts";
export {
  type Comparability,
  comparability,
  type Judgement,
  type ObservationCaution,
  type ObservationDescription,
} from "./measures/comparability.ts";
export {
  COMPARABILITY,
  type ComparisonKey,
  type ComparisonReason,
  type ComparisonRow,
  type ComparisonRule,
  type ObservationState,
  type Standing,
} from "./measures/comparability-table.ts";
export { countedPairs } from "./measures/counted-pairs.ts";
export { degreeCounts } from "./measures/degree-counts.ts";
export { density, possiblePairs } from "./measures/density.ts";
export {
  type DoubleReports,
  doubleReports,
  equalRecallExcess,
  type SidedReports,
  sidedReports,
} from "./measures/double-reports.ts";
export {
  type ExpectedObservation,
  expectedObservation,
  type ObservationDesign,
} from "./measures/expected-observation.ts";
export { feasibleInterval } from "./measures/feasible-interval.ts";
export { isolates } from "./measures/isolates.ts";
export { type Anonymity, type CodeColumn, kAnonymity } from "./measures/k-anonymity.ts";
export { largestShare } from "./measures/largest-share.ts";
export { meanDegree } from "./measures/mean-degree.ts";
export { meanDegreeInterviewed } from "./measures/mean-degree-interviewed.ts";
export type { Measured, UndefinedReason } from "./measures/measured.ts";
export { neighbourDegree } from "./measures/neighbour-degree.ts";
export {
  type NetworkReport,
  networkReport,
  type ReportOptions,
} from "./measures/network-report.ts";
export { type PublishedTable, tableWithTotals } from "./measures/published-table.ts";
export { recall } from "./measures/recall.ts";
export {
  type InterviewRecord,
  type SeenThroughInterviews,
  seenThroughInterviews,
} from "./measures/seen-through-interviews.ts";
export {
  type CellState,
  publishedRate,
  type SuppressedCell,
  type SuppressedTable,
  type SuppressionOptions,
  suppressCells,
} from "./measures/suppress-cells.ts";
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
export { type TwoLists, twoLists } from "./measures/two-lists.ts";
export { twoPaths } from "./measures/two-paths.ts";
export { unresolvedShare } from "./measures/unresolved-share.ts";
export { type NamingCounts, type UnseenPeople, unseenPeople } from "./measures/unseen-people.ts";
export { type Region, regionsMet, type Verdict, verdictOf } from "./measures/verdict.ts";
export { createStream, type RandomStream, Xoshiro } from "./random/random-stream.ts";
export { lambertGiantShare } from "./stats/lambert-giant-share.ts";
export { sampleQuantile } from "./stats/sample-quantile.ts";
export { type SampleSummary, sampleSummary } from "./stats/sample-summary.ts";
export { type Interval, wilsonInterval, Z_95 } from "./stats/wilson-interval.ts";
export { dayNumber, dayString, MISSING_DAY } from "./time/day-number.ts";
export {
  type ExposureRange,
  type ExposureTable,
  exposureFilter,
  type FilteredPairs,
} from "./time/exposure-filter.ts";
export { type FilmFrame, type FilmInput, type GroupFilm, groupFilm } from "./time/group-film.ts";
export { type GroupEvent, LivingGroups } from "./time/living-groups.ts";
export {
  type DatedSpans,
  type PairSpans,
  spansAsItHappened,
  spansAsWeKnewIt,
} from "./time/pair-spans.ts";
