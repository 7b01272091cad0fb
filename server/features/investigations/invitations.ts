import { sql } from "drizzle-orm";
import { z } from "zod";
import { invitationInput, invitationList } from "../../../shared/contracts/accounts.ts";
import { listQuery, receipt } from "../../../shared/contracts/common.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { insertInvitation, listInvitations, withdrawInvitation } from "./invitations-store.ts";
import { accountOfEmail, lockMembers, membershipOf, teamOfName } from "./members-store.ts";
import { loadInvestigation } from "./store.ts";

const LEADERS = ["supervisor", "officer"] as const;
const params = z.object({ id: z.uuid() });

/** Asking somebody by e-mail to work on the investigation. */
export const invitationRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/invitations",
    summary: "Invitations that nobody took up yet",
    policy: LEADERS,
    params,
    query: listQuery,
    output: invitationList,
    async run({ tx, query }) {
      if (query.sort) throw invalid({ path: "sort", code: "not_sortable" });
      const { items, total } = await listInvitations(tx, query);
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/invitations",
    summary: "Invite somebody by e-mail",
    policy: LEADERS,
    params,
    body: invitationInput,
    output: receipt,
    creates: true,
    async run({ tx, actor, body, services }) {
      if (services.mail.mode === "off") throw new HttpProblem("mail_off");
      const account = await accountOfEmail(tx, body.email);
      const investigation = await loadInvestigation(tx, actor.investigationId);
      if (investigation.practice) throw new HttpProblem("practice_sends_nothing");
      if (account?.demo && !investigation.invented) {
        throw invalid({ path: "email", code: "demo_only" });
      }
      await lockMembers(tx, actor.investigationId);
      if (account && (await membershipOf(tx, account.id, body.role))) {
        throw invalid({ path: "role", code: "already_member" });
      }
      const teamId = body.team ? await teamOfName(tx, actor.investigationId, body.team) : null;
      const invitation = { email: body.email, role: body.role, teamId };
      const id = await insertInvitation(tx, services.keys, invitation);
      if (!id) throw new HttpProblem("too_many_attempts", { retryAfter: 3600 });
      await recordEvent(tx, {
        action: "member.invited",
        accountId: actor.accountId,
        role: actor.role,
        investigationId: actor.investigationId,
        fields: [`role:${body.role}`],
      });
      await tx.execute(sql`select core.announce('members', ${id}::uuid, null)`);
      services.mail.soon();
      return { id };
    },
  }),
  defineRoute({
    method: "delete",
    path: "/api/investigations/:id/invitations/:invitationId",
    summary: "Withdraw an invitation that nobody took up",
    policy: LEADERS,
    params: params.extend({ invitationId: z.uuid() }),
    output: z.null(),
    status: 204,
    async run({ tx, actor, params: { invitationId } }) {
      if (!(await withdrawInvitation(tx, invitationId))) throw new HttpProblem("not_found");
      await recordEvent(tx, {
        action: "member.invitation_withdrawn",
        accountId: actor.accountId,
        role: actor.role,
        investigationId: actor.investigationId,
      });
      await tx.execute(sql`select core.announce('members', ${invitationId}::uuid, null)`);
      return null;
    },
  }),
];
