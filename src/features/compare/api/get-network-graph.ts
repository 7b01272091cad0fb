import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { graphAnswer } from "../../../../shared/contracts/network.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { type NetworkQuestion, questionParameters } from "../../../lib/network-summary-query.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** The picture of the network: people, or groups where people are too many, with positions. */
export function networkGraphQuery(
  investigationId: string,
  question: NetworkQuestion,
  group: string | undefined,
) {
  const query = { ...questionParameters(question), group };
  return queryOptions({
    queryKey: investigationKey(investigationId, "network", "graph", query),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "network/graph"), {
        query,
        schema: graphAnswer,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
