import { queryOptions } from "@tanstack/react-query";
import { memberList } from "../../../../shared/contracts/investigations.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Members to whom people can be assigned: who traces here. */
export function assignableQuery(investigationId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "members", "assignable"),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "members"), {
        query: { pageSize: 200 },
        schema: memberList,
        signal,
      }),
    select: (list) => list.items.filter((member) => member.role === "tracer"),
    staleTime: 5 * 60_000,
  });
}
