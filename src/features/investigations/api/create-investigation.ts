import { useMutation } from "@tanstack/react-query";
import { receipt } from "../../../../shared/contracts/common.ts";
import type { InvestigationInput } from "../../../../shared/contracts/investigations.ts";
import { api } from "../../../lib/api-client.ts";

/** Opens a new investigation; whoever opens it holds their acting role in it. */
export function useCreateInvestigation(idempotencyKey: string) {
  return useMutation({
    mutationFn: (body: InvestigationInput) =>
      api.post("/api/investigations", { body, idempotencyKey, schema: receipt }),
  });
}
