import { ErrorState } from "../../components/ui/error-state.tsx";
import { LinkButton } from "../../components/ui/link-button.tsx";

/** An address that leads nowhere. */
export function Component() {
  return (
    <main className="mx-auto max-w-3xl px-4 pt-[9vh]">
      <ErrorState
        kind="not-found"
        title="No page has this address"
        actions={<LinkButton to="/">Back to your room</LinkButton>}
      >
        It may be cut short, or from an older version.
      </ErrorState>
    </main>
  );
}
