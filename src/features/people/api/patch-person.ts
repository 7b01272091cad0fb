import { useMutation, useQueryClient } from "@tanstack/react-query";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";
import type { PersonKey } from "../person-fields.ts";
import { personPageAnswer, personQuery } from "./get-person.ts";

/** Only the keys present are changed; blank text and null both mean "not asked". */
export type PersonChange = Partial<Record<PersonKey | "assignedTo", string | null>> & {
  version: number;
};

/** Changes a person; 409 `stale_version` when somebody else saved first. */
export function usePatchPerson(investigationId: string, personId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: PersonChange) =>
      api.patch(inInvestigation(investigationId, `people/${personId}`), {
        body,
        schema: personPageAnswer,
      }),
    onSuccess(saved) {
      queryClient.setQueryData(personQuery(investigationId, personId).queryKey, saved);
      void queryClient.invalidateQueries({
        queryKey: investigationKey(investigationId, "people", "list"),
      });
    },
  });
}
