import { useQuery } from "@tanstack/react-query";
import { useMemo } from "react";
import { hasDuty } from "../../../../shared/roles.ts";
import { paths } from "../../../app/paths.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useSession } from "../../../lib/session-context.ts";
import { assignableQuery } from "../api/list-assignable.ts";
import { InterviewQueue } from "../components/interview-queue.tsx";
import { LineList } from "../components/line-list.tsx";

/** Trace: who waits for an interview, and everybody on record. */
export function Component() {
  const { actingRole } = useSession();
  const { id } = useInvestigation();
  const assigns = hasDuty(actingRole, "assign");
  const members = useQuery({ ...assignableQuery(id), enabled: assigns });
  const memberNames = useMemo(
    () => members.data && new Map(members.data.map((one) => [one.accountId, one.displayName])),
    [members.data],
  );
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
        <LineList memberNames={memberNames} />
      </Section>
    </RoomPage>
  );
}
