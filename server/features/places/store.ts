import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { householdToken, placeName } from "../../identity/records.ts";

/** A place as core holds it; a household has no name here. */
export interface PlaceRow {
  id: string;
  number: number;
  name: string | null;
  setting: string | null;
  area: string | null;
  recordedAt: string;
  version: number;
}

/** What a place is told by: a name with its setting. */
export interface PlaceTelling {
  name: string;
  setting: string | null;
  area?: string | null;
}

async function findPlace(
  tx: Tx,
  keys: InvestigationKeys,
  actor: Actor,
  telling: PlaceTelling,
): Promise<string | null> {
  if (telling.setting === "household") {
    const token = householdToken(keys, telling.name);
    const found = await tx.execute<{ place_id: string }>(
      sql`select place_id from identity.households_by_token(array[${token}::bytea])`,
    );
    return found.rows[0]?.place_id ?? null;
  }
  const found = await tx.execute<{ id: string }>(
    sql`select id from core.place where investigation_id = ${actor.investigationId}
          and lower(name) = lower(${telling.name}) and setting is not distinct from ${telling.setting}
        order by number limit 1`,
  );
  return found.rows[0]?.id ?? null;
}

/** Records a place under the next number; a household's name goes to identity, encrypted. */
export async function insertPlace(
  tx: Tx,
  keys: InvestigationKeys,
  actor: Actor,
  telling: PlaceTelling,
): Promise<string> {
  const id = randomUUID();
  const household = telling.setting === "household";
  await tx.execute(
    sql`insert into core.place (id, investigation_id, number, name, setting, area, recorded_by)
        values (${id}, ${actor.investigationId}, core.next_numbers(1), ${household ? null : telling.name},
          ${telling.setting}, ${telling.area ?? null}, ${actor.accountId})`,
  );
  if (household) {
    const sealed = placeName.seal(keys, id, telling.name);
    await tx.execute(
      sql`select identity.put_place(${id}::uuid, ${sealed}::bytea, ${householdToken(keys, telling.name)}::bytea)`,
    );
  }
  return id;
}

/** The place told of: one already on record under that name and setting, else a new one. */
export async function placeFor(
  tx: Tx,
  keys: InvestigationKeys,
  actor: Actor,
  telling: PlaceTelling,
): Promise<string> {
  return (await findPlace(tx, keys, actor, telling)) ?? insertPlace(tx, keys, actor, telling);
}

/** Places of the acting investigation, by number; `q` is part of a facility's name. */
export async function listPlaces(
  tx: Tx,
  actor: Actor,
  options: { q?: string | undefined; page: number; pageSize: number },
): Promise<{ rows: PlaceRow[]; total: number }> {
  const pattern = options.q ? `%${options.q.replace(/[\\%_]/g, "\\$&")}%` : null;
  const where = sql`investigation_id = ${actor.investigationId}
    and (${pattern}::text is null or name ilike ${pattern})`;
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.place where ${where}`,
  );
  const found = await tx.execute<PlaceRow & Record<string, unknown>>(
    sql`select id, number, name, setting, area, recorded_at as "recordedAt", version from core.place
        where ${where} order by number
        limit ${options.pageSize} offset ${(options.page - 1) * options.pageSize}`,
  );
  return { rows: found.rows, total: total.rows[0]?.count ?? 0 };
}
