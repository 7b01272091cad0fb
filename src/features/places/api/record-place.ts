import { useMutation, useQueryClient } from "@tanstack/react-query";
import { receipt } from "../../../../shared/contracts/common.ts";
import type { PlaceInput } from "../../../../shared/contracts/places.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Records a place. */
export function useRecordPlace(investigationId: string, idempotencyKey: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: PlaceInput) =>
      api.post(inInvestigation(investigationId, "places"), {
        body,
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess: () =>
      queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "places") }),
  });
}
