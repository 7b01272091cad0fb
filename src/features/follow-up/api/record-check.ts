import { useMutation, useQueryClient } from "@tanstack/react-query";
import { useRef } from "react";
import { receipt } from "../../../../shared/contracts/common.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** What a check sends; keys left out are "not asked". */
export type CheckBody = {
  outcome: string;
  day?: string;
  symptoms?: string;
  symptomCodes?: string[];
  respondent?: string;
  note?: string;
};

/** Records a check. The same press tried again, after the signal was gone, makes one record. */
export function useRecordCheck(investigationId: string, personId: string) {
  const queryClient = useQueryClient();
  const unsent = useRef<{ text: string; key: string } | null>(null);
  return useMutation({
    mutationFn: (body: CheckBody) => {
      const text = JSON.stringify(body);
      if (unsent.current?.text !== text) unsent.current = { text, key: crypto.randomUUID() };
      return api.post(inInvestigation(investigationId, `follow-up/${personId}/checks`), {
        body,
        idempotencyKey: unsent.current.key,
        schema: receipt,
      });
    },
    onSuccess() {
      unsent.current = null;
      for (const word of ["follow-up", "people"] as const) {
        void queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, word) });
      }
    },
  });
}
