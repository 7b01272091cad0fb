import { hasDuty } from "../../../../shared/roles.ts";
import { paths } from "../../../app/paths.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useSession } from "../../../lib/session-context.ts";
import { InterviewQueue } from "../components/interview-queue.tsx";
import { LineList } from "../components/line-list.tsx";

/** Trace: who waits for an interview, and everybody on record. */
export function Component() {
  const { actingRole } = useSession();
  const { id } = useInvestigation();
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
