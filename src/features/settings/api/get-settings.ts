import { queryOptions } from "@tanstack/react-query";
import { settingsAnswer } from "../../../../shared/contracts/settings.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** The settings in force, with the version they were saved at. */
export function settingsQuery(investigationId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "settings", "in-force"),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "settings"), { schema: settingsAnswer, signal }),
  });
}
