import { useQuery } from "@tanstack/react-query";
import type { ReactNode } from "react";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { isCase } from "../../../../shared/vocabulary.ts";
import { paths } from "../../../app/paths.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { PersonMark } from "../../../components/person-mark/person-mark.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { formatCount, formatDay } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { classificationWords } from "../../../lib/words.ts";
import { personQuery } from "../api/get-person.ts";
import { ILLNESS_FACTS, WHO_FACTS } from "../person-facts.ts";
import { personMarkOf } from "../person-mark-of.ts";
import { Assignment } from "./assignment.tsx";
import { EditableSection } from "./editable-section.tsx";
import { GroupExposureList } from "./group-exposure-list.tsx";
import { AttemptHistory, ClassificationHistory } from "./history.tsx";
import { PairTable } from "./pair-table.tsx";
import { PersonStrip } from "./person-strip.tsx";

export type PersonRecordProps = {
  personId: string;
  /** Tests are another feature: the page is put together by the application. */
  tests: (person: PersonPage) => ReactNode;
};

/** A person's page. Who reads it decides what the answer holds; the page shows what is there. */
export function PersonRecord({ personId, tests }: PersonRecordProps) {
  const { id: investigationId } = useInvestigation();
  const person = useQuery(personQuery(investigationId, personId));
  if (person.data) return <Record person={person.data} tests={tests} />;
  return (
    <div className="pt-6">
      {person.isError ? (
        <ErrorState
          kind={errorKind(person.error)}
          onRetry={() => void person.refetch()}
          actions={<LinkButton to={paths.trace(investigationId)}>To the line list</LinkButton>}
        />
      ) : (
        <LoadingState label="Opening the record" rows={8} />
      )}
    </div>
  );
}

function Record({ person, tests }: { person: PersonPage; tests: PersonRecordProps["tests"] }) {
  const { id: investigationId, today, timeZone } = useInvestigation();
  const shared = { person, investigationId, today };
  const mark = personMarkOf(person);
  return (
    <RoomPage
      title={person.name ?? person.studyNumber}
      tabTitle={person.studyNumber}
      subLine={
        <>
          {mark ? <PersonMark {...mark} decorative className="me-1.5" /> : null}
          {person.name ? `${person.studyNumber} · ` : ""}
          {person.classification ? classificationWords[person.classification] : "not classified"}
          {monitoringWords(person, today)}
        </>
      }
      actions={
        <>
          <LinkButton to={paths.trace(investigationId)}>Line list</LinkButton>
          {person.can.interview && isCase(person.classification) ? (
            <LinkButton to={paths.interview(investigationId, person.id)} variant="primary">
              Interview
            </LinkButton>
          ) : null}
        </>
      }
      sideLabel="History of the record"
      side={<Side person={person} investigationId={investigationId} timeZone={timeZone} />}
    >
      <PersonStrip person={person} today={today} />
      <EditableSection title="Who" section="who" facts={WHO_FACTS} {...shared} />
      <EditableSection title="Illness" section="illness" facts={ILLNESS_FACTS} {...shared} />
      {tests(person)}
      <Section title="Contact pairs" subLine={formatCount(person.pairs.length, "pair", "pairs")}>
        <PairTable person={person} investigationId={investigationId} />
      </Section>
      {person.groupExposures.length > 0 ? (
        <Section title="Met but not named" subLine="counted apart, no part of the network">
          <GroupExposureList groups={person.groupExposures} />
        </Section>
      ) : null}
    </RoomPage>
  );
}

function Side(props: { person: PersonPage; investigationId: string; timeZone: string }) {
  const { person, investigationId, timeZone } = props;
  return (
    <>
      {"assignedTo" in person ? (
        <Section title="Assignment" level={3}>
          <Assignment person={person} investigationId={investigationId} />
        </Section>
      ) : null}
      <Section title="Classification" level={3}>
        <ClassificationHistory person={person} timeZone={timeZone} />
      </Section>
      <Section title="Interviews and attempts" level={3}>
        <AttemptHistory person={person} timeZone={timeZone} />
      </Section>
      <p className="text-sm text-ink-2">
        Opening this page was recorded: views of a record are logged.
      </p>
    </>
  );
}

function monitoringWords(person: PersonPage, today: string): string {
  if (!person.monitoring) return "";
  const { lastDueDay } = person.monitoring;
  const words = lastDueDay < today ? "monitoring period ended" : "monitored until";
  return ` · ${words} ${formatDay(lastDueDay)}`;
}
