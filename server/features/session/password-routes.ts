import type { z } from "zod";
import {
  passwordChange,
  resetRequest,
  resetRequested,
  resetUse,
  resetUsed,
} from "../../../shared/contracts/accounts.ts";
import { sessionAnswer } from "../../../shared/contracts/session.ts";
import { isGuessable } from "../../../shared/passwords.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { now } from "../../clock.ts";
import { withTx } from "../../db/with-tx.ts";
import { checkStreamsOf } from "../../events/open-streams.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { definePlainRoute, type PlainRoute } from "../../http/route.ts";
import { signedInOf } from "../../http/sign-in.ts";
import { queueLetter } from "../../mail/store.ts";
import { freshToken } from "../../mail/tokens.ts";
import type { Services } from "../../services.ts";
import {
  consumeReset,
  endSessions,
  findReset,
  passwordOf,
  storePassword,
} from "./invitation-store.ts";
import { type Limiter, networkOf } from "./limiter.ts";
import { hashPassword, verifyPassword } from "./password.ts";
import { startSession } from "./start-session.ts";

const RESET_MINUTES = 20;
const NOTICE_MINUTES = 24 * 60;
const RESETS_PER_ADDRESSEE = 10;
const RESETS_PER_ADDRESS = 300;

/** Forgotten and changed passwords. */
export function passwordRoutes(services: Services, limiter: Limiter): PlainRoute[] {
  const context = { pool: services.pools.auth, nonce: null };
  const { keys } = services;
  return [
    definePlainRoute({
      method: "post",
      path: "/api/password-resets",
      summary: "Ask for a letter that lets the account choose a new password",
      access: "public",
      body: resetRequest,
      output: resetRequested,
      status: 202,
      async handle(request, response) {
        if (services.mail.mode === "off") throw new HttpProblem("mail_off");
        const { email } = response.locals.body as z.output<typeof resetRequest>;
        if (!(await limiter.within(RESETS_PER_ADDRESS, "resets", networkOf(request.ip ?? "")))) {
          throw new HttpProblem("too_many_attempts", { retryAfter: 3600 });
        }
        // Whether there is such an account is not looked up here: the letter is queued for any
        // address and thrown away where nobody has it, so that both answers are one.
        if (await limiter.within(RESETS_PER_ADDRESSEE, "reset", email)) {
          const order = { kind: "reset" as const, to: email, token: freshToken() };
          await withTx(context, (tx) => queueLetter(tx, keys, order, RESET_MINUTES));
          services.mail.soon();
        }
        return { asked: true };
      },
    }),
    definePlainRoute({
      method: "post",
      path: "/api/password-resets/use",
      summary: "Choose a new password with the letter's token",
      access: "public",
      body: resetUse,
      output: resetUsed,
      async handle(request, response) {
        const { token, password } = response.locals.body as z.output<typeof resetUse>;
        const attempt = await limiter.begin(request.ip ?? "", "reset-token");
        const seen = await withTx(context, (tx) => findReset(tx, token));
        if (!seen) throw new HttpProblem("not_found");
        await attempt.succeeded();
        if (isGuessable(password, [seen.displayName, seen.email])) {
          throw invalid({ path: "password", code: "common_password" });
        }
        const hash = await hashPassword(password);
        const accountId = await withTx(context, async (tx) => {
          const account = await consumeReset(tx, token);
          if (!account) throw new HttpProblem("not_found");
          await storePassword(tx, account.id, hash);
          await endSessions(tx, account.id);
          await recordEvent(tx, {
            action: "account.password_reset",
            accountId: account.id,
            role: null,
            investigationId: null,
          });
          const order = { kind: "password_changed" as const, to: account.email };
          await queueLetter(tx, keys, order, NOTICE_MINUTES);
          return account.id;
        });
        services.mail.soon();
        await checkStreamsOf(accountId);
        return { changed: true };
      },
    }),
    definePlainRoute({
      method: "post",
      path: "/api/session/password",
      summary: "Change one's password; other sessions of the account end",
      access: "signedIn",
      body: passwordChange,
      output: sessionAnswer,
      async handle(request, response) {
        const { current, next } = response.locals.body as z.output<typeof passwordChange>;
        const who = signedInOf(request);
        const attempt = await limiter.begin(request.ip ?? "", `change ${who.accountId}`);
        const stored = await withTx(context, (tx) => passwordOf(tx, who.accountId));
        if (!(await verifyPassword(stored, current))) {
          throw invalid({ path: "current", code: "wrong_password" });
        }
        await attempt.succeeded();
        if (current === next) throw invalid({ path: "next", code: "same_password" });
        if (isGuessable(next, [who.displayName, who.email])) {
          throw invalid({ path: "next", code: "common_password" });
        }
        const hash = await hashPassword(next);
        const epoch = await withTx(context, async (tx) => {
          const raised = await storePassword(tx, who.accountId, hash);
          await endSessions(tx, who.accountId);
          if (services.mail.mode !== "off") {
            const order = { kind: "password_changed" as const, to: who.email };
            await queueLetter(tx, keys, order, NOTICE_MINUTES);
          }
          return raised;
        });
        services.mail.soon();
        const acting =
          who.memberships.find(
            (one) => one.role === who.actingRole && one.investigationId === who.investigationId,
          ) ?? null;
        const account = { id: who.accountId, epoch };
        const startedAt = request.session.startedAt ?? now().toISOString();
        const changed = await startSession(
          request,
          services,
          account,
          acting,
          "account.password_changed",
          startedAt,
        );
        await checkStreamsOf(who.accountId);
        return changed;
      },
    }),
  ];
}
