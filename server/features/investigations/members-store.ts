import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Member } from "../../../shared/contracts/investigations.ts";
import type { Role } from "../../../shared/roles.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";

interface Page {
  page: number;
  pageSize: number;
  q?: string | undefined;
}

type MemberRow = Omit<Member, "since"> & { since: string; total: number };

/**
 * Live members of the acting investigation by name; `q` is part of a name or e-mail. Accounts are
 * staff, not people of the investigation, so their names stand in plain.
 */
export async function listMembers(
  tx: Tx,
  query: Page,
): Promise<{ items: Member[]; total: number }> {
  const found = query.q?.toLowerCase() ?? null;
  const where = sql`m.ended_at is null and (${found}::text is null
    or position(${found}::text in lower(m.display_name)) > 0
    or position(${found}::text in lower(m.email)) > 0)`;
  const counted = await tx.execute<{ total: number }>(
    sql`select count(*)::int as total from views.member m where ${where}`,
  );
  const rows = await tx.execute<MemberRow & Record<string, unknown>>(
    sql`select m.id, m.account_id as "accountId", m.display_name as "displayName", m.email, m.role,
        m.team, m.since from views.member m where ${where}
      order by lower(m.display_name), m.role, m.id
      limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return {
    items: rows.rows.map((row) => ({ ...row, since: new Date(row.since).toISOString() })),
    total: counted.rows[0]?.total ?? 0,
  };
}

/** Members of one investigation change one after the other: counts read next stay true. */
export async function lockMembers(tx: Tx, investigationId: string): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(72031, hashtext(${investigationId}))`);
}

/** The account an e-mail belongs to, if it may still sign in. */
export async function accountOfEmail(
  tx: Tx,
  email: string,
): Promise<{ id: string; demo: boolean } | null> {
  const found = await tx.execute<{ id: string; demo: boolean }>(
    sql`select id, demo from core.account_of_email(${email})`,
  );
  return found.rows[0] ?? null;
}

/** Id of the live membership by which an account holds a role here; null when it does not. */
export async function membershipOf(tx: Tx, accountId: string, role: Role): Promise<string | null> {
  const found = await tx.execute<{ id: string }>(
    sql`select id from core.member
      where account_id = ${accountId} and role = ${role} and ended_at is null`,
  );
  return found.rows[0]?.id ?? null;
}

/** Id of the team of that name (case aside), made when there is none. */
export async function teamOfName(tx: Tx, investigationId: string, name: string): Promise<string> {
  const found = await tx.execute<{ id: string }>(
    sql`select id from core.team where lower(name) = lower(${name}) order by recorded_at limit 1`,
  );
  const known = found.rows[0];
  if (known) return known.id;
  const id = randomUUID();
  await tx.execute(
    sql`insert into core.team (id, investigation_id, name) values (${id}, ${investigationId}, ${name})`,
  );
  return id;
}

/** Adds a membership and returns its id. */
export async function insertMember(
  tx: Tx,
  actor: Actor,
  member: { accountId: string; role: Role; teamId: string | null },
): Promise<string> {
  const id = randomUUID();
  await tx.execute(
    sql`insert into core.member (id, investigation_id, account_id, role, team_id, recorded_by)
      values (${id}, ${actor.investigationId}, ${member.accountId}, ${member.role},
        ${member.teamId}, ${actor.accountId})`,
  );
  return id;
}

/** A live membership's role, and how many supervisors and officers there would be without it. */
export async function liveMember(
  tx: Tx,
  memberId: string,
): Promise<{ role: Role; otherLeaders: number } | null> {
  const found = await tx.execute<{ role: Role; otherLeaders: number }>(
    sql`select m.role, (select count(*)::int from core.member o
          where o.id <> m.id and o.ended_at is null and o.role in ('supervisor', 'officer'))
          as "otherLeaders"
      from core.member m where m.id = ${memberId} and m.ended_at is null`,
  );
  return found.rows[0] ?? null;
}

/** Ends a membership; core.ctx() stops answering for it at once. */
export async function endMember(tx: Tx, memberId: string): Promise<void> {
  await tx.execute(
    sql`update core.member set ended_at = now() where id = ${memberId} and ended_at is null`,
  );
}
