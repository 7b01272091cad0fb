import { useQuery } from "@tanstack/react-query";
import { useEffect } from "react";
import type { Letter } from "../../../../shared/contracts/accounts.ts";
import { AuthLayout } from "../../../components/layouts/auth-layout.tsx";
import { EmptyState } from "../../../components/ui/empty-state.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { inboxQuery } from "../api/get-inbox.ts";
import { GeneralCaution } from "../components/general-caution.tsx";

/** Mail of an installation on loopback that has no mail server: read here, sent to nobody. */
export function Component() {
  const inbox = useQuery(inboxQuery());
  useEffect(() => {
    document.title = "Inbox · Strandline";
  }, []);
  return (
    <AuthLayout title="Inbox of this installation" footer={<GeneralCaution />}>
      <p className="mb-4 text-ink-2">
        No mail server is set, so nothing leaves this machine. The last 200 letters stand here until
        the server stops; everybody on this machine can read them.
      </p>
      {inbox.isPending ? <LoadingState label="Loading letters" rows={3} /> : null}
      {inbox.isError && !inbox.data ? (
        <ErrorState kind={errorKind(inbox.error)} onRetry={() => void inbox.refetch()} />
      ) : null}
      {inbox.data?.items.length === 0 ? <EmptyState title="No letter yet" /> : null}
      <ul className="space-y-5">
        {inbox.data?.items.map((letter) => (
          <li key={letter.id} className="border-t border-rule pt-3">
            <LetterText letter={letter} />
          </li>
        ))}
      </ul>
    </AuthLayout>
  );
}

function LetterText({ letter }: { letter: Letter }) {
  return (
    <article aria-label={`${letter.subject}, to ${letter.to}`}>
      <h2 className="text-base font-bold">{letter.subject}</h2>
      <p className="mb-2 text-sm break-all text-ink-2">
        to {letter.to} · {new Date(letter.at).toLocaleString()}
      </p>
      {letter.text
        .trim()
        .split("\n")
        .map((line, at) => {
          const href = ownAddress(line);
          return (
            // biome-ignore lint/suspicious/noArrayIndexKey: a letter never changes.
            <p key={at} className="min-h-4 break-words">
              {href ? (
                <a href={href} className="break-all text-kelp underline underline-offset-4">
                  {line}
                </a>
              ) : (
                line
              )}
            </p>
          );
        })}
    </article>
  );
}

/** Address of a line that is a link, on the name this page was opened by. */
function ownAddress(line: string): string | null {
  if (!/^https?:\/\//.test(line) || !URL.canParse(line)) return null;
  const { pathname, hash } = new URL(line);
  return `${pathname}${hash}`;
}
