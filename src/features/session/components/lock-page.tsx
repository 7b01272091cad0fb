import { Dialog as Primitive } from "radix-ui";
import type { Session } from "../../../../shared/contracts/session.ts";
import { Wordmark } from "../../../components/layouts/wordmark.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { SignInForm } from "./sign-in-form.tsx";

export type LockPageProps = {
  /** Whose work lies underneath. */
  session: Session;
  onSignedIn: (session: Session) => void;
};

/**
 * Covers the page when the session has ended, without taking it down: what was typed is still
 * there after signing in again. Nothing underneath can be read or reached meanwhile.
 */
export function LockPage({ session, onSignedIn }: LockPageProps) {
  return (
    <Primitive.Root open>
      <Primitive.Portal>
        <Primitive.Content
          data-dialog="open"
          onOpenAutoFocus={(event) => {
            // The e-mail is known: only the password is missing.
            const page = event.currentTarget;
            if (!(page instanceof HTMLElement)) return;
            event.preventDefault();
            page.querySelector<HTMLElement>("input[type='password']")?.focus();
          }}
          aria-describedby={undefined}
          onEscapeKeyDown={(event) => event.preventDefault()}
          onInteractOutside={(event) => event.preventDefault()}
          className="fixed inset-0 z-70 overflow-y-auto bg-paper text-ink"
        >
          <div className="mx-auto max-w-md px-5 pt-[9vh] pb-10">
            <Wordmark size="large" />
            <Primitive.Title className="mt-6 mb-2 text-xl">Signed out</Primitive.Title>
            <p className="mb-5 text-ink-2">
              {session.displayName}, what you typed is still in this tab. Sign in to go on where you
              were.
            </p>
            <SignInForm email={session.email} onSignedIn={onSignedIn} />
            <p className="mt-8 border-t border-rule pt-3 text-sm text-ink-2">
              Somebody else?{" "}
              <Button
                variant="plain"
                size="small"
                onClick={() => window.location.assign("/sign-in")}
              >
                Drop this page and start anew
              </Button>
            </p>
          </div>
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
