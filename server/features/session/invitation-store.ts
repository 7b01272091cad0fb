import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { InvitationSeen } from "../../../shared/contracts/accounts.ts";
import type { Role } from "../../../shared/roles.ts";
import type { Tx } from "../../db/with-tx.ts";
import { tokenHash } from "../../mail/tokens.ts";

/** An invitation while its token is held, and the account that has its address already. */
export interface OpenInvitation extends Omit<InvitationSeen, "hasAccount"> {
  investigationId: string;
  teamId: string | null;
  account: { id: string; demo: boolean; disabled: boolean } | null;
}

const FOUND = sql.raw(`select i.email, i.role, i.investigation_id as "investigationId",
    i.team_id as "teamId", v.name as "investigationName", v.invented,
    i.ends_on as "endsOn",
    case when a.id is null then null else json_build_object('id', a.id, 'demo', a.demo,
      'disabled', a.disabled_at is not null) end as account
  from auth.invitation i join core.investigation v on v.id = i.investigation_id
  left join auth.account a on lower(a.email) = lower(i.email)`);

/** What a token opens, without using it up; null when it is wrong, used or too old. */
export async function findInvitation(tx: Tx, token: string): Promise<OpenInvitation | null> {
  const found = await tx.execute<OpenInvitation & Record<string, unknown>>(
    sql`${FOUND} where i.token_hash = ${tokenHash(token)} and i.kind = 'invitation'
      and i.used_at is null and i.expires_at > now() and core.day_lasts(i.ends_on, v.time_zone)`,
  );
  return found.rows[0] ?? null;
}

/** Uses a token up in one statement; of several at once only one gets true. */
export async function consumeInvitation(tx: Tx, token: string): Promise<boolean> {
  const done = await tx.execute(
    sql`update auth.invitation set used_at = now()
        where token_hash = ${tokenHash(token)} and kind = 'invitation' and used_at is null
          and expires_at > now()`,
  );
  return done.rowCount === 1;
}

/** Makes an account; a clash with one made meanwhile is SQLSTATE 23505. */
export async function insertAccount(
  tx: Tx,
  account: { email: string; displayName: string; passwordHash: string },
): Promise<string> {
  const id = randomUUID();
  await tx.execute(
    sql`insert into auth.account (id, email, display_name, password_hash)
        values (${id}, ${account.email}, ${account.displayName}, ${account.passwordHash})`,
  );
  return id;
}

/** Gives the account the role of its invitation, unless it holds it already. */
export async function joinInvestigation(
  tx: Tx,
  accountId: string,
  to: { investigationId: string; role: Role; teamId: string | null; endsOn: string | null },
): Promise<void> {
  // The lock of everything that changes members of one investigation.
  await tx.execute(sql`select pg_advisory_xact_lock(72031, hashtext(${to.investigationId}))`);
  // A role of theirs that ended by its date makes room.
  await tx.execute(
    sql`update core.member m
        set ended_at = (m.ends_on::date + 1)::timestamp at time zone v.time_zone
        from core.investigation v
        where v.id = m.investigation_id and m.investigation_id = ${to.investigationId}
          and m.account_id = ${accountId} and m.role = ${to.role} and m.ended_at is null
          and not core.day_lasts(m.ends_on, v.time_zone)`,
  );
  await tx.execute(
    sql`insert into core.member (id, investigation_id, account_id, role, team_id, ends_on, recorded_by)
        select ${randomUUID()}, ${to.investigationId}, ${accountId}, ${to.role}, ${to.teamId},
          ${to.endsOn}, ${accountId}
        where not exists (select 1 from core.member where investigation_id = ${to.investigationId}
          and account_id = ${accountId} and role = ${to.role} and ended_at is null)`,
  );
}

/**
 * Uses a reset's token up in one statement.
 *
 * @returns the account it is for, or null when the token is wrong, used or too old
 */
export async function consumeReset(
  tx: Tx,
  token: string,
): Promise<{ id: string; email: string; displayName: string } | null> {
  const found = await tx.execute<{ id: string; email: string; displayName: string }>(
    sql`update auth.invitation i set used_at = now() from auth.account a
        where i.token_hash = ${tokenHash(token)} and i.kind = 'reset' and i.used_at is null
          and i.expires_at > now() and a.id = i.account_id and a.disabled_at is null
        returning a.id, a.email, a.display_name as "displayName"`,
  );
  return found.rows[0] ?? null;
}

/** The account a reset's token is for, without using it up. */
export async function findReset(
  tx: Tx,
  token: string,
): Promise<{ email: string; displayName: string } | null> {
  const found = await tx.execute<{ email: string; displayName: string }>(
    sql`select a.email, a.display_name as "displayName" from auth.invitation i
        join auth.account a on a.id = i.account_id and a.disabled_at is null
        where i.token_hash = ${tokenHash(token)} and i.kind = 'reset' and i.used_at is null
          and i.expires_at > now()`,
  );
  return found.rows[0] ?? null;
}

/**
 * Stores another password. Every session of the account ends with it (its epoch moves on), as do
 * its contexts and its other reset links.
 *
 * @returns the new epoch
 */
export async function storePassword(tx: Tx, accountId: string, hash: string): Promise<number> {
  const done = await tx.execute<{ epoch: number }>(
    sql`update auth.account set password_hash = ${hash}, epoch = epoch + 1 where id = ${accountId}
        returning epoch`,
  );
  await tx.execute(sql`delete from auth.ctx_live where account_id = ${accountId}`);
  await tx.execute(
    sql`update auth.invitation set used_at = now()
        where account_id = ${accountId} and kind = 'reset' and used_at is null`,
  );
  return done.rows[0]?.epoch ?? 0;
}

/** The stored password of an account that may sign in. */
export async function passwordOf(tx: Tx, accountId: string): Promise<string | null> {
  const found = await tx.execute<{ hash: string }>(
    sql`select password_hash as hash from auth.account where id = ${accountId} and disabled_at is null`,
  );
  return found.rows[0]?.hash ?? null;
}

/** Ends an account's sessions in the store. */
export async function endSessions(tx: Tx, accountId: string): Promise<void> {
  await tx.execute(sql`delete from auth.session where account_id = ${accountId}`);
}
