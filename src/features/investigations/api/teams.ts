import { keepPreviousData, queryOptions, useMutation, useQueryClient } from "@tanstack/react-query";
import { receipt } from "../../../../shared/contracts/common.ts";
import { teamList } from "../../../../shared/contracts/investigations.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Teams by name, with what hangs on each. */
export function teamsQuery(investigationId: string, page = 1, pageSize = 200) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "teams", { page, pageSize }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "teams"), {
        query: { page, pageSize },
        schema: teamList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}

/** Names of teams stand in several lists. */
function useTeamsStale(investigationId: string) {
  const queryClient = useQueryClient();
  return () =>
    Promise.all(
      (["teams", "members", "invitations"] as const).map((word) =>
        queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, word) }),
      ),
    );
}

/** Makes a team. */
export function useMakeTeam(investigationId: string, idempotencyKey: string) {
  const stale = useTeamsStale(investigationId);
  return useMutation({
    mutationFn: (body: { name: string }) =>
      api.post(inInvestigation(investigationId, "teams"), {
        body,
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess: stale,
  });
}

/** Gives a team another name. */
export function useRenameTeam(investigationId: string) {
  const stale = useTeamsStale(investigationId);
  return useMutation({
    mutationFn: ({ id, ...body }: { id: string; name: string; version: number }) =>
      api.patch(inInvestigation(investigationId, `teams/${id}`), { body, schema: receipt }),
    onSettled: stale,
  });
}

/** Removes a team on which nothing hangs. */
export function useRemoveTeam(investigationId: string) {
  const stale = useTeamsStale(investigationId);
  return useMutation({
    mutationFn: (id: string) => api.delete(inInvestigation(investigationId, `teams/${id}`)),
    onSettled: stale,
  });
}
