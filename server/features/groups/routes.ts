import { z } from "zod";
import { listQuery } from "../../../shared/contracts/common.ts";
import { groupList } from "../../../shared/contracts/network.ts";
import { HttpProblem } from "../../http/problem.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { pageOfGroups } from "./queries.ts";

const params = z.object({ id: z.uuid() });

/** Connected groups of the current record, read from the live graph. */
export const groupRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/groups",
    summary: "Connected groups of two people or more, with their growth since the start of today",
    policy: ["supervisor", "epidemiologist"],
    params,
    query: listQuery,
    output: groupList,
    async run({ actor, query, services }) {
      const groups = await services.analysis.groups(actor.investigationId);
      if (!groups) throw new HttpProblem("not_found");
      return pageOfGroups(groups, query);
    },
  }),
];
