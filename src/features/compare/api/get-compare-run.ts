import { queryOptions } from "@tanstack/react-query";
import { compareRunAnswer } from "../../../../shared/contracts/compare.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";
import { runPollMs } from "./list-compare-runs.ts";

/** One comparison with its figures, once they are there. */
export function compareRunQuery(investigationId: string, runId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "compare", "one", runId),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, `compare/runs/${runId}`), {
        schema: compareRunAnswer,
        signal,
      }),
    refetchInterval: (query) => (query.state.data?.state === "running" ? runPollMs : false),
  });
}
