import { z } from "zod";
import { clusterList } from "../../../shared/contracts/clusters.ts";
import { listQuery } from "../../../shared/contracts/common.ts";
import { dayIn, now } from "../../clock.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { loadInvestigation } from "../investigations/store.ts";
import { proposedClusters } from "./proposed-clusters.ts";
import { pageOfClusters } from "./queries.ts";
import { clusterSettings } from "./settings.ts";

/** Proposed clusters of cases: suggestions, read only. */
export const clusterRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/clusters",
    summary: "Proposed clusters: cases near in time, joined by contact pairs or places",
    policy: ["supervisor", "epidemiologist"],
    params: z.object({ id: z.uuid() }),
    query: listQuery,
    output: clusterList,
    async run({ tx, actor, query, services }) {
      const investigation = await loadInvestigation(tx, actor.investigationId);
      const { proposed, updating } = await proposedClusters(services, actor.investigationId, {
        ...clusterSettings(investigation),
        graphVersion: investigation.graphVersion,
      });
      const { graphVersion, windowDays, minimumCases } = proposed;
      return {
        ...pageOfClusters(proposed, query, dayIn(investigation.timeZone, now())),
        graphVersion,
        updating,
        windowDays,
        minimumCases,
      };
    },
  }),
];
