import type { NetworkSummary } from "../../../shared/contracts/network.ts";
import { formatInstant, formatNumber } from "../../lib/formatters.ts";
import { exposureWords, populationNames } from "../../lib/population-words.ts";
import { VersionWords } from "./version-words.tsx";

export type ReportLineProps = {
  summary: NetworkSummary;
  timeZone: string;
  /** A newer answer is on its way. */
  updating: boolean;
  /** Only the cut-off and the version, where the sentence or the rows name people and exposures. */
  short?: boolean;
};

/** People, exposures, cut-off and version of a report, in one quiet line. */
export function ReportLine({ summary, timeZone, updating, short = false }: ReportLineProps) {
  return (
    <>
      {short
        ? null
        : `${populationNames[summary.population]} (n ${formatNumber(summary.people)}), ${exposureWords(summary)}, `}
      cut-off {formatInstant(summary.cutOff, timeZone)},{" "}
      <VersionWords graphVersion={summary.graphVersion} updating={updating} />
    </>
  );
}
