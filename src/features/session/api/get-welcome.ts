import { queryOptions } from "@tanstack/react-query";
import { welcomeAnswer } from "../../../../shared/contracts/session.ts";
import { api } from "../../../lib/api-client.ts";

/** Whether anybody is signed in now, without a word to the cache: the page must stay as it is. */
export function readWelcome() {
  return api.get("/api/welcome", { schema: welcomeAnswer, background: true });
}

/** What a visitor may know; asked first, so that nobody signed out ever causes a refused request. */
export function welcomeQuery() {
  return queryOptions({
    queryKey: ["welcome"],
    queryFn: ({ signal }) =>
      api.get("/api/welcome", { schema: welcomeAnswer, background: true, signal }),
    staleTime: Number.POSITIVE_INFINITY,
  });
}
