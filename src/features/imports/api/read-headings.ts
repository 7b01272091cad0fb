import { useMutation } from "@tanstack/react-query";
import { headingsAnswer, type Import } from "../../../../shared/contracts/imports.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";

/** The beginning of a file is enough: no first line may be longer. */
const firstBytes = 512 * 1024;

/** Asks what the first line of a file says: encoding, separator and columns. Nothing is kept. */
export function useReadHeadings(investigationId: string) {
  return useMutation({
    mutationFn: ({ kind, file }: { kind: Import["kind"]; file: File }) => {
      const body = new FormData();
      body.set("kind", kind);
      body.set("file", file.slice(0, firstBytes), `${kind}.csv`);
      return api.post(inInvestigation(investigationId, "imports/headings"), {
        body,
        schema: headingsAnswer,
      });
    },
  });
}
