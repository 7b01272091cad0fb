import { useMutation, useQueryClient } from "@tanstack/react-query";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Stops a comparison that is being worked out, or deletes one that has ended. */
export function useEndCompareRun(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ runId, act }: { runId: string; act: "cancel" | "delete" }) => {
      const path = inInvestigation(investigationId, `compare/runs/${runId}`);
      return act === "cancel" ? api.post(`${path}/cancel`) : api.delete(path);
    },
    // A deleted run must not be asked for again; only the lists are.
    onSettled: (_answer, _error, { runId, act }) =>
      queryClient.invalidateQueries({
        queryKey: investigationKey(
          investigationId,
          "compare",
          ...(act === "delete" ? ["list"] : []),
        ),
        predicate: ({ queryKey }) => act === "cancel" || !queryKey.includes(runId),
      }),
  });
}
