import { createHash, randomBytes, randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { z } from "zod";
import { investigationInput } from "../../../shared/contracts/investigations.ts";
import type { firstOfficerInput } from "../../../shared/contracts/session.ts";
import { recordEvent } from "../../audit/record-event.ts";
import type { Pools } from "../../db/pools.ts";
import { withTx } from "../../db/with-tx.ts";
import { HttpProblem } from "../../http/problem.ts";
import type { Services } from "../../services.ts";
import { insertInvestigation } from "../investigations/store.ts";
import { hashPassword } from "./password.ts";

const hashed = (token: string) => createHash("sha256").update(token).digest("base64url");

/**
 * When no account exists yet, makes the single-use token that may create the first data officer
 * (72 hours); earlier unused tokens end with it.
 *
 * @returns the token, or null when there is an account already
 */
export async function firstOfficerToken(pools: Pools): Promise<string | null> {
  const found = await pools.auth.query("select 1 from auth.account limit 1");
  if (found.rowCount) return null;
  const token = randomBytes(32).toString("base64url");
  await pools.auth.query("delete from auth.first_officer_link where used_at is null");
  await pools.auth.query(
    "insert into auth.first_officer_link (token_hash, expires_at) values ($1, now() + interval '72 hours')",
    [hashed(token)],
  );
  return token;
}

/**
 * Uses the token: makes the account, its first investigation and its membership as data officer
 * and supervisor, so that a team can begin.
 *
 * @throws HttpProblem not_found when the token is wrong, used or too old
 */
export async function makeFirstOfficer(
  services: Pick<Services, "pools" | "keys">,
  input: z.output<typeof firstOfficerInput>,
): Promise<void> {
  const passwordHash = await hashPassword(input.password);
  const investigation = investigationInput.parse({
    name: input.investigationName,
    timeZone: input.timeZone,
  });
  await withTx({ pool: services.pools.auth, nonce: null }, async (tx) => {
    const used = await tx.execute(
      sql`update auth.first_officer_link set used_at = now()
          where token_hash = ${hashed(input.token)} and used_at is null and expires_at > now() returning 1`,
    );
    const taken = await tx.execute(sql`select 1 from auth.account limit 1`);
    if (used.rows.length === 0 || taken.rows.length > 0) throw new HttpProblem("not_found");
    const accountId = randomUUID();
    await tx.execute(
      sql`insert into auth.account (id, email, display_name, password_hash)
          values (${accountId}, ${input.email.toLowerCase()}, ${input.displayName}, ${passwordHash})`,
    );
    const real = { ...investigation, invented: false };
    const id = await insertInvestigation(tx, services.keys, real, accountId, [
      "officer",
      "supervisor",
    ]);
    await recordEvent(tx, {
      action: "account.first_officer_made",
      accountId,
      role: "officer",
      investigationId: id,
    });
  });
}
