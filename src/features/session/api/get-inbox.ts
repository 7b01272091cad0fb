import { queryOptions } from "@tanstack/react-query";
import { inboxAnswer } from "../../../../shared/contracts/accounts.ts";
import { api } from "../../../lib/api-client.ts";

/** Letters of an installation that sends no mail, the newest first. */
export function inboxQuery() {
  return queryOptions({
    queryKey: ["inbox"],
    queryFn: ({ signal }) =>
      api.get("/api/inbox", { schema: inboxAnswer, background: true, signal }),
    refetchInterval: 3_000,
    staleTime: 0,
  });
}
