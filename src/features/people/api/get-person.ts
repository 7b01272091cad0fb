import { queryOptions } from "@tanstack/react-query";
import { z } from "zod";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Keys by role, as in the list. */
export const personPageAnswer = z.custom<PersonPage>(
  (value) => typeof value === "object" && value !== null && "pairs" in value && "can" in value,
);

/** A person's page. Each reading is recorded, so it is not asked for more often than needed. */
export function personQuery(investigationId: string, personId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "people", "one", personId),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, `people/${personId}`), {
        schema: personPageAnswer,
        signal,
      }),
    refetchOnWindowFocus: false,
  });
}
