import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { matchAnswer } from "../../../../shared/contracts/people.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** People already on record that the reader may see and that look like what is being typed. */
export function matchesQuery(investigationId: string, typed: { name: string; phone: string }) {
  const name = typed.name.trim();
  const phone = typed.phone.trim();
  const body = {
    ...(name.length >= 3 ? { name } : {}),
    ...(/\d{5}/.test(phone.replace(/\D/g, "")) ? { phone } : {}),
  };
  return queryOptions({
    queryKey: investigationKey(investigationId, "people", "matches", body),
    queryFn: ({ signal }) =>
      api.post(inInvestigation(investigationId, "people/matches"), {
        body,
        schema: matchAnswer,
        signal,
      }),
    enabled: Object.keys(body).length > 0,
    placeholderData: keepPreviousData,
  });
}
