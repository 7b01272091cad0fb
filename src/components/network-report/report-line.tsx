import type { NetworkSummary } from "../../../shared/contracts/network.ts";
import { formatInstant, formatNumber } from "../../lib/formatters.ts";
import { exposureWords, populationNames } from "../../lib/population-words.ts";

export type ReportLineProps = {
  summary: NetworkSummary;
  timeZone: string;
  /** Only the cut-off and the version, where the population stands beside each figure. */
  short?: boolean;
};

/** People, exposures, cut-off and version of a report, in one quiet line. */
export function ReportLine({ summary, timeZone, short = false }: ReportLineProps) {
  const cutOff =
    `cut-off ${formatInstant(summary.cutOff, timeZone)}, ` +
    `version ${formatNumber(summary.graphVersion)}`;
  if (short) return <>{cutOff}</>;
  return (
    <>
      {populationNames[summary.population]} (n {formatNumber(summary.people)}),{" "}
      {exposureWords(summary)}, {cutOff}
    </>
  );
}
