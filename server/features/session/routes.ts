import type { Request, Response } from "express";
import { z } from "zod";
import {
  firstOfficerInput,
  sessionAnswer,
  signInInput,
  switchInput,
  welcomeAnswer,
} from "../../../shared/contracts/session.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { now } from "../../clock.ts";
import { withTx } from "../../db/with-tx.ts";
import { checkStreamsOf } from "../../events/open-streams.ts";
import { HttpProblem } from "../../http/problem.ts";
import { definePlainRoute, type PlainRoute } from "../../http/route.ts";
import { endSession, loadAccount, signedInOf } from "../../http/sign-in.ts";
import type { Services } from "../../services.ts";
import { accountRoutes } from "./account-routes.ts";
import { confirmRoute } from "./confirm-route.ts";
import { knownDevice, rememberDevice } from "./device-cookie.ts";
import { makeFirstOfficer } from "./first-officer.ts";
import { createLimiter } from "./limiter.ts";
import { createPassport, type Verified } from "./passport.ts";
import { passwordRoutes } from "./password-routes.ts";
import { presentSession, startSession } from "./start-session.ts";

/** Routes of the session: sign in, who am I, act as, sign out. */
export function sessionRoutes(services: Services): PlainRoute[] {
  const passport = createPassport(services);
  const limiter = createLimiter(services.pools.auth);
  const verify = (request: Request, response: Response): Promise<Verified> =>
    new Promise((resolve, reject) => {
      passport.authenticate(
        "local",
        { session: false },
        (error: unknown, user: Verified | false | undefined) => {
          if (error) reject(error);
          else if (user) resolve(user);
          else reject(new HttpProblem("sign_in_failed"));
        },
      )(request, response, reject);
    });

  return [
    definePlainRoute({
      method: "get",
      path: "/api/welcome",
      summary: "What a visitor may know before signing in",
      access: "public",
      output: welcomeAnswer,
      async handle(_request, response) {
        const found = await services.pools.auth.query("select 1 from auth.account limit 1");
        return {
          signedIn: response.locals.who !== null,
          demo: services.env.demo,
          setUpNeeded: found.rowCount === 0,
          mail: services.mail.mode,
        };
      },
    }),
    definePlainRoute({
      method: "post",
      path: "/api/session",
      summary: "Sign in",
      access: "public",
      body: signInInput,
      output: sessionAnswer,
      async handle(request, response) {
        const input = response.locals.body as z.output<typeof signInInput>;
        const device = knownDevice(request, services, input.email);
        const attempt = await limiter.begin(request.ip ?? "", input.email, device);
        const account = await verify(request, response);
        await attempt.succeeded();
        const loaded = await loadAccount(services.pools.auth, account.id);
        if (!loaded) throw new HttpProblem("sign_in_failed");
        // The oldest membership is where a sign-in starts.
        const acting = loaded.memberships[0] ?? null;
        rememberDevice(request, response, services, loaded.email);
        const startedAt = now().toISOString();
        return startSession(request, services, account, acting, "session.started", startedAt);
      },
    }),
    definePlainRoute({
      method: "get",
      path: "/api/session",
      summary: "Who is signed in, acting as what",
      access: "signedIn",
      output: sessionAnswer,
      async handle(request) {
        return presentSession(
          signedInOf(request),
          request.session.startedAt ?? now().toISOString(),
        );
      },
    }),
    definePlainRoute({
      method: "patch",
      path: "/api/session",
      summary: "Act in another role or investigation",
      access: "signedIn",
      body: switchInput,
      output: sessionAnswer,
      async handle(request, response) {
        const input = response.locals.body as z.output<typeof switchInput>;
        const who = signedInOf(request);
        const acting = who.memberships.find(
          (one) => one.role === input.actingRole && one.investigationId === input.investigationId,
        );
        if (!acting) throw new HttpProblem("not_found");
        const account = { id: who.accountId, epoch: request.session.epoch ?? 0 };
        const startedAt = request.session.startedAt ?? now().toISOString();
        const changed = await startSession(
          request,
          services,
          account,
          acting,
          "session.role_changed",
          startedAt,
        );
        await checkStreamsOf(who.accountId);
        return changed;
      },
    }),
    definePlainRoute({
      method: "delete",
      path: "/api/session",
      summary: "Sign out",
      access: "signedIn",
      output: z.null(),
      status: 204,
      async handle(request, response) {
        const who = signedInOf(request);
        await endSession(request, services.pools.auth);
        await checkStreamsOf(who.accountId);
        await withTx({ pool: services.pools.auth, nonce: null }, (tx) =>
          recordEvent(tx, {
            action: "session.ended",
            accountId: who.accountId,
            role: who.actingRole,
            investigationId: who.investigationId,
          }),
        );
        const name = services.env.secureCookie ? "__Host-strandline" : "strandline";
        response.clearCookie(name, {
          path: "/",
          httpOnly: true,
          sameSite: "strict",
          secure: services.env.secureCookie,
        });
        response.setHeader("Clear-Site-Data", '"cache", "storage"');
        return null;
      },
    }),
    definePlainRoute({
      method: "post",
      path: "/api/first-officer",
      summary: "Make the first data officer with the link printed at start",
      access: "public",
      body: firstOfficerInput,
      output: z.strictObject({ made: z.boolean() }),
      status: 201,
      async handle(request, response) {
        const input = response.locals.body as z.output<typeof firstOfficerInput>;
        const attempt = await limiter.begin(request.ip ?? "", "first-officer");
        await makeFirstOfficer(services, input);
        await attempt.succeeded();
        return { made: true };
      },
    }),
    ...accountRoutes(services, limiter),
    ...passwordRoutes(services, limiter),
    confirmRoute(services, limiter),
  ];
}
