import { queryOptions, useMutation, useQueryClient } from "@tanstack/react-query";
import {
  type SavedFilterInput,
  type SavedFilterPatch,
  savedFilterAnswer,
  savedFilterList,
} from "../../../../shared/contracts/people-filters.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** The reader's own saved filters. */
export function savedFiltersQuery(investigationId: string) {
  return queryOptions({
    queryKey: investigationKey(investigationId, "saved-filters"),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "people/filters"), {
        schema: savedFilterList,
        signal,
      }),
    staleTime: 5 * 60_000,
  });
}

/** Keeping, renaming and deleting saved filters. */
export function useSavedFilterChanges(investigationId: string) {
  const queryClient = useQueryClient();
  const path = (id = "") => inInvestigation(investigationId, `people/filters${id && `/${id}`}`);
  const onSuccess = () =>
    queryClient.invalidateQueries({ queryKey: savedFiltersQuery(investigationId).queryKey });
  const save = useMutation({
    mutationFn: (body: SavedFilterInput) => api.post(path(), { body, schema: savedFilterAnswer }),
    onSuccess,
  });
  const change = useMutation({
    mutationFn: ({ id, ...body }: SavedFilterPatch & { id: string }) =>
      api.patch(path(id), { body, schema: savedFilterAnswer }),
    onSuccess,
  });
  const drop = useMutation({
    mutationFn: (id: string) => api.delete(path(id)),
    onSuccess,
  });
  return { save, change, drop };
}
