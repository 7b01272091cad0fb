import type { NetworkSummary } from "../../../shared/contracts/network.ts";
import { populationNames } from "../../lib/population-words.ts";
import { reasonWords } from "../../lib/reason-words.ts";
import { mayCompareLargest } from "../../lib/threshold-sentence.ts";

/** One line of the table of measures. */
export type MeasureRow = {
  id: string;
  label: string;
  value: number | null;
  interval: readonly [number, number] | null;
  /** How the value is written. */
  unit: "count" | "decimal" | "small" | "share";
  /** People the measure is about. */
  n: number;
  population: string;
  /** Why there is no value, or what it must not be taken for. */
  remark?: string;
};

/** The measures of a report, each with its people; undefined ones with the reason. */
export function measureRows(summary: NetworkSummary): MeasureRow[] {
  const { people, threshold, componentSizes, interviewed } = summary;
  const population = populationNames[summary.population];
  const because = (path: string) => reasonWords(summary.reasons[path]);
  const described = { n: people, population, interval: null } as const;
  const seen = {
    n: threshold.n,
    population:
      threshold.population === "complete" ? "everyone, taken as complete" : seenBy(summary),
  };
  return [
    { id: "people", label: "people", value: people, unit: "count", ...described },
    { id: "pairs", label: "contact pairs", value: summary.pairs, unit: "count", ...described },
    {
      id: "pairsPerPerson",
      label: "contact pairs per person, seen through the interviews",
      value: threshold.pairsPerPerson,
      unit: "decimal",
      ...seen,
      interval: threshold.pairsPerPersonInterval,
      remark: because("threshold.pairsPerPerson") ?? "the figure of the threshold strip",
    },
    ...recallRows(summary, seen),
    {
      id: "meanDegree",
      label: "mean number of contact pairs of a person",
      value: summary.meanDegree,
      unit: "decimal",
      ...described,
      remark: because("meanDegree") ?? "of the recorded network; not to be held against 1",
    },
    {
      id: "meanDegreeInterviewed",
      label: "mean number of contact pairs of an interviewed person",
      value: summary.meanDegreeInterviewed,
      unit: "decimal",
      n: interviewed,
      population: "interviewed people",
      interval: null,
      remark:
        summary.meanDegreeInterviewed === null
          ? (because("meanDegreeInterviewed") ?? reasonWords("no_one_interviewed"))
          : "not to be held against 1: among traced people it runs about 1 too high",
    },
    {
      id: "density",
      label: "density, pairs of all possible pairs",
      value: summary.density,
      unit: "small",
      ...described,
      remark: because("density") ?? `1/n is ${(1 / people).toPrecision(3)}`,
    },
    {
      id: "transitivity",
      label: "transitivity",
      value: summary.transitivity,
      unit: "small",
      ...described,
      remark:
        because("transitivity") ??
        (mayCompareLargest(summary)
          ? "share of two pairs meeting in a person that are closed by a third"
          : "star-shaped by the way people were traced; no comparison with random mixing"),
    },
    {
      id: "isolates",
      label: "people without a contact pair",
      value: summary.isolates,
      unit: "count",
      ...described,
    },
    {
      id: "groups",
      label: "connected groups of two people or more",
      value: componentSizes.filter((size) => size > 1).length,
      unit: "count",
      ...described,
    },
    {
      id: "largestShare",
      label: "largest connected group, share of people",
      value: summary.largestShare,
      unit: "share",
      ...described,
      remark: because("largestShare"),
    },
    expectedShareRow(summary, seen),
  ];
}

type Seen = Pick<MeasureRow, "n" | "population">;

function seenBy({ population, threshold }: NetworkSummary): string {
  const whom = population === "cases" ? "cases" : "people";
  return `${whom}, ${threshold.interviewed} of them interviewed`;
}

function recallRows({ threshold }: NetworkSummary, seen: Seen): MeasureRow[] {
  const { recall, pairsPerPersonRecallCorrected: corrected } = threshold;
  if (typeof recall !== "number" || typeof corrected !== "number") return [];
  return [
    {
      id: "pairsPerPersonRecallCorrected",
      label: "the same, corrected for recall",
      value: corrected,
      unit: "decimal",
      interval: null,
      ...seen,
      remark: "recall taken as known; shown beside the figure, never instead of it",
    },
  ];
}

/** What random mixing would give for the largest group, where it may stand beside the recorded one. */
function expectedShareRow(summary: NetworkSummary, seen: Seen): MeasureRow {
  const may = mayCompareLargest(summary);
  const why = reasonWords(summary.reasons["threshold.expectedGiantShare"]);
  return {
    id: "expectedGiantShare",
    label: "largest connected group that random mixing would give, share of people",
    value: may ? summary.threshold.expectedGiantShare : null,
    unit: "share",
    interval: null,
    ...seen,
    remark: may
      ? (why ?? "in the limit of many people; 0 up to 1 contact pair per person")
      : "not compared: fewer than 90 % of the people were interviewed",
  };
}
