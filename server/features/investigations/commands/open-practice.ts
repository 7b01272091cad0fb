import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import { fillPractice } from "../../../../drizzle/seed/fill-practice.ts";
import { type Tx, withTx } from "../../../db/with-tx.ts";
import { announce, recordGraphChange } from "../../../events/record-graph-change.ts";
import type { Actor } from "../../../http/route.ts";
import type { KeyRing } from "../../../identity/keys.ts";
import type { Services } from "../../../services.ts";
import { loadInvestigation } from "../store.ts";

/** Serialises emptying and filling of one practice investigation. */
export async function lockPractice(tx: Tx, investigationId: string): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(72032, hashtext(${investigationId}))`);
}

/** Fills the acting practice investigation, which must be empty, and announces it. */
export async function fillActing(tx: Tx, ring: KeyRing, actor: Actor): Promise<void> {
  const investigation = await loadInvestigation(tx, actor.investigationId);
  const tracers = await tx.execute<{ id: string }>(
    sql`select distinct account_id as id from views.member
        where role = 'tracer' and ended_at is null order by account_id`,
  );
  await fillPractice(tx, {
    keys: await ring.of(tx, actor.investigationId),
    investigationId: actor.investigationId,
    timeZone: investigation.timeZone,
    countryCode: investigation.countryCode,
    caseDefinitionVersion: investigation.caseDefinitionVersion,
    tracers: tracers.rows.map((row) => row.id),
  });
  await recordGraphChange(tx, actor, [{ kind: "bulk" }]);
  for (const topic of ["people", "interviews", "imports"] as const) await announce(tx, topic, null);
}

/** Fills a practice investigation that was just opened, as the supervisor who opened it. */
export async function openPractice(
  services: Pick<Services, "pools" | "keys">,
  accountId: string,
  investigationId: string,
): Promise<void> {
  const { pools, keys } = services;
  const nonce = randomUUID();
  await pools.auth.query(
    `insert into auth.ctx_live (nonce, account_id, investigation_id, role, expires_at)
     values ($1, $2, $3, 'supervisor', now() + interval '1 minute')`,
    [nonce, accountId, investigationId],
  );
  const actor: Actor = { accountId, role: "supervisor", investigationId, nonce };
  try {
    await withTx({ pool: pools.supervisor, nonce }, async (tx) => {
      await lockPractice(tx, investigationId);
      const found = await tx.execute(
        sql`select 1 from core.person where investigation_id = ${investigationId} limit 1`,
      );
      if (found.rows.length === 0) await fillActing(tx, keys, actor);
    });
  } finally {
    await pools.auth.query("delete from auth.ctx_live where nonce = $1", [nonce]);
  }
}
