import { sql } from "drizzle-orm";
import { z } from "zod";
import { listQuery, receipt } from "../../../shared/contracts/common.ts";
import { teamInput, teamList, teamPatch } from "../../../shared/contracts/investigations.ts";
import { recordEvent } from "../../audit/record-event.ts";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { type Actor, type AnyRoute, defineRoute } from "../../http/route.ts";
import { lockMembers } from "./members-store.ts";
import {
  findTeam,
  insertTeam,
  listTeams,
  removeTeam,
  renameTeam,
  teamById,
} from "./teams-store.ts";

const LEADERS = ["supervisor", "officer"] as const;
const params = z.object({ id: z.uuid() });
const teamParams = params.extend({ teamId: z.uuid() });

async function recordTeam(
  tx: Tx,
  actor: Actor,
  action: "team.made" | "team.renamed" | "team.removed",
  id: string,
): Promise<void> {
  await recordEvent(tx, {
    action,
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
  });
  await tx.execute(sql`select core.announce('members', ${id}::uuid, null)`);
}

/** Teams of the investigation: list, make, rename, remove while nothing hangs on them. */
export const teamRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/teams",
    summary: "Teams of the investigation and what hangs on each",
    policy: LEADERS,
    params,
    query: listQuery,
    output: teamList,
    async run({ tx, query }) {
      if (query.sort) throw invalid({ path: "sort", code: "not_sortable" });
      const { items, total } = await listTeams(tx, query);
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/teams",
    summary: "Make a team",
    policy: LEADERS,
    params,
    body: teamInput,
    output: receipt,
    creates: true,
    async run({ tx, actor, body }) {
      await lockMembers(tx, actor.investigationId);
      if (await findTeam(tx, body.name)) throw invalid({ path: "name", code: "team_taken" });
      const id = await insertTeam(tx, actor.investigationId, body.name);
      await recordTeam(tx, actor, "team.made", id);
      return { id, version: 1 };
    },
  }),
  defineRoute({
    method: "patch",
    path: "/api/investigations/:id/teams/:teamId",
    summary: "Give a team another name",
    policy: LEADERS,
    params: teamParams,
    body: teamPatch,
    output: receipt,
    async run({ tx, actor, params: { teamId }, body }) {
      await lockMembers(tx, actor.investigationId);
      const team = await teamById(tx, teamId);
      if (!team) throw new HttpProblem("not_found");
      if (team.version !== body.version) throw new HttpProblem("stale_version");
      const holder = await findTeam(tx, body.name);
      if (holder && holder !== teamId) throw invalid({ path: "name", code: "team_taken" });
      await renameTeam(tx, teamId, body.name);
      await recordTeam(tx, actor, "team.renamed", teamId);
      return { id: teamId, version: team.version + 1 };
    },
  }),
  defineRoute({
    method: "delete",
    path: "/api/investigations/:id/teams/:teamId",
    summary: "Remove a team on which nothing hangs",
    policy: LEADERS,
    params: teamParams,
    output: z.null(),
    status: 204,
    async run({ tx, actor, params: { teamId } }) {
      await lockMembers(tx, actor.investigationId);
      const team = await teamById(tx, teamId);
      if (!team) throw new HttpProblem("not_found");
      if (team.inUse) {
        throw new HttpProblem("conflict", { errors: [{ path: "teamId", code: "team_in_use" }] });
      }
      await removeTeam(tx, teamId);
      await recordTeam(tx, actor, "team.removed", teamId);
      return null;
    },
  }),
];
