import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type SettingsPatch, settingsAnswer } from "../../../../shared/contracts/settings.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";

/** Saves a change of settings; 409 `stale_version` when somebody else saved first. */
export function usePatchSettings(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: SettingsPatch) =>
      api.patch(inInvestigation(investigationId, "settings"), { body, schema: settingsAnswer }),
    onSuccess() {
      // Windows, due days, clusters, grades: nearly every list stands on them.
      void queryClient.invalidateQueries({ queryKey: ["i", investigationId] });
      void queryClient.invalidateQueries({ queryKey: ["investigations"] });
      void queryClient.invalidateQueries({ queryKey: ["session"] });
    },
  });
}
