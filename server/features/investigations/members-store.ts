import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Member } from "../../../shared/contracts/investigations.ts";
import type { Role } from "../../../shared/roles.ts";
import { endOfDayIn } from "../../clock.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";

interface Page {
  page: number;
  pageSize: number;
  q?: string | undefined;
}

type MemberRow = Member & { timeZone: string };

/**
 * Members of the acting investigation by name; `q` is part of a name or e-mail. `past` are those
 * whose role was ended or whose last day is over, the latest first. Accounts are staff, not people
 * of the investigation, so their names stand in plain.
 */
export async function listMembers(
  tx: Tx,
  query: Page & { show: "current" | "past" },
): Promise<{ items: Member[]; total: number }> {
  const found = query.q?.toLowerCase() ?? null;
  const live = query.show === "current";
  const where = sql`m.live = ${live} and (${found}::text is null
    or position(${found}::text in lower(m.display_name)) > 0
    or position(${found}::text in lower(m.email)) > 0)`;
  const counted = await tx.execute<{ total: number }>(
    sql`select count(*)::int as total from views.member m where ${where}`,
  );
  const order = live
    ? sql`lower(m.display_name), m.role, m.id`
    : sql`coalesce(m.ended_at::date::text, m.ends_on) desc, m.ended_at desc, m.id`;
  const rows = await tx.execute<MemberRow & Record<string, unknown>>(
    sql`select m.id, m.account_id as "accountId", m.display_name as "displayName", m.email, m.role,
        m.team, m.since, m.ends_on as "endsOn", m.ended_at as "endedAt", m.version,
        v.time_zone as "timeZone"
      from views.member m, core.investigation v where ${where} order by ${order}
      limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return {
    items: rows.rows.map(({ timeZone, ...row }) => ({
      ...row,
      since: new Date(row.since).toISOString(),
      endedAt: endOf(row, live, timeZone),
    })),
    total: counted.rows[0]?.total ?? 0,
  };
}

/** When a membership of the past ended: on purpose, or with its last day. */
function endOf(row: Member, live: boolean, timeZone: string): string | null {
  if (row.endedAt) return new Date(row.endedAt).toISOString();
  return live || !row.endsOn ? null : endOfDayIn(timeZone, row.endsOn).toISOString();
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
    sql`select id from views.member
      where account_id = ${accountId} and role = ${role} and live`,
  );
  return found.rows[0]?.id ?? null;
}

/** Adds a membership and returns its id; one that ended by its date makes room first. */
export async function insertMember(
  tx: Tx,
  actor: Actor,
  member: { accountId: string; role: Role; teamId: string | null; endsOn: string | null },
): Promise<string> {
  await tx.execute(
    sql`update core.member m set ended_at = (m.ends_on::date + 1)::timestamp at time zone v.time_zone
      from core.investigation v
      where v.id = m.investigation_id and m.account_id = ${member.accountId}
        and m.role = ${member.role} and m.ended_at is null
        and not core.day_lasts(m.ends_on, v.time_zone)`,
  );
  const id = randomUUID();
  await tx.execute(
    sql`insert into core.member
        (id, investigation_id, account_id, role, team_id, ends_on, recorded_by)
      values (${id}, ${actor.investigationId}, ${member.accountId}, ${member.role},
        ${member.teamId}, ${member.endsOn}, ${actor.accountId})`,
  );
  return id;
}

/** A live membership, and how many other supervisors and officers have no end date. */
export interface LiveMember {
  role: Role;
  endsOn: string | null;
  version: number;
  otherLeaders: number;
}

/** A membership that is not over; null when there is none. */
export async function liveMember(tx: Tx, memberId: string): Promise<LiveMember | null> {
  const found = await tx.execute<LiveMember & Record<string, unknown>>(
    sql`select m.role, m.ends_on as "endsOn", m.version,
        (select count(*)::int from views.member o where o.id <> m.id and o.live
          and o.ends_on is null and o.role in ('supervisor', 'officer')) as "otherLeaders"
      from views.member m where m.id = ${memberId} and m.live`,
  );
  return found.rows[0] ?? null;
}

/** Changes team and last day of a membership; what is undefined stays. */
export async function changeMember(
  tx: Tx,
  memberId: string,
  change: { teamId?: string | null | undefined; endsOn?: string | null | undefined },
): Promise<void> {
  const sets = [sql`version = version + 1`];
  if (change.teamId !== undefined) sets.push(sql`team_id = ${change.teamId}::uuid`);
  if (change.endsOn !== undefined) sets.push(sql`ends_on = ${change.endsOn}`);
  await tx.execute(sql`update core.member set ${sql.join(sets, sql`, `)} where id = ${memberId}`);
}

/** Ends a membership; core.ctx() stops answering for it at once. */
export async function endMember(tx: Tx, memberId: string): Promise<void> {
  await tx.execute(
    sql`update core.member set ended_at = now(), version = version + 1
      where id = ${memberId} and ended_at is null`,
  );
}
