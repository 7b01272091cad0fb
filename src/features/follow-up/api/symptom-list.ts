import { queryOptions } from "@tanstack/react-query";
import { settingsAnswer } from "../../../../shared/contracts/settings.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** The investigation's symptoms, in the order of its settings. */
export function symptomListQuery(investigationId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "settings", "in-force"),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "settings"), { schema: settingsAnswer, signal }),
    select: ({ symptoms }) => symptoms,
  });
}
