import { useMutation, useQueryClient } from "@tanstack/react-query";
import { receipt } from "../../../../shared/contracts/common.ts";
import type { ExportInput } from "../../../../shared/contracts/exports.ts";
import { confirmAnswer } from "../../../../shared/contracts/session.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Asks for a file; it is made in the server. */
export function useRequestExport(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ body, idempotencyKey }: { body: ExportInput; idempotencyKey: string }) =>
      api.post(inInvestigation(investigationId, "exports"), {
        body,
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess: () =>
      queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "exports") }),
  });
}

/** Gives the password once more; the server then takes the request for some minutes. */
export function useConfirmPassword() {
  return useMutation({
    mutationFn: (password: string) =>
      api.post("/api/session/confirm", { body: { password }, schema: confirmAnswer }),
  });
}
