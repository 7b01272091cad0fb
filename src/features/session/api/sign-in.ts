import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type SignInInput, sessionAnswer } from "../../../../shared/contracts/session.ts";
import { api } from "../../../lib/api-client.ts";
import { tellOtherTabs } from "../session-channel.ts";
import { sessionQuery } from "./get-session.ts";
import { welcomeQuery } from "./get-welcome.ts";

/** Signs in; the answer is the session. */
export function useSignIn() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: SignInInput) => api.post("/api/session", { body, schema: sessionAnswer }),
    onSuccess(session) {
      queryClient.setQueryData(sessionQuery().queryKey, session);
      queryClient.setQueryData(welcomeQuery().queryKey, (welcome) =>
        welcome ? { ...welcome, signedIn: true } : undefined,
      );
      tellOtherTabs();
    },
  });
}
