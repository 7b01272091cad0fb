import { useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { receipt } from "../../../../shared/contracts/common.ts";
import type { memberInput, memberPatch } from "../../../../shared/contracts/investigations.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

export type MemberInput = z.output<typeof memberInput>;
export type MemberPatch = z.output<typeof memberPatch>;

/** What a change of members, their teams included, makes stale. */
function useMembersStale(investigationId: string) {
  const queryClient = useQueryClient();
  return () =>
    Promise.all(
      (["members", "teams"] as const).map((word) =>
        queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, word) }),
      ),
    );
}

/** Gives an account a role. */
export function useAddMember(investigationId: string, idempotencyKey: string) {
  const stale = useMembersStale(investigationId);
  return useMutation({
    mutationFn: (body: MemberInput) =>
      api.post(inInvestigation(investigationId, "members"), {
        body,
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess: stale,
  });
}

/** Changes team or last day of a membership. */
export function useChangeMember(investigationId: string) {
  const stale = useMembersStale(investigationId);
  return useMutation({
    mutationFn: ({ id, ...body }: MemberPatch & { id: string }) =>
      api.patch(inInvestigation(investigationId, `members/${id}`), { body, schema: receipt }),
    // Also when it failed: most likely somebody changed it meanwhile.
    onSettled: stale,
  });
}

/** Ends a membership; it counts at that account's next request, also when it is the reader's own. */
export function useEndMember(investigationId: string, own: boolean) {
  const queryClient = useQueryClient();
  const stale = useMembersStale(investigationId);
  return useMutation({
    mutationFn: (memberId: string) =>
      api.delete(inInvestigation(investigationId, `members/${memberId}`)),
    onSuccess: () => (own ? queryClient.invalidateQueries({ queryKey: ["session"] }) : stale()),
  });
}
