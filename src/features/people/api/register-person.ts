import { useMutation, useQueryClient } from "@tanstack/react-query";
import { z } from "zod";
import type { PersonInput } from "../../../../shared/contracts/people.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

const receipt = z.object({ id: z.string(), studyNumber: z.string(), version: z.int() });

/** Registers a person; the same key never makes a second one. */
export function useRegisterPerson(investigationId: string, idempotencyKey: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: PersonInput) =>
      api.post(inInvestigation(investigationId, "people"), {
        body,
        idempotencyKey,
        schema: receipt,
      }),
    onSuccess: () =>
      queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "people") }),
  });
}
