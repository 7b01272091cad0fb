import { useEffect, useState } from "react";
import { isRouteErrorResponse, useRouteError } from "react-router-dom";
import { Button } from "../../components/ui/button.tsx";
import { ErrorState } from "../../components/ui/error-state.tsx";
import { LinkButton } from "../../components/ui/link-button.tsx";
import { useOnline } from "../../lib/use-online.ts";

/** A page that broke, could not be fetched, or does not exist; the frame around it stays. */
export function PageError() {
  const error = useRouteError();
  return (
    <div className="mx-auto max-w-3xl px-4 pt-8">
      {isRouteErrorResponse(error) && error.status === 404 ? (
        <NoSuchPage />
      ) : isUnfetched(error) ? (
        <Unfetched />
      ) : (
        <Broken />
      )}
    </div>
  );
}

/** Browsers name a file of the application that could not be fetched in words of their own. */
function isUnfetched(error: unknown): boolean {
  return (
    error instanceof TypeError &&
    /dynamically imported module|importing a module script failed|preload/i.test(error.message)
  );
}

/** An address that leads nowhere. */
export function NoSuchPage() {
  return (
    <div className="pt-6">
      <ErrorState
        kind="not-found"
        title="No page has this address"
        actions={<LinkButton to="/">Back to your room</LinkButton>}
      >
        It may be cut short, or from an older version.
      </ErrorState>
    </div>
  );
}

/**
 * Browsers keep the failure of a file for the life of a page, so only loading anew can mend it: by
 * itself once the signal is back, since leaving what was typed has been asked about before.
 */
function Unfetched() {
  const online = useOnline();
  const [beganOffline] = useState(!online);
  useEffect(() => {
    if (beganOffline && online) window.location.reload();
  }, [beganOffline, online]);
  if (!online) {
    return (
      <ErrorState kind="offline" title="This page is not in the browser yet">
        It has to be fetched once. It opens by itself when the signal is back; the room you were in
        is still there.
      </ErrorState>
    );
  }
  return (
    <ErrorState
      title="This page could not be fetched"
      onRetry={() => window.location.reload()}
      retryLabel="Load it anew"
    >
      A newer version may have been installed meanwhile.
    </ErrorState>
  );
}

function Broken() {
  return (
    <ErrorState
      title="This page stopped working"
      actions={
        <>
          <Button variant="primary" onClick={() => window.location.reload()}>
            Load it anew
          </Button>
          <LinkButton to="/" reloadDocument>
            Back to your room
          </LinkButton>
        </>
      }
    >
      What was saved is safe on the server. If it happens again, say which page it was.
    </ErrorState>
  );
}
