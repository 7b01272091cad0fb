import { useMutation, useQueryClient } from "@tanstack/react-query";
import { api, inInvestigation } from "../../../lib/api-client.ts";

/** Empties a practice investigation and fills it anew. Supervisors only. */
export function useResetPractice(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => api.post(inInvestigation(investigationId, "settings/practice-reset")),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ["i", investigationId] }),
  });
}
