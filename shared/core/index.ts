/**
 * The numeric core: typed arrays in, numbers and typed arrays out. It imports nothing outside its
 * folder and reads no clock; what is random comes from a seed and the number of a replicate.
 */
export { CORE_VERSION, GENERATOR } from "./core-version.ts";
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
export { foldLeaves } from "./graph/fold-leaves.ts";
export { type InducedSubgraph, inducedSubgraph } from "./graph/induced-subgraph.ts";
export { type Relabelled, searchOrder } from "./graph/search-order.ts";
export { chunkRange, SOURCE_CHUNKS } from "./graph/source-chunks.ts";
export { UnionFind, type UnionResult } from "./graph/union-find.ts";
export { type AnonymisedRows, anonymiseRows, type CodeLadder } from "./measures/anonymise-rows.ts";
export { attributeAssortativity } from "./measures/attribute-assortativity.ts";
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
export { type Clustering, clustering } from "./measures/clustering.ts";
export { colemanHomophily, type Homophily } from "./measures/coleman-homophily.ts";
export {
  type Comparability,
  comparability,
  type Judgement,
  type ObservationCaution,
  type ObservationDescription,
} from "./measures/comparability.ts";
export {
  COMPARABILITY,
  COMPARISON_KEYS,
  type ComparisonKey,
  type ComparisonReason,
  type ComparisonRow,
  type ComparisonRule,
  OBSERVATION_STATES,
  type ObservationState,
  STANDINGS,
  type Standing,
} from "./measures/comparability-table.ts";
export {
  connectedProbability,
  connectivityLimit,
  connectivityOffset,
  lnConnectedProbability,
  MOST_PEOPLE_EXACT,
} from "./measures/connectivity.ts";
export { countedPairs } from "./measures/counted-pairs.ts";
export { degreeAssortativity } from "./measures/degree-assortativity.ts";
export { degreeCounts } from "./measures/degree-counts.ts";
export {
  type DegreeBin,
  type DegreeFit,
  degreeFit,
  FEWEST_EXPECTED,
} from "./measures/degree-fit.ts";
export {
  type DegreeLaw,
  observedDegreeLaw,
  poissonDegreeLaw,
} from "./measures/degree-generating.ts";
export {
  binomialDegrees,
  type PoissonError,
  poissonDegrees,
  poissonError,
} from "./measures/degree-law.ts";
export { degreeVariance } from "./measures/degree-variance.ts";
export { density, possiblePairs } from "./measures/density.ts";
export { type Dispersion, dispersion } from "./measures/dispersion.ts";
export { type DistanceEstimates, distanceEstimates } from "./measures/distance-estimates.ts";
export {
  type DoubleReports,
  doubleReports,
  equalRecallExcess,
  type SidedReports,
  sidedReports,
} from "./measures/double-reports.ts";
export { type EiIndex, eiIndex } from "./measures/ei-index.ts";
export {
  EIGENVECTOR_STEPS,
  EIGENVECTOR_TOLERANCE,
  type EigenvectorCentrality,
  eigenvectorCentrality,
} from "./measures/eigenvector-centrality.ts";
export type { Estimate, EstimatePerPerson } from "./measures/estimate.ts";
export { excessDegreeRatio, meanExcessDegree } from "./measures/excess-degree.ts";
export { expectedIsolatesGnm, expectedIsolatesGnp } from "./measures/expected-isolates.ts";
export {
  type ExpectedObservation,
  expectedObservation,
  type ObservationDesign,
} from "./measures/expected-observation.ts";
export {
  expectedTrianglesGnm,
  expectedTrianglesGnp,
  expectedTwoPathsGnm,
  expectedTwoPathsGnp,
} from "./measures/expected-triangles.ts";
export { feasibleInterval } from "./measures/feasible-interval.ts";
export { isolates } from "./measures/isolates.ts";
export { type Anonymity, type CodeColumn, kAnonymity } from "./measures/k-anonymity.ts";
export { largestShare } from "./measures/largest-share.ts";
export { meanDegree } from "./measures/mean-degree.ts";
export { type MeanDegreeIntervals, meanDegreeIntervals } from "./measures/mean-degree-intervals.ts";
export { meanDegreeInterviewed } from "./measures/mean-degree-interviewed.ts";
export type { Measured, UndefinedReason } from "./measures/measured.ts";
export { MISSING_GROUP, type MixingCounts, mixingCounts } from "./measures/mixing-counts.ts";
export { modularity } from "./measures/modularity.ts";
export {
  type DirectedMeasure,
  type Direction,
  MEASURE_DIRECTIONS,
  MONOTONE_PROPERTIES,
  type MonotoneProperty,
  type Transition,
} from "./measures/monotone-properties.ts";
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
export { type Percolation, percolation, transmissibility } from "./measures/percolation.ts";
export { type PublishedTable, tableWithTotals } from "./measures/published-table.ts";
export {
  type CriticalWindow,
  criticalWindow,
  largestSmallGroup,
  type RandomMixingGroups,
  randomMixingGroups,
} from "./measures/random-mixing-groups.ts";
export { recall } from "./measures/recall.ts";
export { removalThresholdDegrees, removalThresholdMixing } from "./measures/removal-thresholds.ts";
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
export { type SecondaryAttackRate, secondaryAttackRate } from "./measures/secondary-attack-rate.ts";
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
export { triangles, trianglesByPerson } from "./measures/triangles.ts";
export { type TwoLists, twoLists } from "./measures/two-lists.ts";
export { twoPaths } from "./measures/two-paths.ts";
export { unresolvedShare } from "./measures/unresolved-share.ts";
export { type NamingCounts, type UnseenPeople, unseenPeople } from "./measures/unseen-people.ts";
export { type Region, regionsMet, type Verdict, verdictOf } from "./measures/verdict.ts";
export {
  BURN_IN_PER_PAIR,
  degreePreservingSampler,
} from "./null-models/degree-preserving-sampler.ts";
export { gnmSampler } from "./null-models/gnm-sampler.ts";
export { gnpSampler } from "./null-models/gnp-sampler.ts";
export { HEAVY_STATISTICS, type HeavyStatistic } from "./null-models/heavy-statistics.ts";
export { householdSampler } from "./null-models/household-sampler.ts";
export { mixingSampler } from "./null-models/mixing-sampler.ts";
export { type NullModel, samplerOf } from "./null-models/null-model.ts";
export { onlyGraph } from "./null-models/only-graph.ts";
export { pairAt, type TwoEnds } from "./null-models/pair-at.ts";
export { PairSet } from "./null-models/pair-set.ts";
export {
  type QuickStatistic,
  ReplicateStatistics,
  rowWidth,
  STATISTICS,
  type Statistic,
  type StatisticsChoice,
} from "./null-models/replicate-statistics.ts";
export {
  observedRow,
  type ReplicatePlan,
  type ReplicateRunner,
  replicateRange,
  replicateRunner,
} from "./null-models/run-replicates.ts";
export type { SampledNetwork, Sampler } from "./null-models/sampled-network.ts";
export {
  type CurveSummary,
  type ReplicatesSummary,
  summariseReplicates,
} from "./null-models/summarise-replicates.ts";
export { SwapChain } from "./null-models/swap-chain.ts";
export { type TracedRecord, tracedDesign } from "./null-models/traced-design.ts";
export { type TracedDesign, tracedSampler } from "./null-models/traced-sampler.ts";
export { drawPeople } from "./random/draw-people.ts";
export { createStream, type RandomStream, Xoshiro } from "./random/random-stream.ts";
export { benjaminiHochberg, holm } from "./stats/adjusted-p.ts";
export { binomialCdf, binomialPmf, binomialQuantile, binomialUpper } from "./stats/binomial-law.ts";
export { chiSquaredCdf, chiSquaredQuantile, chiSquaredUpper } from "./stats/chi-squared-law.ts";
export { clopperPearsonInterval } from "./stats/clopper-pearson-interval.ts";
export { digamma, trigamma } from "./stats/digamma.ts";
export { type GammaFit, gammaByLikelihood, gammaByMoments } from "./stats/gamma-fit.ts";
export {
  gammaCdf,
  gammaPdf,
  gammaQuantile,
  gammaUpper,
  gammaUpperQuantile,
} from "./stats/gamma-law.ts";
export {
  hypergeometricCdf,
  hypergeometricPmf,
  hypergeometricQuantile,
  hypergeometricUpper,
  hypergeometricVariance,
  type Urn,
} from "./stats/hypergeometric-law.ts";
export { incompleteBeta } from "./stats/incomplete-beta.ts";
export { incompleteGamma, type Tails } from "./stats/incomplete-gamma.ts";
export { inverseBetaLower, inverseBetaUpper } from "./stats/inverse-beta.ts";
export { inverseGammaLower, inverseGammaUpper } from "./stats/inverse-gamma.ts";
export { lambertGiantShare } from "./stats/lambert-giant-share.ts";
export { lnGamma } from "./stats/ln-gamma.ts";
export { type MonteCarloP, monteCarloP, TIE_TOLERANCE } from "./stats/monte-carlo-p.ts";
export {
  negativeBinomialCdf,
  negativeBinomialPmf,
  negativeBinomialQuantile,
  negativeBinomialUpper,
} from "./stats/negative-binomial-law.ts";
export { normalCdf, normalQuantile, normalUpper } from "./stats/normal-law.ts";
export { type Envelope, pointwiseEnvelope } from "./stats/pointwise-envelope.ts";
export { poissonCdf, poissonPmf, poissonQuantile, poissonUpper } from "./stats/poisson-law.ts";
export { FEWEST_FOR_ENVELOPE, type RankEnvelope, rankEnvelope } from "./stats/rank-envelope.ts";
export { type ReplicateSummary, replicateSummary } from "./stats/replicate-summary.ts";
export { sampleQuantile } from "./stats/sample-quantile.ts";
export { type SampleSummary, sampleSummary } from "./stats/sample-summary.ts";
export { studentCdf, studentQuantile } from "./stats/student-law.ts";
export { type Interval, wilsonInterval, Z_95 } from "./stats/wilson-interval.ts";
export { type CaseR, COMPLETE_SHARE, caseR, caseRByCase } from "./time/case-r.ts";
export { infectiousness } from "./time/case-series.ts";
export { dayNumber, dayString, MISSING_DAY } from "./time/day-number.ts";
export { type DoublingTime, doublingTime } from "./time/doubling-time.ts";
export {
  type CaseDays,
  type CurveBin,
  type CurveOptions,
  curveBinDays,
  type EpidemicCurve,
  epidemicCurve,
} from "./time/epidemic-curve.ts";
export {
  type ExposureRange,
  type ExposureTable,
  exposureFilter,
  type FilteredPairs,
} from "./time/exposure-filter.ts";
export { extinctionProbability, noOffspringProbability } from "./time/extinction.ts";
export { type FilmFrame, type FilmInput, type GroupFilm, groupFilm } from "./time/group-film.ts";
export {
  type LogLinearGrowth,
  logLinearGrowth,
  type PoissonGrowth,
  poissonGrowth,
} from "./time/growth.ts";
export {
  type HiddenWindow,
  type InstantaneousInput,
  instantaneousR,
  WIDEST_VARIATION,
  type WindowedR,
} from "./time/instantaneous-r.ts";
export { type GroupEvent, LivingGroups } from "./time/living-groups.ts";
export { type OffspringFit, offspringFit } from "./time/offspring-fit.ts";
export {
  type DatedSpans,
  type PairSpans,
  spansAsItHappened,
  spansAsWeKnewIt,
} from "./time/pair-spans.ts";
export { reproductionFromGrowth } from "./time/reproduction-from-growth.ts";
export { type SerialInterval, serialInterval } from "./time/serial-interval.ts";
export { meanOfWeights, serialIntervalWeights } from "./time/serial-interval-weights.ts";
export { modelTopShare, observedTopShare } from "./time/top-share.ts";
