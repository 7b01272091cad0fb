import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { compareRunList } from "../../../../shared/contracts/compare.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Under the live stream: asked again in between while something is being worked out. */
export const runPollMs = 1_500;

/** Comparisons asked for so far, newest first. */
export function compareRunsQuery(investigationId: string, page: number, pageSize: number) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "compare", "list", { page, pageSize }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "compare/runs"), {
        query: { page, pageSize },
        schema: compareRunList,
        signal,
      }),
    placeholderData: keepPreviousData,
    refetchInterval: (query) =>
      query.state.data?.items.some((one) => one.state === "running") ? runPollMs : false,
  });
}
