import { createHash } from "node:crypto";
import { sql } from "drizzle-orm";
import type { InvestigationInput } from "../../../../shared/contracts/investigations.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { withTx } from "../../../db/with-tx.ts";
import { HttpProblem, invalid } from "../../../http/problem.ts";
import type { SignedIn } from "../../../http/sign-in.ts";
import { hasPhoneNumbers } from "../../../identity/tokens.ts";
import type { Services } from "../../../services.ts";
import { databaseKnowsZone } from "../settings-store.ts";
import { insertInvestigation } from "../store.ts";
import { openPractice } from "./open-practice.ts";

/**
 * Opens an investigation; who opens it holds in it the role they act in. Runs as the accounts
 * login, since the new investigation is in nobody's context yet.
 */
export async function createInvestigation(
  services: Pick<Services, "pools" | "keys">,
  who: SignedIn,
  input: InvestigationInput,
  key: string,
): Promise<{ id: string; version: number }> {
  if (!who.actingRole) throw new HttpProblem("role_refused");
  const role = who.actingRole;
  const invented = input.practice || (input.invented ?? who.demo);
  if (input.practice && role !== "supervisor") throw new HttpProblem("role_refused");
  if (who.demo && !invented) {
    throw new HttpProblem("invalid", { errors: [{ path: "invented", code: "demo_only" }] });
  }
  if (!hasPhoneNumbers(input.countryCode)) {
    throw invalid({ path: "countryCode", code: "not_in_list" });
  }
  const hash = createHash("sha256").update(JSON.stringify(input)).digest("base64url");
  const opened = await withTx({ pool: services.pools.auth, nonce: null }, async (tx) => {
    const claimed = await tx.execute(
      sql`insert into auth.idempotency (account_id, key, route, request_hash, status, receipt)
          values (${who.accountId}, ${key}, 'post /api/investigations', ${hash}, 0, '{}')
          on conflict do nothing`,
    );
    if (claimed.rowCount === 0) {
      const found = await tx.execute<{
        request_hash: string;
        receipt: { id: string; version: number };
      }>(
        sql`select request_hash, receipt from auth.idempotency where account_id = ${who.accountId} and key = ${key}`,
      );
      const earlier = found.rows[0];
      if (!earlier || earlier.request_hash !== hash) throw new HttpProblem("key_reused");
      return earlier.receipt;
    }
    if (!(await databaseKnowsZone(tx, input.timeZone))) {
      throw invalid({ path: "timeZone", code: "not_a_zone" });
    }
    const id = await insertInvestigation(tx, services.keys, { ...input, invented }, who.accountId, [
      role,
    ]);
    await recordEvent(tx, {
      action: "investigation.created",
      accountId: who.accountId,
      role,
      investigationId: id,
    });
    const receipt = { id, version: 1 };
    await tx.execute(
      sql`update auth.idempotency set status = 201, receipt = ${JSON.stringify(receipt)}::jsonb
          where account_id = ${who.accountId} and key = ${key}`,
    );
    return receipt;
  });
  // By a login that may write people; the accounts login may not. What broke off is done again here
  // when the same request is sent once more.
  if (input.practice) await openPractice(services, who.accountId, opened.id);
  return opened;
}
