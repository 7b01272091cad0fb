import { queryOptions } from "@tanstack/react-query";
import { fieldPolicyAnswer } from "../../../../shared/contracts/safeguard.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Registry and catalogue side by side, read from the database anew each time it is opened. */
export function fieldPolicyQuery(investigationId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "field-policy"),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "field-policy"), {
        schema: fieldPolicyAnswer,
        signal,
      }),
    staleTime: 0,
    // Each reading goes on record; coming back to the window is not one.
    refetchOnWindowFocus: false,
  });
}
