import { queryOptions } from "@tanstack/react-query";
import { followCheckList } from "../../../../shared/contracts/follow-up.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Checks of a contact with their notes; each reading is recorded. */
export function checksQuery(investigationId: string, personId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "follow-up", "checks", personId),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, `follow-up/${personId}/checks`), {
        query: { pageSize: 200 },
        schema: followCheckList,
        signal,
      }),
    refetchOnWindowFocus: false,
  });
}
