import { queryOptions } from "@tanstack/react-query";
import { investigationList } from "../../../../shared/contracts/investigations.ts";
import { api } from "../../../lib/api-client.ts";

/** Every investigation in which the signed-in person holds a role. */
export function investigationsQuery() {
  return queryOptions({
    queryKey: ["investigations"],
    queryFn: ({ signal }) =>
      api.get("/api/investigations", {
        query: { pageSize: 200 },
        schema: investigationList,
        signal,
      }),
  });
}
