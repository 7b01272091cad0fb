import { isRouteErrorResponse, useRouteError } from "react-router-dom";
import { Button } from "../../components/ui/button.tsx";
import { ErrorState } from "../../components/ui/error-state.tsx";
import { LinkButton } from "../../components/ui/link-button.tsx";

/** A page that broke, or an address that leads nowhere; the frame around it stays. */
export function PageError() {
  const error = useRouteError();
  if (isRouteErrorResponse(error) && error.status === 404) {
    return (
      <div className="mx-auto max-w-3xl px-4 pt-8">
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
  return (
    <div className="mx-auto max-w-3xl px-4 pt-8">
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
    </div>
  );
}
