import { useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { receipt } from "../../../../shared/contracts/common.ts";
import type { memberInput } from "../../../../shared/contracts/investigations.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

export type MemberInput = z.output<typeof memberInput>;

/** Gives an account a role. */
export function useAddMember(investigationId: string, idempotencyKey: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: MemberInput) =>
      api.post(inInvestigation(investigationId, "members"), {
        body,
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess: () =>
      queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "members") }),
  });
}

/** Ends a membership; it counts at that account's next request, also when it is the reader's own. */
export function useEndMember(investigationId: string, own: boolean) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (memberId: string) =>
      api.delete(inInvestigation(investigationId, `members/${memberId}`)),
    onSuccess: () =>
      queryClient.invalidateQueries({
        queryKey: own ? ["session"] : investigationKey(investigationId, "members"),
      }),
  });
}
