import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { groupList } from "../../shared/contracts/network.ts";
import { api, inInvestigation } from "./api-client.ts";
import { investigationKey } from "./query-keys.ts";

export type GroupsAsk = { page: number; pageSize: number; sort?: string };

/** Connected groups of the record as it stands now, a page of them. */
export function groupsQuery(investigationId: string, { page, pageSize, sort }: GroupsAsk) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "groups", { page, pageSize, sort }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "groups"), {
        query: { page, pageSize, sort },
        schema: groupList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}

/** The largest groups, whose places by size decide colours: the same in every room. */
export function largestGroupsQuery(investigationId: string) {
  return groupsQuery(investigationId, { page: 1, pageSize: 200, sort: "-size" });
}
