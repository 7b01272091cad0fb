import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { placeList } from "../../../../shared/contracts/places.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Places on record, by page. */
export function placesQuery(investigationId: string, page: number, pageSize: number) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "places", { page, pageSize }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "places"), {
        query: { page, pageSize },
        schema: placeList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
