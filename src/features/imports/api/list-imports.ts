import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { listOf } from "../../../../shared/contracts/common.ts";
import { importAnswer } from "../../../../shared/contracts/imports.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

const importList = listOf(importAnswer);

/** Files brought in so far, newest first, without their problems. */
export function importsQuery(investigationId: string, page: number, pageSize: number) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "imports", "list", { page, pageSize }),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "imports"), {
        query: { page, pageSize },
        schema: importList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
