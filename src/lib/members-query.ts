import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { memberList } from "../../shared/contracts/investigations.ts";
import { api, inInvestigation } from "./api-client.ts";
import { investigationKey } from "./query-keys.ts";

/** Who works here, by name; or who did, the latest first. */
export function membersQuery(
  investigationId: string,
  page: number,
  pageSize: number,
  show: "current" | "past" = "current",
) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "members", { page, pageSize, show }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "members"), {
        query: show === "current" ? { page, pageSize } : { page, pageSize, show },
        schema: memberList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
