import { useQuery } from "@tanstack/react-query";
import { useEffect, useState } from "react";
import { ROLE_NAMES } from "../../../../shared/roles.ts";
import { AuthLayout } from "../../../components/layouts/auth-layout.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { Tag } from "../../../components/ui/tag.tsx";
import { ApiError, errorKind } from "../../../lib/api-error.ts";
import { formatDay } from "../../../lib/formatters.ts";
import { invitationQuery } from "../api/invitation.ts";
import { AcceptForm } from "../components/accept-form.tsx";
import { GeneralCaution } from "../components/general-caution.tsx";
import { takeToken } from "../take-token.ts";

// Once per page load: a second look would find the address already cleaned.
const tokenOfAddress = takeToken();

/** Takes up an invitation: with a new account, or with the one that has the address already. */
export function Component() {
  const [token] = useState(tokenOfAddress);
  const [joined, setJoined] = useState(false);
  const invitation = useQuery(invitationQuery(token));
  useEffect(() => {
    document.title = "Invitation · Strandline";
  }, []);
  const { data, error } = invitation;
  const gone = token === "" || (error instanceof ApiError && [404, 422].includes(error.status));

  if (joined) {
    return (
      <AuthLayout title="You have joined" footer={<GeneralCaution />}>
        <p className="mb-4">The link is used up. Sign in with your e-mail and password.</p>
        <LinkButton to="/sign-in" variant="primary" reloadDocument>
          Sign in
        </LinkButton>
      </AuthLayout>
    );
  }
  return (
    <AuthLayout title="Invitation" footer={<GeneralCaution />}>
      {gone ? (
        <Notice tone="error" title="This link opens nothing.">
          It was used, is older than 72 hours, or is not complete. Ask who invited you for another.
        </Notice>
      ) : null}
      {!gone && invitation.isPending ? <LoadingState label="Looking at the invitation" /> : null}
      {!gone && error ? (
        <ErrorState kind={errorKind(error)} onRetry={() => void invitation.refetch()} />
      ) : null}
      {data ? (
        <>
          <p className="mb-4">
            You are invited to work on <strong>{data.investigationName}</strong>{" "}
            {data.invented ? <Tag tone="ochre">invented</Tag> : null} as{" "}
            {ROLE_NAMES[data.role].toLowerCase()}
            {data.endsOn ? `, up to and with ${formatDay(data.endsOn)}` : null}.
          </p>
          <AcceptForm token={token} invitation={data} onJoined={() => setJoined(true)} />
        </>
      ) : null}
    </AuthLayout>
  );
}
