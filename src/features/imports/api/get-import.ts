import { queryOptions } from "@tanstack/react-query";
import { importAnswer } from "../../../../shared/contracts/imports.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

const pollMs = 1_000;

/** Key of one import. */
export function importKey(investigationId: string, importId: string) {
  return investigationKey(investigationId, "imports", "one", importId);
}

/** One import with its problems; asked again every second while it is being put on record. */
export function importQuery(investigationId: string, importId: string) {
  return queryOptions({
    queryKey: importKey(investigationId, importId),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, `imports/${importId}`), {
        schema: importAnswer,
        signal,
      }),
    refetchInterval: (query) => (query.state.data?.state === "committing" ? pollMs : false),
  });
}
