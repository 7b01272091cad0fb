import { sql } from "drizzle-orm";
import { z } from "zod";
import { receipt } from "../../../shared/contracts/common.ts";
import {
  memberEndInput,
  memberInput,
  memberList,
  memberPatch,
  memberQuery,
} from "../../../shared/contracts/investigations.ts";
import { recordEvent } from "../../audit/record-event.ts";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { type Actor, type AnyRoute, defineRoute } from "../../http/route.ts";
import {
  accountOfEmail,
  changeMember,
  endMember,
  insertMember,
  type LiveMember,
  listMembers,
  liveMember,
  lockMembers,
  membershipOf,
} from "./members-store.ts";
import { checkEnd } from "./role-end.ts";
import { loadInvestigation } from "./store.ts";
import { teamOfName } from "./teams-store.ts";

const LEADERS = ["supervisor", "officer"] as const;
const params = z.object({ id: z.uuid() });
const memberParams = params.extend({ memberId: z.uuid() });

async function recordMember(
  tx: Tx,
  actor: Actor,
  action: "member.added" | "member.changed" | "member.ended",
  role: string,
  changed: readonly string[] = [],
) {
  await recordEvent(tx, {
    action,
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    fields: [`role:${role}`, ...changed],
  });
}

/**
 * Somebody must be left who can let others in, also after every end date has passed: one supervisor
 * or officer without an end date.
 */
function checkLeaders(member: LiveMember, path: string): void {
  const lasting = (LEADERS as readonly string[]).includes(member.role) && member.endsOn === null;
  if (lasting && member.otherLeaders === 0) {
    throw new HttpProblem("conflict", { errors: [{ path, code: "last_leader" }] });
  }
}

/** Ends a membership; the caller holds the lock on members. */
async function endMembership(tx: Tx, actor: Actor, memberId: string): Promise<null> {
  const member = await liveMember(tx, memberId);
  if (!member) throw new HttpProblem("not_found");
  checkLeaders(member, "memberId");
  // Before the change: whoever ends their own membership has no context after it.
  await recordMember(tx, actor, "member.ended", member.role);
  await tx.execute(sql`select core.announce('members', ${memberId}::uuid, null)`);
  await endMember(tx, memberId);
  return null;
}

/** Who works on the investigation: list, add by e-mail, end. */
export const memberRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/members",
    summary: "Members of the investigation",
    policy: LEADERS,
    params,
    query: memberQuery,
    output: memberList,
    async run({ tx, query }) {
      if (query.sort) throw invalid({ path: "sort", code: "not_sortable" });
      const { items, total } = await listMembers(tx, query);
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/members",
    summary: "Give an account a role here",
    policy: LEADERS,
    params,
    body: memberInput,
    output: receipt,
    creates: true,
    async run({ tx, actor, body }) {
      const account = await accountOfEmail(tx, body.email);
      if (!account) throw invalid({ path: "email", code: "account_unknown" });
      const investigation = await loadInvestigation(tx, actor.investigationId);
      if (account.demo && !investigation.invented) {
        throw invalid({ path: "email", code: "demo_only" });
      }
      checkEnd(investigation.timeZone, body.endsOn);
      await lockMembers(tx, actor.investigationId);
      if (await membershipOf(tx, account.id, body.role)) {
        throw invalid({ path: "role", code: "already_member" });
      }
      const teamId = await teamOfName(tx, actor.investigationId, body.team);
      const { role, endsOn } = body;
      const id = await insertMember(tx, actor, { accountId: account.id, role, teamId, endsOn });
      await recordMember(tx, actor, "member.added", body.role);
      await tx.execute(sql`select core.announce('members', ${id}::uuid, null)`);
      return { id };
    },
  }),
  defineRoute({
    method: "patch",
    path: "/api/investigations/:id/members/:memberId",
    summary: "Change the team or the last day of a membership",
    policy: LEADERS,
    params: memberParams,
    body: memberPatch,
    output: receipt,
    async run({ tx, actor, params: { memberId }, body }) {
      const { timeZone } = await loadInvestigation(tx, actor.investigationId);
      await lockMembers(tx, actor.investigationId);
      const member = await liveMember(tx, memberId);
      if (!member) throw new HttpProblem("not_found");
      if (member.version !== body.version) throw new HttpProblem("stale_version");
      const { team, endsOn } = body;
      if (endsOn !== undefined) checkEnd(timeZone, endsOn);
      if (endsOn) checkLeaders(member, "endsOn");
      const teamId =
        team === undefined ? undefined : await teamOfName(tx, actor.investigationId, team);
      await changeMember(tx, memberId, { teamId, endsOn });
      const changed = Object.keys(body).filter((key) => key !== "version");
      await recordMember(tx, actor, "member.changed", member.role, changed);
      await tx.execute(sql`select core.announce('members', ${memberId}::uuid, null)`);
      return { id: memberId, version: member.version + 1 };
    },
  }),
  defineRoute({
    method: "delete",
    path: "/api/investigations/:id/members/:memberId",
    summary: "End a membership",
    policy: LEADERS,
    params: memberParams,
    output: z.null(),
    status: 204,
    async run({ tx, actor, params: { memberId } }) {
      await lockMembers(tx, actor.investigationId);
      return endMembership(tx, actor, memberId);
    },
  }),
  defineRoute({
    method: "delete",
    path: "/api/investigations/:id/members",
    summary: "End a membership named in the body",
    policy: LEADERS,
    params,
    body: memberEndInput,
    output: z.null(),
    status: 204,
    async run({ tx, actor, body }) {
      await lockMembers(tx, actor.investigationId);
      if ("id" in body) return endMembership(tx, actor, body.id);
      const account = await accountOfEmail(tx, body.email);
      if (!account) throw invalid({ path: "email", code: "account_unknown" });
      const memberId = await membershipOf(tx, account.id, body.role);
      if (!memberId) throw new HttpProblem("not_found");
      return endMembership(tx, actor, memberId);
    },
  }),
];
