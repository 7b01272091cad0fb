import { useMutation, useQueryClient } from "@tanstack/react-query";
import { receipt } from "../../../../shared/contracts/common.ts";
import type { TestInput } from "../../../../shared/contracts/tests.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Records a test; a positive one can open the infectious window, so the person is read again. */
export function useRecordTest(investigationId: string, personId: string, idempotencyKey: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: TestInput) =>
      api.post(inInvestigation(investigationId, `people/${personId}/tests`), {
        body,
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess() {
      for (const word of ["tests", "people"] as const) {
        void queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, word) });
      }
    },
  });
}
