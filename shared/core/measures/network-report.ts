import type { Graph } from "../graph/build-graph.ts";
import { components } from "../graph/components.ts";
import { inducedSubgraph } from "../graph/induced-subgraph.ts";
import { countedPairs } from "./counted-pairs.ts";
import { degreeCounts } from "./degree-counts.ts";
import { density } from "./density.ts";
import { isolates } from "./isolates.ts";
import { largestShare } from "./largest-share.ts";
import { meanDegree } from "./mean-degree.ts";
import type { Measured, UndefinedReason } from "./measured.ts";
import { type ThresholdFigures, threshold } from "./threshold.ts";
import { transitivity } from "./transitivity.ts";

export type ReportOptions = {
  /** Population at risk declared for the investigation, or null for the people on record. */
  readonly declaredPopulation: number | null;
  /** The exposures lie in one preset window. */
  readonly presetWindow: boolean;
  /** Recall estimate, or null. */
  readonly recall: number | null;
  /** Whom the descriptive measures are about; default everyone in the graph. */
  readonly describe?: "everyone" | "interviewed";
  /** Withhold the verdict below 90 % coverage ("all on record", "cases"); default false. */
  readonly coverageRequired?: boolean;
};

export type NetworkReport = {
  readonly people: number;
  readonly pairs: number;
  readonly meanDegree: number | null;
  readonly density: number | null;
  /** Descending. */
  readonly componentSizes: number[];
  readonly isolates: number;
  /** Index = number of contact pairs of a person. */
  readonly degreeCounts: number[];
  readonly transitivity: number | null;
  readonly largestShare: number | null;
  readonly threshold: ThresholdFigures;
  /** Dotted path of a figure → why it is null, or why its verdict was weakened. */
  readonly reasons: Record<string, UndefinedReason>;
};

/**
 * The network report on one graph: sizes, density, groups, degree counts, transitivity, threshold.
 *
 * The descriptive measures are those of the graph, or of the subgraph induced on interviewed
 * people with `describe: "interviewed"`. The threshold always reads the whole graph. For a narrower
 * population (cases) pass the graph and flags induced on it, with `declaredPopulation` null.
 *
 * @param graph everyone of the population, isolates included
 * @param isInterviewed one flag per person; null declares the network complete
 * @throws RangeError when the declared population is smaller than the people in the graph, or the
 *   flags do not match them
 *
 * Edge cases: no people → counts 0, empty lists, the rest null with `no_people`. Cost: that of
 * `triangles`. Source: methods C.1, C.2, C.5.1, C.8.
 */
export function networkReport(
  graph: Graph,
  isInterviewed: Uint8Array | null,
  options: ReportOptions,
): NetworkReport {
  const declared = options.declaredPopulation;
  if (declared !== null && declared < graph.n) {
    throw new RangeError("declaredPopulation is smaller than the people on record");
  }
  let interviewed = 0;
  if (isInterviewed) for (const flag of isInterviewed) if (flag !== 0) interviewed++;

  const described =
    isInterviewed && options.describe === "interviewed"
      ? inducedSubgraph(graph, isInterviewed).graph
      : graph;
  const reasons: Record<string, UndefinedReason> = {};
  const take = (path: string, measured: Measured): number | null => {
    if (measured.reason !== null) reasons[path] = measured.reason;
    return measured.value;
  };

  const { n, m } = described;
  const { sizes } = components(described);
  const { reasons: thresholdReasons, ...figures } = threshold({
    population: isInterviewed ? "interviewed" : "complete",
    n: declared ?? graph.n,
    interviewed,
    countedPairs: isInterviewed ? countedPairs(graph, isInterviewed) : graph.m,
    presetWindow: options.presetWindow,
    coverageRequired: options.coverageRequired ?? false,
    recall: options.recall,
  });
  const report = {
    people: n,
    pairs: m,
    meanDegree: take("meanDegree", meanDegree(n, m)),
    density: take("density", density(n, m)),
    componentSizes: Array.from(sizes),
    isolates: isolates(described),
    degreeCounts: Array.from(degreeCounts(described)),
    transitivity: take("transitivity", transitivity(described)),
    largestShare: take("largestShare", largestShare(n, sizes)),
    threshold: figures,
  };
  for (const [key, reason] of Object.entries(thresholdReasons)) {
    reasons[`threshold.${key}`] = reason;
  }
  return { ...report, reasons };
}
