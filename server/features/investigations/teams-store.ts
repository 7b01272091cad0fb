import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Team } from "../../../shared/contracts/investigations.ts";
import type { Tx } from "../../db/with-tx.ts";

/** Teams of the acting investigation by name, with what hangs on each; `q` is part of a name. */
export async function listTeams(
  tx: Tx,
  query: { page: number; pageSize: number; q?: string | undefined },
): Promise<{ items: Team[]; total: number }> {
  const found = query.q?.toLowerCase() ?? null;
  const where = sql`t.removed_at is null
    and (${found}::text is null or position(${found}::text in lower(t.name)) > 0)`;
  const counted = await tx.execute<{ total: number }>(
    sql`select count(*)::int as total from core.team t where ${where}`,
  );
  const rows = await tx.execute<Team & Record<string, unknown>>(
    sql`select t.id, t.name, t.version, u.members, u.invitations, u.people
      from core.team t join core.team_use() u on u.team_id = t.id where ${where}
      order by lower(t.name), t.id
      limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return { items: rows.rows, total: counted.rows[0]?.total ?? 0 };
}

/** Id of the team of that name (case aside), or null. */
export async function findTeam(tx: Tx, name: string): Promise<string | null> {
  const found = await tx.execute<{ id: string }>(
    sql`select id from core.team where lower(name) = lower(${name}) and removed_at is null
      order by recorded_at limit 1`,
  );
  return found.rows[0]?.id ?? null;
}

/** Makes a team; the caller holds the lock on members and knows that the name is free. */
export async function insertTeam(tx: Tx, investigationId: string, name: string): Promise<string> {
  const id = randomUUID();
  await tx.execute(
    sql`insert into core.team (id, investigation_id, name) values (${id}, ${investigationId}, ${name})`,
  );
  return id;
}

/** Id of the team of that name (case aside), made when there is none; a blank name is no team. */
export async function teamOfName(
  tx: Tx,
  investigationId: string,
  name: string | null | undefined,
): Promise<string | null> {
  if (!name) return null;
  return (await findTeam(tx, name)) ?? (await insertTeam(tx, investigationId, name));
}

/** A team that is not removed, with its version and whether anything hangs on it. */
export async function teamById(
  tx: Tx,
  id: string,
): Promise<{ version: number; inUse: boolean } | null> {
  const found = await tx.execute<{ version: number; inUse: boolean }>(
    sql`select t.version, u.members + u.invitations + u.people > 0 as "inUse"
      from core.team t join core.team_use() u on u.team_id = t.id
      where t.id = ${id} and t.removed_at is null`,
  );
  return found.rows[0] ?? null;
}

/** Gives a team another name. */
export async function renameTeam(tx: Tx, id: string, name: string): Promise<void> {
  await tx.execute(
    sql`update core.team set name = ${name}, version = version + 1 where id = ${id}`,
  );
}

/** Takes a team off the list; memberships of the past keep naming it. */
export async function removeTeam(tx: Tx, id: string): Promise<void> {
  await tx.execute(
    sql`update core.team set removed_at = now(), version = version + 1 where id = ${id}`,
  );
}
