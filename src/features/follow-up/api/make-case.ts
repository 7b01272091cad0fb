import { useMutation, useQueryClient } from "@tanstack/react-query";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Makes a contact a case; 409 `stale_version` when somebody else changed the record first. */
export function useMakeCase(investigationId: string, personId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: { version: number; classification: string }) =>
      api.patch(inInvestigation(investigationId, `people/${personId}`), { body }),
    onSettled() {
      for (const word of ["follow-up", "people"] as const) {
        void queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, word) });
      }
    },
  });
}
