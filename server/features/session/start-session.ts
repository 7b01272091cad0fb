import type { Request } from "express";
import type { z } from "zod";
import type { sessionAnswer } from "../../../shared/contracts/session.ts";
import { ABSOLUTE_HOURS, IDLE_MINUTES, ROOMS_OF } from "../../../shared/roles.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { withTx } from "../../db/with-tx.ts";
import { HttpProblem } from "../../http/problem.ts";
import { beginSession, loadAccount, type Membership, type SignedIn } from "../../http/sign-in.ts";
import type { Services } from "../../services.ts";
import type { Verified } from "./passport.ts";

/** The signed-in session as its holder sees it. */
export function presentSession(who: SignedIn, startedAt: string): z.input<typeof sessionAnswer> {
  const role = who.actingRole;
  const rooms = role ? [...ROOMS_OF[role]] : [];
  return {
    accountId: who.accountId,
    displayName: who.displayName,
    email: who.email,
    demo: who.demo,
    actingRole: role,
    investigationId: who.investigationId,
    rooms,
    memberships: who.memberships,
    idleMinutes: role ? IDLE_MINUTES[role] : Math.min(...Object.values(IDLE_MINUTES)),
    endsAt: new Date(new Date(startedAt).getTime() + ABSOLUTE_HOURS * 3_600_000).toISOString(),
  };
}

/**
 * Begins a session and writes its event; answers with the session.
 *
 * @throws HttpProblem sign_in_failed when the account was disabled meanwhile
 */
export async function startSession(
  request: Request,
  services: Services,
  account: Verified,
  acting: Membership | null,
  action: "session.started" | "session.role_changed" | "account.password_changed",
  startedAt: string,
) {
  const { pools } = services;
  await beginSession(request, pools.auth, account, acting, startedAt);
  await withTx({ pool: pools.auth, nonce: null }, (tx) =>
    recordEvent(tx, {
      action,
      accountId: account.id,
      role: acting?.role ?? null,
      investigationId: acting?.investigationId ?? null,
    }),
  );
  const loaded = await loadAccount(pools.auth, account.id);
  if (!loaded) throw new HttpProblem("sign_in_failed");
  return presentSession(
    {
      accountId: loaded.id,
      email: loaded.email,
      displayName: loaded.display_name,
      demo: loaded.demo,
      memberships: loaded.memberships,
      actingRole: acting?.role ?? null,
      investigationId: acting?.investigationId ?? null,
      nonce: request.session.nonce ?? null,
      confirmedAt: startedAt,
    },
    startedAt,
  );
}
