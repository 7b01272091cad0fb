import { useMutation, useQueryClient } from "@tanstack/react-query";
import { receipt } from "../../../../shared/contracts/common.ts";
import type { CompareRunInput } from "../../../../shared/contracts/compare.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

function useRefresh(investigationId: string) {
  const queryClient = useQueryClient();
  return () =>
    queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "compare") });
}

/** Asks for a comparison; it is worked out in the server. */
export function useAskCompareRun(investigationId: string) {
  const refresh = useRefresh(investigationId);
  return useMutation({
    mutationFn: ({ body, idempotencyKey }: { body: CompareRunInput; idempotencyKey: string }) =>
      api.post(inInvestigation(investigationId, "compare/runs"), {
        body,
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess: refresh,
  });
}

/** Works a comparison out once more: same record, same seed, same figures. */
export function useRunAgain(investigationId: string) {
  const refresh = useRefresh(investigationId);
  return useMutation({
    mutationFn: ({ runId, idempotencyKey }: { runId: string; idempotencyKey: string }) =>
      api.post(inInvestigation(investigationId, `compare/runs/${runId}/again`), {
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess: refresh,
  });
}
