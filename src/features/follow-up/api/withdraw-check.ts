import { useMutation, useQueryClient } from "@tanstack/react-query";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Takes back a check that was pressed by mistake. */
export function useWithdrawCheck(investigationId: string, personId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (checkId: string) =>
      api.delete(inInvestigation(investigationId, `follow-up/${personId}/checks/${checkId}`)),
    onSettled() {
      for (const word of ["follow-up", "people"] as const) {
        void queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, word) });
      }
    },
  });
}
