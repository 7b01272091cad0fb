import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { accessEventList } from "../../../../shared/contracts/safeguard.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** What the access record is asked for; `studyNumber` may be blank, the rest are codes and ids. */
export type EventsAsk = {
  page: number;
  pageSize: number;
  studyNumber: string;
  action: string;
  accountId: string;
};

/** A page of the access record, newest first. */
export function accessEventsQuery(investigationId: string, ask: EventsAsk) {
  const { studyNumber, ...query } = ask;
  return queryOptions({
    queryKey: investigationKey(investigationId, "access-events", ask),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "access-events"), {
        query: { ...query, q: studyNumber.trim() },
        schema: accessEventList,
        signal,
      }),
    placeholderData: keepPreviousData,
    // Reading the record writes into it; a page stays as read until asked for again.
    staleTime: 60_000,
    refetchOnWindowFocus: false,
  });
}
