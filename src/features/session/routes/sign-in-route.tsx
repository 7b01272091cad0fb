import { useQuery } from "@tanstack/react-query";
import { useEffect } from "react";
import { Link, Navigate, useLocation, useNavigate } from "react-router-dom";
import { AuthLayout } from "../../../components/layouts/auth-layout.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorKind } from "../../../lib/api-error.ts";
import { welcomeQuery } from "../api/get-welcome.ts";
import { GeneralCaution } from "../components/general-caution.tsx";
import { SignInForm } from "../components/sign-in-form.tsx";

const demoAccounts = [
  ["tracer@strandline.example", "contact tracer"],
  ["supervisor@strandline.example", "supervisor"],
  ["epidemiologist@strandline.example", "epidemiologist"],
  ["officer@strandline.example", "data officer"],
] as const;

/** The sign-in page. */
export function Component() {
  const welcome = useQuery(welcomeQuery());
  const navigate = useNavigate();
  const location = useLocation();
  const from = fromState(location.state);
  useEffect(() => {
    document.title = "Sign in · Strandline";
  }, []);

  if (welcome.data?.signedIn) return <Navigate to={from} replace />;
  return (
    <AuthLayout title="Sign in" footer={<GeneralCaution />}>
      {welcome.isError ? (
        <ErrorState kind={errorKind(welcome.error)} onRetry={() => void welcome.refetch()} />
      ) : null}
      {welcome.data?.setUpNeeded ? (
        <Notice tone="info" title="No account yet." className="mb-4">
          The start of the server printed a single-use link that makes the first data officer. Open
          it in this browser.
        </Notice>
      ) : null}
      <SignInForm onSignedIn={() => void navigate(from, { replace: true })} />
      {welcome.data && welcome.data.mail !== "off" ? (
        <p className="mt-4">
          <Link to="/forgotten-password" className="text-kelp underline underline-offset-4">
            Forgotten password
          </Link>
        </p>
      ) : null}
      {welcome.data?.demo ? <DemoNote /> : null}
      {welcome.data?.mail === "inbox" ? (
        <p className="mt-3 text-sm text-ink-2">
          No mail server is set: what would be sent is kept in the{" "}
          <Link to="/inbox" className="text-kelp underline underline-offset-4">
            inbox of this installation
          </Link>
          .
        </p>
      ) : null}
    </AuthLayout>
  );
}

function DemoNote() {
  return (
    <div className="mt-8 border-t border-rule pt-3 text-sm text-ink-2">
      <p>
        A demo with invented people is loaded. Its accounts share the password that was printed when
        the server first started:
      </p>
      <ul className="mt-1.5 space-y-0.5">
        {demoAccounts.map(([email, role]) => (
          <li key={email}>
            <span className="break-all text-ink">{email}</span> · {role}
          </li>
        ))}
      </ul>
    </div>
  );
}

/** The page that asked to sign in; only one of our own paths. */
function fromState(state: unknown): string {
  const from = (state as { from?: unknown } | null)?.from;
  return typeof from === "string" && /^\/(?!\/)/.test(from) && from !== "/sign-in" ? from : "/";
}
