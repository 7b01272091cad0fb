import { useQuery } from "@tanstack/react-query";
import { Outlet, useLocation, useParams } from "react-router-dom";
import { Button } from "../../components/ui/button.tsx";
import { EmptyState } from "../../components/ui/empty-state.tsx";
import { ErrorState } from "../../components/ui/error-state.tsx";
import { LinkButton } from "../../components/ui/link-button.tsx";
import { LoadingState } from "../../components/ui/loading-state.tsx";
import { investigationQuery } from "../../features/investigations/api/get-investigation.ts";
import { useSwitchActing } from "../../features/session/components/acting-switch.tsx";
import { errorKind } from "../../lib/api-error.ts";
import { InvestigationContext } from "../../lib/investigation-context.ts";
import { useSession } from "../../lib/session-context.ts";
import { Frame } from "../frame.tsx";
import { useLive } from "../live.ts";
import { homePath, mayOpen } from "../rooms.ts";

/** Every page inside an investigation: its settings, its live stream, the frame. */
export function Component() {
  const { investigationId = "" } = useParams();
  const session = useSession();
  if (session.investigationId !== investigationId) {
    return (
      <Frame>
        <Elsewhere investigationId={investigationId} />
      </Frame>
    );
  }
  return <Inside investigationId={investigationId} />;
}

function Inside({ investigationId }: { investigationId: string }) {
  useLive(investigationId);
  const session = useSession();
  const { pathname } = useLocation();
  const investigation = useQuery(investigationQuery(investigationId));
  const { data } = investigation;
  // One frame for all states, so that what is open in the header survives the arrival of the page.
  return (
    <InvestigationContext value={data ?? null}>
      <Frame
        investigation={data}
        readAt={data && new Date(investigation.dataUpdatedAt).toISOString()}
      >
        {data && mayOpen(session, pathname) ? <Outlet /> : null}
        {data && !mayOpen(session, pathname) ? (
          // Said here, so that no page is opened only to be refused by the server.
          <div className="pt-6">
            <ErrorState
              kind="no-permission"
              actions={<LinkButton to={homePath(session)}>Back to your room</LinkButton>}
            />
          </div>
        ) : null}
        {investigation.isPending ? (
          <LoadingState label="Opening the investigation" rows={6} />
        ) : null}
        {!data && investigation.isError ? (
          <div className="pt-6">
            <ErrorState
              kind={errorKind(investigation.error)}
              onRetry={() => void investigation.refetch()}
            />
          </div>
        ) : null}
      </Frame>
    </InvestigationContext>
  );
}

/** A link into an investigation other than the one acted in. */
function Elsewhere({ investigationId }: { investigationId: string }) {
  const session = useSession();
  const switchTo = useSwitchActing();
  const there = session.memberships.filter((one) => one.investigationId === investigationId);
  const role = there.find((one) => one.role === session.actingRole) ?? there[0];
  if (!role) {
    return (
      <div className="pt-6">
        <ErrorState kind="not-found" />
      </div>
    );
  }
  return (
    <div className="pt-6">
      <EmptyState
        title={`This page belongs to ${role.investigationName}`}
        action={
          <Button variant="primary" onClick={() => switchTo(role.role, investigationId)}>
            Act in {role.investigationName}
          </Button>
        }
      >
        You act in one investigation at a time, and now in another one.
      </EmptyState>
    </div>
  );
}
