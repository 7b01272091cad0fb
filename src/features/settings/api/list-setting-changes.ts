import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { settingChangeList } from "../../../../shared/contracts/settings.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Changes of the settings, the newest first. */
export function settingChangesQuery(investigationId: string, page: number, pageSize: number) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "settings", "changes", page, pageSize),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "settings/changes"), {
        query: { page, pageSize },
        schema: settingChangeList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
