import { useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import type { passwordChange } from "../../../../shared/contracts/accounts.ts";
import { sessionAnswer } from "../../../../shared/contracts/session.ts";
import { api } from "../../../lib/api-client.ts";
import { tellOtherTabs } from "../session-channel.ts";
import { sessionQuery } from "./get-session.ts";

/** Changes the password; the answer is the session, which goes on under a new id. */
export function useChangePassword() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: z.output<typeof passwordChange>) =>
      api.post("/api/session/password", { body, schema: sessionAnswer }),
    onSuccess(session) {
      queryClient.setQueryData(sessionQuery().queryKey, session);
      tellOtherTabs();
    },
  });
}
