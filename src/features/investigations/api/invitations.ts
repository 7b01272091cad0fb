import { queryOptions, useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { type invitationInput, invitationList } from "../../../../shared/contracts/accounts.ts";
import { receipt } from "../../../../shared/contracts/common.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Invitations that nobody took up yet, the newest first. */
export function invitationsQuery(investigationId: string, page: number, pageSize: number) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "invitations", { page, pageSize }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "invitations"), {
        query: { page, pageSize },
        schema: invitationList,
        signal,
      }),
  });
}

/** Takes back an invitation that nobody took up; its link opens nothing any more. */
export function useWithdrawInvitation(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => api.delete(inInvestigation(investigationId, `invitations/${id}`)),
    // Also when it failed: most likely somebody took it up meanwhile.
    onSettled: () =>
      Promise.all([
        queryClient.invalidateQueries({
          queryKey: investigationKey(investigationId, "invitations"),
        }),
        queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "members") }),
      ]),
  });
}

/** Sends an invitation by e-mail. */
export function useInvite(investigationId: string, idempotencyKey: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: z.output<typeof invitationInput>) =>
      api.post(inInvestigation(investigationId, "invitations"), {
        body,
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess: () =>
      queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "invitations") }),
  });
}
