import { useMutation } from "@tanstack/react-query";
import type { z } from "zod";
import {
  type resetRequest,
  resetRequested,
  type resetUse,
  resetUsed,
} from "../../../../shared/contracts/accounts.ts";
import { api } from "../../../lib/api-client.ts";

/** Asks for a letter with a link; the answer is the same whoever has the address. */
export function useAskReset() {
  return useMutation({
    mutationFn: (body: z.output<typeof resetRequest>) =>
      api.post("/api/password-resets", { body, schema: resetRequested }),
  });
}

/** Chooses a new password with the letter's token. */
export function useReset() {
  return useMutation({
    mutationFn: (body: z.output<typeof resetUse>) =>
      api.post("/api/password-resets/use", { body, schema: resetUsed }),
  });
}
