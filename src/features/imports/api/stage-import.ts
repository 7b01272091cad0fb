import { useMutation, useQueryClient } from "@tanstack/react-query";
import { importAnswer } from "../../../../shared/contracts/imports.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

export type FileToCheck = {
  kind: "people" | "pairs";
  file: File;
  /** By position the column each column of the file is. */
  columns: readonly (string | null)[];
  idempotencyKey: string;
};

/** Sends a file to be checked; nothing of it reaches the record yet. */
export function useStageImport(investigationId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ kind, file, columns, idempotencyKey }: FileToCheck) => {
      const body = new FormData();
      body.set("kind", kind);
      body.set("columns", JSON.stringify(columns));
      // Its own name may say who is in it, and the server has no use for it.
      body.set("file", file, `${kind}.csv`);
      return api.post(inInvestigation(investigationId, "imports"), {
        body,
        idempotencyKey,
        schema: importAnswer,
      });
    },
    onSuccess: () =>
      queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "imports") }),
  });
}
