import { queryOptions } from "@tanstack/react-query";
import { investigationAnswer } from "../../../../shared/contracts/investigations.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** The acting investigation, its settings and its today. */
export function investigationQuery(investigationId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "investigation"),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId), { schema: investigationAnswer, signal }),
    // `today` changes at midnight of the investigation's zone.
    refetchInterval: 10 * 60_000,
  });
}
