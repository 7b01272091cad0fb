import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { clusterList } from "../../../../shared/contracts/clusters.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

export type ClustersAsk = { page: number; pageSize: number; sort?: string };

/** Proposed clusters of the record as it stands now, a page of them. */
export function clustersQuery(investigationId: string, { page, pageSize, sort }: ClustersAsk) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "clusters", { page, pageSize, sort }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "clusters"), {
        query: { page, pageSize, sort },
        schema: clusterList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
