import { useMutation, useQueryClient } from "@tanstack/react-query";
import { importAnswer } from "../../../../shared/contracts/imports.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { importKey } from "./get-import.ts";

/** Has the good rows put on record; the work goes on in the server. */
export function useCommitImport(investigationId: string, importId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (createMissing: boolean) =>
      api.post(inInvestigation(investigationId, `imports/${importId}/commit`), {
        body: { createMissing },
        schema: importAnswer,
      }),
    onSettled: () =>
      queryClient.invalidateQueries({ queryKey: importKey(investigationId, importId) }),
  });
}
