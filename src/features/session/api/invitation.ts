import { queryOptions, useMutation } from "@tanstack/react-query";
import type { z } from "zod";
import {
  acceptAnswer,
  type acceptInput,
  invitationSeen,
} from "../../../../shared/contracts/accounts.ts";
import { api } from "../../../lib/api-client.ts";

/** What an invitation is for. The token travels in the body and stands in no address or log. */
export function invitationQuery(token: string) {
  return queryOptions({
    queryKey: ["invitation", token],
    queryFn: ({ signal }) =>
      api.post("/api/invitations/look", { body: { token }, schema: invitationSeen, signal }),
    enabled: token !== "",
    staleTime: Number.POSITIVE_INFINITY,
  });
}

/** Takes up an invitation. */
export function useAcceptInvitation() {
  return useMutation({
    mutationFn: (body: z.output<typeof acceptInput>) =>
      api.post("/api/invitations/accept", { body, schema: acceptAnswer }),
  });
}
