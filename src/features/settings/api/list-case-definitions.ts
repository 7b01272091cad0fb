import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { caseDefinitionList } from "../../../../shared/contracts/settings.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Versions of the case definition; classifications name the one they were made with. */
export function caseDefinitionsQuery(investigationId: string, page: number, pageSize: number) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "settings", "case-definitions", page, pageSize),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "settings/case-definitions"), {
        query: { page, pageSize },
        schema: caseDefinitionList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
