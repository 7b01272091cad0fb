import { useQuery } from "@tanstack/react-query";
import { useParams } from "react-router-dom";
import { paths } from "../../../app/paths.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { PersonMark } from "../../../components/person-mark/person-mark.tsx";
import { Answer } from "../../../components/ui/answer.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { investigationKey } from "../../../lib/query-keys.ts";
import { getDraft, getPerson } from "../api/interview-api.ts";
import { EarlierAttempts } from "../components/earlier-attempts.tsx";
import { InterviewForm } from "../components/interview-form.tsx";
import { usePlaceBook } from "../components/use-places.ts";

/** Interview of one person: `/i/:investigationId/trace/people/:personId/interview`. */
export function Component() {
  const { personId = "" } = useParams();
  const { id: investigationId } = useInvestigation();
  const places = usePlaceBook(investigationId);
  const person = useQuery({
    queryKey: investigationKey(investigationId, "people", "for-interview", personId),
    queryFn: () => getPerson(investigationId, personId),
  });
  const draft = useQuery({
    queryKey: ["interview-draft", investigationId, personId],
    queryFn: () => getDraft(investigationId, personId),
    // A draft is read when the page opens; from then on the page itself is the newer one.
    staleTime: Number.POSITIVE_INFINITY,
    gcTime: 0,
    enabled: person.data?.can.interview === true,
  });

  const back = (
    <LinkButton to={paths.person(investigationId, personId)}>Back to the person</LinkButton>
  );
  const failed = person.error ?? draft.error;
  if (failed && !(person.data && draft.data)) {
    return (
      <RoomPage title="Interview">
        <ErrorState
          kind={errorKind(failed)}
          onRetry={() => {
            void (person.error ? person : draft).refetch();
          }}
        />
      </RoomPage>
    );
  }
  if (!person.data) {
    return (
      <RoomPage title="Interview">
        <LoadingState label="Opening the interview" rows={8} />
      </RoomPage>
    );
  }
  const one = person.data;
  const title = `Interview of ${one.studyNumber}`;
  // An open form stays: a case handed on meanwhile must not take with it what was typed.
  if (!one.can.interview && !draft.data) {
    return (
      <RoomPage title={title} actions={back}>
        <ErrorState kind="no-permission" title="This interview is not yours to hold">
          It belongs to whoever the person is assigned to, or to a role that interviews.
        </ErrorState>
      </RoomPage>
    );
  }
  return (
    <RoomPage
      title={title}
      subLine={
        <>
          {one.classification ? (
            <PersonMark classification={one.classification} wasContact={one.becameCase} />
          ) : null}{" "}
          {one.name ? <strong className="text-ink">{one.name}</strong> : null}
          {one.name ? " · " : null}
          {one.ageBand ? `aged ${one.ageBand}` : "age not known"} · <Answer value={one.area} />
        </>
      }
      actions={back}
    >
      <EarlierAttempts person={one} />
      {draft.data ? (
        <InterviewForm key={one.id} person={one} draft={draft.data} places={places} />
      ) : (
        <LoadingState label="Opening the draft" rows={8} />
      )}
    </RoomPage>
  );
}
