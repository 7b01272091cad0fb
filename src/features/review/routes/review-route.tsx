import { useQuery } from "@tanstack/react-query";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { ReportLine } from "../../../components/network-report/report-line.tsx";
import { ThresholdFigure } from "../../../components/network-report/threshold-figure.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { useCutOff } from "../../../lib/cut-off-context.ts";
import { formatDay } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { type NetworkQuestion, networkSummaryQuery } from "../../../lib/network-summary-query.ts";
import { ClustersSection } from "../components/clusters-section.tsx";
import { GroupsSection } from "../components/groups-section.tsx";

/** The population of which most may be said: the figure is read through the interviews. */
const question: NetworkQuestion = { population: "interviewed", window: "preset" };

/** Review: where the network stands this morning, and which groups grew. */
export function Component() {
  const { id, timeZone, populationAtRisk, today } = useInvestigation();
  const report = useQuery(networkSummaryQuery(id, question));
  const summary = report.data;
  const updating = report.isFetching && summary !== undefined;
  useCutOff(
    summary ? { cutOff: summary.cutOff, graphVersion: summary.graphVersion, updating } : null,
  );
  return (
    <RoomPage title="Review" subLine={formatDay(today, { style: "long" })}>
      <Section
        title="Threshold strip"
        subLine={
          summary ? (
            <>
              contact pairs per person, as seen through the interviews,{" "}
              <ReportLine {...{ summary, timeZone, updating }} short />
            </>
          ) : undefined
        }
      >
        {summary ? (
          <ThresholdFigure summary={summary} populationAtRisk={populationAtRisk} />
        ) : report.isError ? (
          <ErrorState kind={errorKind(report.error)} onRetry={() => void report.refetch()} />
        ) : (
          <LoadingState label="Working out the report" rows={3} />
        )}
      </Section>
      <GroupsSection />
      <ClustersSection />
    </RoomPage>
  );
}
