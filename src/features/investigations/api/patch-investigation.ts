import { useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import {
  investigationAnswer,
  type investigationPatch,
} from "../../../../shared/contracts/investigations.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Changes settings that the report stands on; 409 when somebody else changed them meanwhile. */
export function usePatchInvestigation(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: z.input<typeof investigationPatch>) =>
      api.patch(inInvestigation(investigationId), { body, schema: investigationAnswer }),
    onSuccess(changed) {
      queryClient.setQueryData(investigationKey(investigationId, "investigation"), changed);
      void queryClient.invalidateQueries({ queryKey: ["investigations"] });
      void queryClient.invalidateQueries({
        queryKey: investigationKey(investigationId, "network"),
      });
    },
  });
}
