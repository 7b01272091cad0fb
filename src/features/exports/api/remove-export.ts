import { useMutation, useQueryClient } from "@tanstack/react-query";
import { exportAnswer } from "../../../../shared/contracts/exports.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Cancels a file being made, or deletes one that is ready. */
export function useRemoveExport(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (exportId: string) =>
      api.delete(inInvestigation(investigationId, `exports/${exportId}`), {
        schema: exportAnswer,
      }),
    onSettled: () =>
      queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "exports") }),
  });
}
