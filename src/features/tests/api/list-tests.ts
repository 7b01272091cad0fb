import { queryOptions } from "@tanstack/react-query";
import { testList } from "../../../../shared/contracts/tests.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Tests of a person, newest specimen first. */
export function testsQuery(investigationId: string, personId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "tests", personId),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, `people/${personId}/tests`), {
        query: { pageSize: 200 },
        schema: testList,
        signal,
      }),
  });
}
