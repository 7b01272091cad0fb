import { useMutation, useQueryClient } from "@tanstack/react-query";
import { type MatchedOn, matchDecisionAnswer } from "../../../../shared/contracts/imports.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** Turns at most for all rows of a kind: two hundred rows each, and a file has a million at most. */
const mostTurns = 5_000;

export type Decision = { decision: "same" | "other" } & (
  | { id: string }
  | { matchedOn: MatchedOn; onProgress: (left: number) => void }
);

/** Decides about one row, or about all rows of a kind, two hundred at a time. */
export function useDecideMatches(investigationId: string, importId: string) {
  const queryClient = useQueryClient();
  const path = inInvestigation(investigationId, `imports/${importId}/matches`);
  return useMutation({
    mutationFn: async (asked: Decision) => {
      const { decision } = asked;
      const send = (body: object) =>
        api.post(path, { body: { decision, ...body }, schema: matchDecisionAnswer });
      if ("id" in asked) return send({ ids: [asked.id] });
      let total = await send({ matchedOn: asked.matchedOn });
      for (let turn = 1; turn < mostTurns && total.left > 0; turn++) {
        asked.onProgress(total.left);
        const next = await send({ matchedOn: asked.matchedOn });
        // What is left now waits for other rows.
        if (next.decided === 0) break;
        total = {
          ...next,
          decided: total.decided + next.decided,
          conflicts: total.conflicts + next.conflicts,
        };
      }
      return total;
    },
    onSettled: () =>
      Promise.all([
        queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "imports") }),
        queryClient.invalidateQueries({ queryKey: investigationKey(investigationId, "people") }),
      ]),
  });
}
