import { useSearchParams } from "react-router-dom";
import { hasDuty } from "../../../../shared/roles.ts";
import { paths } from "../../../app/paths.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useSession } from "../../../lib/session-context.ts";
import { InterviewQueue } from "../components/interview-queue.tsx";
import { LineList } from "../components/line-list.tsx";
import { CODED } from "../use-list-state.ts";

/** The line list's coded filters, to be taken along to the export. */
function codedFilters(params: URLSearchParams): string {
  const kept = new URLSearchParams();
  for (const name of CODED) {
    const value = params.get(name);
    if (value) kept.set(name, value);
  }
  const text = kept.toString();
  return text === "" ? "" : `?${text}`;
}

/** Trace: who waits for an interview, and everybody on record. */
export function Component() {
  const { actingRole } = useSession();
  const { id } = useInvestigation();
  const narrowed = codedFilters(useSearchParams()[0]);
  return (
    <RoomPage
      title="Trace"
      subLine="Everybody on record in your sight."
      actions={
        <>
          {hasDuty(actingRole, "reviewMatches") ? (
            <LinkButton to={paths.matches(id)}>Possible duplicates</LinkButton>
          ) : null}
          <LinkButton to={paths.places(id)}>Places</LinkButton>
          {hasDuty(actingRole, "importFiles") ? (
            <LinkButton to={paths.imports(id)}>Import a list</LinkButton>
          ) : null}
          {hasDuty(actingRole, "exportFiles") ? (
            <LinkButton to={`${paths.exports(id)}${narrowed}`}>Export</LinkButton>
          ) : null}
          {hasDuty(actingRole, "register") ? (
            <LinkButton to={paths.newPerson(id)} variant="primary">
              Register a person
            </LinkButton>
          ) : null}
        </>
      }
    >
      <InterviewQueue />
      <Section title="Line list">
        <LineList />
      </Section>
    </RoomPage>
  );
}
