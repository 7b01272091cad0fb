import { z } from "zod";
import {
  graphAnswer,
  graphQuery,
  type SummaryQuery,
  summaryAnswer,
  summaryQuery,
} from "../../../shared/contracts/network.ts";
import type { AnalysisSettings } from "../../analysis/report-question.ts";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { type Actor, type AnyRoute, defineRoute } from "../../http/route.ts";
import { loadInvestigation } from "../investigations/store.ts";

const params = z.object({ id: z.uuid() });

/** Settings that figures depend on, as the acting role's own login reads them. */
async function settingsOf(tx: Tx, actor: Actor): Promise<AnalysisSettings> {
  return await loadInvestigation(tx, actor.investigationId);
}

function checkDays({ from, to }: SummaryQuery): void {
  if (from && to && from > to) throw invalid({ path: "to", code: "last_before_first" });
}

function found<T>(answer: T | null): T {
  if (answer === null) throw new HttpProblem("not_found");
  return answer;
}

/** The network report and its picture: counts, study numbers and positions, never a name. */
export const networkRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/network/summary",
    summary: "The network report with the threshold figure, as of now or of an earlier cut-off",
    policy: ["supervisor", "epidemiologist"],
    params,
    query: summaryQuery,
    output: summaryAnswer,
    async run({ tx, actor, query, services }) {
      checkDays(query);
      const settings = await settingsOf(tx, actor);
      return found(await services.analysis.summary(actor.investigationId, query, settings));
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/network/graph",
    summary: "The network as positions: people by study number, or groups when people are too many",
    policy: ["supervisor", "epidemiologist"],
    params,
    query: graphQuery,
    output: graphAnswer,
    async run({ tx, actor, query, services }) {
      checkDays(query);
      const settings = await settingsOf(tx, actor);
      return found(await services.analysis.graph(actor.investigationId, query, settings));
    },
  }),
];
