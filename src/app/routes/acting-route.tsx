import { useQueryClient } from "@tanstack/react-query";
import { useEffect, useRef, useState } from "react";
import { useLocation, useNavigate } from "react-router-dom";
import { switchInput } from "../../../shared/contracts/session.ts";
import { ErrorState } from "../../components/ui/error-state.tsx";
import { LinkButton } from "../../components/ui/link-button.tsx";
import { LoadingState } from "../../components/ui/loading-state.tsx";
import { sessionQuery } from "../../features/session/api/get-session.ts";
import { switchActing } from "../../features/session/api/switch-acting.ts";
import { tellOtherTabs } from "../../features/session/session-channel.ts";
import { errorKind } from "../../lib/api-error.ts";
import { homePath } from "../rooms.ts";

/**
 * Between two acting roles: no room is on screen while the session changes, and nothing that was
 * read in the role before is left in the cache. What to switch to comes with the navigation.
 */
export function Component() {
  const { state } = useLocation();
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const [failed, setFailed] = useState<unknown>(null);
  const begun = useRef(false);

  useEffect(() => {
    if (begun.current) return;
    begun.current = true;
    const wanted = switchInput.safeParse(state);
    if (!wanted.success) {
      void navigate("/", { replace: true });
      return;
    }
    switchActing(wanted.data).then((session) => {
      queryClient.removeQueries({ queryKey: ["i"] });
      queryClient.removeQueries({ queryKey: ["investigations"] });
      queryClient.setQueryData(sessionQuery().queryKey, session);
      tellOtherTabs();
      void navigate(homePath(session), { replace: true });
    }, setFailed);
  }, [state, navigate, queryClient]);

  return (
    <main className="mx-auto max-w-2xl px-5 pt-[9vh]">
      {failed ? (
        <ErrorState
          kind={errorKind(failed)}
          title="The role was not changed"
          actions={<LinkButton to="/">Back to your room</LinkButton>}
        />
      ) : (
        <LoadingState label="Changing the acting role" />
      )}
    </main>
  );
}
