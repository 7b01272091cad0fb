import { useQuery, useQueryClient } from "@tanstack/react-query";
import { Suspense, useCallback, useEffect, useRef, useState } from "react";
import { Navigate, Outlet, useLocation } from "react-router-dom";
import type { Session } from "../../../shared/contracts/session.ts";
import { ErrorState } from "../../components/ui/error-state.tsx";
import { LoadingState } from "../../components/ui/loading-state.tsx";
import { readSession, sessionQuery } from "../../features/session/api/get-session.ts";
import { readWelcome, welcomeQuery } from "../../features/session/api/get-welcome.ts";
import { switchActing } from "../../features/session/api/switch-acting.ts";
import { IdleWatch } from "../../features/session/components/idle-watch.tsx";
import {
  ActsElsewhere,
  fetchSessionDialogs,
  LockPage,
} from "../../features/session/components/session-dialogs.ts";
import { onOtherTab } from "../../features/session/session-channel.ts";
import { setOnUnauthorized } from "../../lib/api-client.ts";
import { errorKind } from "../../lib/api-error.ts";
import { SessionContext } from "../../lib/session-context.ts";
import { fetchAhead } from "../pages.ts";

/** Every page after sign-in: the session, its lock, and its watch over idle time. */
export function Component() {
  const location = useLocation();
  const welcome = useQuery(welcomeQuery());
  const signedIn = welcome.data?.signedIn === true;
  const session = useQuery({ ...sessionQuery(), enabled: signedIn });

  if (welcome.data && !signedIn) {
    return <Navigate to="/sign-in" replace state={{ from: location.pathname }} />;
  }
  const failed = welcome.error ?? session.error;
  if (failed && !session.data) {
    return (
      <main className="mx-auto max-w-2xl px-5 pt-[9vh]">
        <ErrorState
          kind={errorKind(failed)}
          onRetry={() => {
            void welcome.refetch();
            if (signedIn) void session.refetch();
          }}
        />
      </main>
    );
  }
  if (!session.data) {
    return (
      <main className="mx-auto max-w-2xl px-5 pt-[9vh]">
        <LoadingState label="Opening Strandline" />
      </main>
    );
  }
  return <Guarded session={session.data} />;
}

function acts(session: Session): string {
  return `${session.accountId} ${session.actingRole} ${session.investigationId}`;
}

function Guarded({ session }: { session: Session }) {
  const queryClient = useQueryClient();
  const [locked, setLocked] = useState(false);
  const [changedElsewhere, setChangedElsewhere] = useState(false);
  const known = useRef(session);
  known.current = session;
  const lock = useCallback(() => setLocked(true), []);

  useEffect(fetchSessionDialogs, []);
  useEffect(() => fetchAhead(session.rooms), [session.rooms]);

  useEffect(() => {
    setOnUnauthorized(lock);
    return () => setOnUnauthorized(() => {});
  }, [lock]);

  useEffect(() => {
    async function compare() {
      try {
        if (!(await readWelcome()).signedIn) {
          lock();
          return;
        }
        setChangedElsewhere(acts(await readSession()) !== acts(known.current));
      } catch {
        // Without an answer nothing is known to have changed.
      }
    }
    return onOtherTab(() => void compare());
  }, [lock]);

  async function unlock(next: Session) {
    const before = known.current;
    if (next.accountId !== before.accountId) {
      // Somebody else's work lies underneath: it goes, and the page starts anew.
      window.location.assign("/");
      return;
    }
    const { actingRole, investigationId } = before;
    if (actingRole && investigationId && acts(next) !== acts(before)) {
      try {
        const back = await switchActing({ actingRole, investigationId });
        queryClient.setQueryData(sessionQuery().queryKey, back);
      } catch {
        window.location.assign("/");
        return;
      }
    }
    setLocked(false);
    void queryClient.invalidateQueries({ queryKey: ["i"] });
  }

  return (
    <SessionContext value={session}>
      <div data-print={locked ? "hide" : undefined}>
        <Outlet />
      </div>
      {locked ? null : <IdleWatch session={session} onEnded={lock} />}
      {locked ? (
        <Suspense fallback={<div className="fixed inset-0 z-70 bg-paper" />}>
          <LockPage session={session} onSignedIn={(next) => void unlock(next)} />
        </Suspense>
      ) : null}
      {changedElsewhere && !locked ? (
        <Suspense fallback={null}>
          <ActsElsewhere onLater={() => setChangedElsewhere(false)} />
        </Suspense>
      ) : null}
    </SessionContext>
  );
}
