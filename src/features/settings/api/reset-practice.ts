import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type PracticeReset, settingsAnswer } from "../../../../shared/contracts/settings.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";

/** Empties a practice investigation and fills it anew. Supervisors only. */
export function useResetPractice(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: PracticeReset) =>
      api.post(inInvestigation(investigationId, "settings/practice-reset"), {
        body,
        schema: settingsAnswer,
      }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ["i", investigationId] }),
  });
}
