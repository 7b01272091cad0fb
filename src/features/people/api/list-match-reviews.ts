import { queryOptions } from "@tanstack/react-query";
import { matchReviewList } from "../../../../shared/contracts/people.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** New people who may be on record already, where the tracer could not be shown the other record. */
export function matchReviewsQuery(investigationId: string, page: number, pageSize: number) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "match-reviews", { page, pageSize }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "match-reviews"), {
        query: { page, pageSize },
        schema: matchReviewList,
        signal,
      }),
  });
}
