import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { exportList } from "../../../../shared/contracts/exports.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

const pollMs = 1_000;

/** Files taken out so far, newest first; asked again every second while one is being made. */
export function exportsQuery(investigationId: string, page: number, pageSize: number) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "exports", "list", { page, pageSize }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "exports"), {
        query: { page, pageSize },
        schema: exportList,
        signal,
      }),
    placeholderData: keepPreviousData,
    refetchInterval: (query) =>
      query.state.data?.items.some((one) => one.state === "building") ? pollMs : false,
  });
}
