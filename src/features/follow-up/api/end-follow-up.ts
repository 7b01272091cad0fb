import { useMutation, useQueryClient } from "@tanstack/react-query";
import { useRef } from "react";
import { receipt } from "../../../../shared/contracts/common.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

function useRefresh(investigationId: string) {
  const queryClient = useQueryClient();
  return () => {
    for (const word of ["follow-up", "people"] as const) {
      void queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, word) });
    }
  };
}

/** Ends a follow-up; sent again after the signal was gone, it is the same record. */
export function useEndFollowUp(investigationId: string, personId: string) {
  const refresh = useRefresh(investigationId);
  const unsent = useRef<{ text: string; key: string } | null>(null);
  return useMutation({
    mutationFn: (body: { reason: string; day?: string }) => {
      const text = JSON.stringify(body);
      if (unsent.current?.text !== text) unsent.current = { text, key: crypto.randomUUID() };
      return api.post(inInvestigation(investigationId, `follow-up/${personId}/end`), {
        body,
        idempotencyKey: unsent.current.key,
        schema: receipt,
      });
    },
    onSuccess() {
      unsent.current = null;
      refresh();
    },
  });
}

/** Takes the end of a follow-up back. */
export function useReopenFollowUp(investigationId: string, personId: string) {
  const refresh = useRefresh(investigationId);
  return useMutation({
    mutationFn: (endId: string) =>
      api.delete(inInvestigation(investigationId, `follow-up/${personId}/end/${endId}`)),
    onSettled: refresh,
  });
}
