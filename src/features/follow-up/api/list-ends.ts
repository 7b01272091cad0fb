import { queryOptions } from "@tanstack/react-query";
import { followEndList } from "../../../../shared/contracts/follow-up.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Recorded ends of a contact's follow-up, also those taken back. */
export function endsQuery(investigationId: string, personId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "follow-up", "ends", personId),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, `follow-up/${personId}/ends`), {
        query: { pageSize: 200 },
        schema: followEndList,
        signal,
      }),
  });
}
