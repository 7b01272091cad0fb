import { queryOptions } from "@tanstack/react-query";
import { sessionAnswer } from "../../../../shared/contracts/session.ts";
import { api } from "../../../lib/api-client.ts";

/** The session; changes only by what this client does, hence never stale by itself. */
export function sessionQuery() {
  return queryOptions({
    queryKey: ["session"],
    queryFn: ({ signal }) => api.get("/api/session", { schema: sessionAnswer, signal }),
    staleTime: Number.POSITIVE_INFINITY,
    gcTime: Number.POSITIVE_INFINITY,
  });
}

/** The session as it is now, beside what this tab goes by. */
export function readSession() {
  return api.get("/api/session", { schema: sessionAnswer, background: true });
}

/** Tells the server that someone is here, which starts its idle clock anew. */
export function staySignedIn() {
  return api.get("/api/session", { schema: sessionAnswer, background: false });
}
