import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { importMatchList } from "../../../../shared/contracts/imports.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { importKey } from "./get-import.ts";

/** Rows of a file that wait for a decision; every reading is recorded. */
export function importMatchesQuery(
  investigationId: string,
  importId: string,
  page: number,
  pageSize: number,
) {
  return queryOptions({
    queryKey: [...importKey(investigationId, importId), "matches", { page, pageSize }],
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, `imports/${importId}/matches`), {
        query: { page, pageSize },
        schema: importMatchList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
