import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { memberList } from "../../shared/contracts/investigations.ts";
import { api, inInvestigation } from "./api-client.ts";
import { investigationKey } from "./query-keys.ts";

/** Who works here, by name. */
export function membersQuery(investigationId: string, page: number, pageSize: number) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "members", { page, pageSize }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "members"), {
        query: { page, pageSize },
        schema: memberList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
