import type { z } from "zod";
import {
  acceptAnswer,
  acceptInput,
  inboxAnswer,
  invitationSeen,
  tokenInput,
} from "../../../shared/contracts/accounts.ts";
import { isGuessable } from "../../../shared/passwords.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { isLoopback } from "../../config/env.ts";
import { withTx } from "../../db/with-tx.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { definePlainRoute, type PlainRoute } from "../../http/route.ts";
import type { Services } from "../../services.ts";
import {
  consumeInvitation,
  findInvitation,
  insertAccount,
  joinInvestigation,
  type OpenInvitation,
} from "./invitation-store.ts";
import type { Limiter } from "./limiter.ts";
import { hashPassword } from "./password.ts";

/** Why an invitation cannot be taken up by who has its address now. */
function checkFit(found: OpenInvitation): void {
  if (found.account?.disabled) throw new HttpProblem("not_found");
  if (found.account?.demo && !found.invented) throw new HttpProblem("not_found");
}

/** A new account needs a name and a password that is not made of what is known of it. */
async function newAccount(found: OpenInvitation, input: z.output<typeof acceptInput>) {
  const { displayName, password } = input;
  const errors = [];
  if (!displayName) errors.push({ path: "displayName", code: "required" as const });
  if (!password) errors.push({ path: "password", code: "required" as const });
  else if (isGuessable(password, [displayName ?? "", found.email])) {
    errors.push({ path: "password", code: "common_password" as const });
  }
  if (!displayName || !password || errors.length > 0) throw invalid(...errors);
  return { email: found.email, displayName, passwordHash: await hashPassword(password) };
}

/** Taking up an invitation, and the inbox of an installation that sends no mail. */
export function accountRoutes(services: Services, limiter: Limiter): PlainRoute[] {
  const context = { pool: services.pools.auth, nonce: null };
  return [
    definePlainRoute({
      method: "post",
      path: "/api/invitations/look",
      summary: "What an invitation is for, without using it up",
      access: "public",
      body: tokenInput,
      output: invitationSeen,
      async handle(request, response) {
        const { token } = response.locals.body as z.output<typeof tokenInput>;
        const attempt = await limiter.begin(request.ip ?? "", "invitation");
        const found = await withTx(context, (tx) => findInvitation(tx, token));
        if (!found) throw new HttpProblem("not_found");
        checkFit(found);
        await attempt.succeeded();
        const { email, role, investigationName, invented, endsOn, account } = found;
        return { email, role, investigationName, invented, endsOn, hasAccount: account !== null };
      },
    }),
    definePlainRoute({
      method: "post",
      path: "/api/invitations/accept",
      summary: "Take up an invitation, with a new account where there is none",
      access: "public",
      body: acceptInput,
      output: acceptAnswer,
      status: 201,
      async handle(request, response) {
        const input = response.locals.body as z.output<typeof acceptInput>;
        const attempt = await limiter.begin(request.ip ?? "", "invitation");
        const seen = await withTx(context, (tx) => findInvitation(tx, input.token));
        if (!seen) throw new HttpProblem("not_found");
        checkFit(seen);
        await attempt.succeeded();
        // Hashed before the transaction, which then is short.
        const fresh = seen.account ? null : await newAccount(seen, input);
        await withTx(context, async (tx) => {
          if (!(await consumeInvitation(tx, input.token))) throw new HttpProblem("not_found");
          const accountId = fresh ? await insertAccount(tx, fresh) : seen.account?.id;
          if (!accountId) throw new HttpProblem("not_found");
          await joinInvestigation(tx, accountId, seen);
          await recordEvent(tx, {
            action: "account.joined",
            accountId,
            role: seen.role,
            investigationId: seen.investigationId,
            fields: [`role:${seen.role}`],
          });
        });
        return { accepted: true, newAccount: fresh !== null };
      },
    }),
    definePlainRoute({
      method: "get",
      path: "/api/inbox",
      summary: "Mail kept by an installation on loopback that has no mail server",
      access: "public",
      output: inboxAnswer,
      async handle(request) {
        // A name that somebody else's server points at this machine must not read it.
        if (
          services.mail.mode !== "inbox" ||
          !isLoopback(request.hostname.replace(/^\[|\]$/g, ""))
        ) {
          throw new HttpProblem("not_found");
        }
        return { items: services.mail.letters() };
      },
    }),
  ];
}
