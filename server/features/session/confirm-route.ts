import type { z } from "zod";
import { confirmAnswer, confirmInput } from "../../../shared/contracts/session.ts";
import { now } from "../../clock.ts";
import { withTx } from "../../db/with-tx.ts";
import { invalid } from "../../http/problem.ts";
import { definePlainRoute, type PlainRoute } from "../../http/route.ts";
import { CONFIRMED_MINUTES, signedInOf } from "../../http/sign-in.ts";
import type { Services } from "../../services.ts";
import { passwordOf } from "./invitation-store.ts";
import type { Limiter } from "./limiter.ts";
import { verifyPassword } from "./password.ts";

/** Giving the password again, before what a session left open must not do by itself. */
export function confirmRoute(services: Services, limiter: Limiter): PlainRoute {
  return definePlainRoute({
    method: "post",
    path: "/api/session/confirm",
    summary: "Give the password again; good for the next five minutes of this session",
    access: "signedIn",
    body: confirmInput,
    output: confirmAnswer,
    async handle(request, response) {
      const { password } = response.locals.body as z.output<typeof confirmInput>;
      const { accountId } = signedInOf(request);
      const attempt = await limiter.begin(request.ip ?? "", `confirm ${accountId}`);
      const stored = await withTx({ pool: services.pools.auth, nonce: null }, (tx) =>
        passwordOf(tx, accountId),
      );
      if (!(await verifyPassword(stored, password))) {
        throw invalid({ path: "password", code: "wrong_password" });
      }
      await attempt.succeeded();
      const at = now();
      request.session.confirmedAt = at.toISOString();
      return {
        confirmedUntil: new Date(at.getTime() + CONFIRMED_MINUTES * 60_000).toISOString(),
      };
    },
  });
}
