import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { type NetworkSummary, summaryAnswer } from "../../shared/contracts/network.ts";
import { api, inInvestigation } from "./api-client.ts";
import { investigationKey } from "./query-keys.ts";

/** What a report is asked about; blank days are open. */
export type NetworkQuestion = {
  population: NetworkSummary["population"];
  window: NetworkSummary["window"];
  /** First and last exposure day; read with the window `free` only. */
  from?: string;
  to?: string;
  /** A day, to its end; the record as it stands now without one. */
  asOf?: string;
};

/** A question as the address of the report takes it. */
export function questionParameters({ population, window, from, to, asOf }: NetworkQuestion) {
  const free = window === "free" && Boolean(from || to);
  return {
    population,
    window: window === "free" ? undefined : window,
    from: free ? from : undefined,
    to: free ? to : undefined,
    asOf,
  };
}

/** The network report of an investigation; the answer before is kept while the next one comes. */
export function networkSummaryQuery(investigationId: string, question: NetworkQuestion) {
  const query = questionParameters(question);
  return queryOptions({
    queryKey: investigationKey(investigationId, "network", "summary", query),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "network/summary"), {
        query,
        schema: summaryAnswer,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
