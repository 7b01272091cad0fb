import { useQuery } from "@tanstack/react-query";
import { Bars } from "../../../components/bars/bars.tsx";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { ReportLine } from "../../../components/network-report/report-line.tsx";
import { ThresholdFigure } from "../../../components/network-report/threshold-figure.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { useCutOff } from "../../../lib/cut-off-context.ts";
import { formatPart } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { networkSummaryQuery } from "../../../lib/network-summary-query.ts";
import { saveText } from "../../../lib/save-text.ts";
import { ComparisonsSection } from "../components/comparisons-section.tsx";
import { MeasuresTable } from "../components/measures-table.tsx";
import { PictureSection } from "../components/picture-section.tsx";
import { QuestionControls } from "../components/question-controls.tsx";
import { WhatWasSeen } from "../components/what-was-seen.tsx";
import { degreeBars, sizeBars } from "../count-bars.ts";
import { reportCsv } from "../report-csv.ts";
import { isReversed, useQuestion } from "../use-question.ts";

/** Compare: the recorded network against the threshold, its measures, and its picture. */
export function Component() {
  const { id, timeZone, populationAtRisk } = useInvestigation();
  const [{ question, drawn }, change] = useQuestion();
  const report = useQuery({
    ...networkSummaryQuery(id, question),
    enabled: !isReversed(question),
  });
  const summary = report.data;
  const updating = report.isFetching && summary !== undefined;
  useCutOff(
    summary ? { cutOff: summary.cutOff, graphVersion: summary.graphVersion, updating } : null,
  );

  return (
    <RoomPage
      title="Compare"
      subLine={summary ? <ReportLine {...{ summary, timeZone, updating }} /> : undefined}
      actions={
        summary ? (
          <Button
            onClick={() =>
              saveText(`network-report-version-${summary.graphVersion}.csv`, reportCsv(summary))
            }
          >
            Save as CSV
          </Button>
        ) : undefined
      }
    >
      <QuestionControls question={question} onChange={change} />
      {report.isError && !summary ? (
        <ErrorState kind={errorKind(report.error)} onRetry={() => void report.refetch()} />
      ) : !summary ? (
        <LoadingState label="Working out the report" rows={10} />
      ) : (
        <div aria-busy={updating || undefined}>
          {report.isError ? (
            <ErrorState kind={errorKind(report.error)} onRetry={() => void report.refetch()} />
          ) : null}
          <WhatWasSeen summary={summary} populationAtRisk={populationAtRisk} />
          <Section
            title="Threshold strip"
            subLine="contact pairs per person, as seen through the interviews"
          >
            <ThresholdFigure summary={summary} populationAtRisk={populationAtRisk} />
          </Section>
          <div className="grid gap-x-10 lg:grid-cols-2">
            <Section title="Contact pairs of a person">
              <Bars
                label="People by their number of contact pairs"
                categoryLabel="contact pairs of a person"
                valueLabel="people"
                items={degreeBars(summary.degreeCounts)}
                empty="Nobody to count"
              />
            </Section>
            <Section title="Sizes of connected groups">
              <Bars
                label="Connected groups by their number of people"
                categoryLabel="people in a group"
                valueLabel="groups"
                items={sizeBars(summary.componentSizes)}
                empty="Nobody to count"
              />
            </Section>
          </div>
          <Section
            title="Measures"
            subLine={<ReportLine {...{ summary, timeZone, updating }} short />}
          >
            <MeasuresTable summary={summary} />
            <Caution className="mt-2">
              A difference from random mixing can come from how people were traced. Compare only
              within interviewed people (share interviewed:{" "}
              {formatPart(summary.threshold.interviewed, summary.threshold.n)}). “—” means not
              worked out; it is not 0.
            </Caution>
          </Section>
        </div>
      )}
      <ComparisonsSection investigationId={id} timeZone={timeZone} question={question} />
      {summary ? <PictureSection question={question} drawn={drawn} onChange={change} /> : null}
    </RoomPage>
  );
}
