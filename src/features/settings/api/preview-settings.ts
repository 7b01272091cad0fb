import { useMutation } from "@tanstack/react-query";
import { type SettingsPatch, settingsPreview } from "../../../../shared/contracts/settings.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";

/** Asks what a change would move. Nothing is stored by asking. */
export function usePreviewSettings(investigationId: string) {
  return useMutation({
    mutationFn: (body: SettingsPatch) =>
      api.post(inInvestigation(investigationId, "settings/preview"), {
        body,
        schema: settingsPreview,
      }),
  });
}
