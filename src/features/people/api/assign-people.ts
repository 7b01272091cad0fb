import { queryOptions, useMutation, useQueryClient } from "@tanstack/react-query";
import {
  type AssignInput,
  assignAnswer,
  assigneesAnswer,
} from "../../../../shared/contracts/people-filters.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** To whom people can be assigned, and what members and teams are called. */
export function assigneesQuery(investigationId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "members", "assignees"),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "people/assignees"), {
        schema: assigneesAnswer,
        signal,
      }),
    staleTime: 5 * 60_000,
  });
}

/** Assigns several people at once. */
export function useAssignPeople(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: AssignInput) =>
      api.post(inInvestigation(investigationId, "people/assign"), { body, schema: assignAnswer }),
    onSettled: () =>
      queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "people") }),
  });
}
