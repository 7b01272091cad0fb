import { randomUUID } from "node:crypto";
import { isDeepStrictEqual } from "node:util";
import { sql } from "drizzle-orm";
import {
  MOST_SAVED_FILTERS,
  refusedFilters,
  type SavedFilter,
  type SavedFilterInput,
  type SavedFilterPatch,
  type SavedQuestion,
} from "../../../shared/contracts/people-filters.ts";
import { peopleConditions } from "../../db/people-conditions.ts";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import type { Actor } from "../../http/route.ts";
import { orderOf } from "./list-order.ts";

type Row = SavedFilter & Record<string, unknown>;

/**
 * The acting person's saved filters by name, as far as the acting role may use them: one that asks
 * for more would be refused by the list, and with a part left out it would mean something else.
 */
export async function listSavedFilters(tx: Tx, actor: Actor): Promise<SavedFilter[]> {
  const found = await tx.execute<Row>(
    sql`select id, name, filter, version from core.saved_filter order by lower(name), id`,
  );
  return found.rows.filter((row) => usable(row.filter, actor));
}

function usable({ sort, ...filters }: SavedQuestion, actor: Actor): boolean {
  if (refusedFilters(filters, actor.role).length > 0) return false;
  try {
    orderOf(sort, actor.role);
    return true;
  } catch {
    return false;
  }
}

/**
 * Refuses a question that the list would refuse, and an area that is not on record: what is kept is
 * then a value of the record, never something typed.
 */
async function checkQuestion(tx: Tx, actor: Actor, { sort, ...filters }: SavedQuestion) {
  orderOf(sort, actor.role);
  peopleConditions(filters, actor);
  if (filters.area === undefined) return;
  const known = await tx.execute(
    sql`select 1 from core.person p where p.investigation_id = ${actor.investigationId}
          and p.area = ${filters.area} and p.withdrawn_at is null limit 1`,
  );
  if (known.rows.length === 0) throw invalid({ path: "filter.area", code: "not_known" });
}

async function sameName(tx: Tx, name: string): Promise<Row | undefined> {
  const found = await tx.execute<Row>(
    sql`select id, name, filter, version from core.saved_filter where lower(name) = lower(${name})`,
  );
  return found.rows[0];
}

/** One account's saved filters change one after the other, so that names and their number hold. */
async function lockOwn(tx: Tx, actor: Actor): Promise<void> {
  await tx.execute(
    sql`select pg_advisory_xact_lock(72032, hashtext(${actor.accountId + actor.investigationId}))`,
  );
}

/**
 * Keeps a question under a name. Sent twice it is kept once.
 *
 * @throws HttpProblem invalid: the name stands for another question, or there are too many
 */
export async function saveFilter(
  tx: Tx,
  actor: Actor,
  { name, filter }: SavedFilterInput,
): Promise<SavedFilter> {
  await checkQuestion(tx, actor, filter);
  await lockOwn(tx, actor);
  const earlier = await sameName(tx, name);
  if (earlier) {
    if (isDeepStrictEqual(earlier.filter, filter)) return earlier;
    throw invalid({ path: "name", code: "repeated" });
  }
  const count = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.saved_filter`,
  );
  if ((count.rows[0]?.count ?? 0) >= MOST_SAVED_FILTERS) {
    throw invalid({ path: "name", code: "too_many" });
  }
  const id = randomUUID();
  await tx.execute(
    sql`insert into core.saved_filter (id, investigation_id, account_id, name, filter)
        values (${id}, ${actor.investigationId}, ${actor.accountId}, ${name},
          ${JSON.stringify(filter)}::jsonb)`,
  );
  return { id, name, filter, version: 1 };
}

/**
 * Renames a saved filter or gives it another question.
 *
 * @throws HttpProblem not_found, stale_version, or invalid where the name is taken
 */
export async function changeSavedFilter(
  tx: Tx,
  actor: Actor,
  id: string,
  { version, name, filter }: SavedFilterPatch,
): Promise<SavedFilter> {
  await lockOwn(tx, actor);
  const found = await tx.execute<Row>(
    sql`select id, name, filter, version from core.saved_filter where id = ${id}`,
  );
  const now = found.rows[0];
  if (!now) throw new HttpProblem("not_found");
  if (now.version !== version) throw new HttpProblem("stale_version");
  if (filter) await checkQuestion(tx, actor, filter);
  if (name !== undefined) {
    const other = await sameName(tx, name);
    if (other && other.id !== id) throw invalid({ path: "name", code: "repeated" });
  }
  const next = { name: name ?? now.name, filter: filter ?? now.filter };
  await tx.execute(
    sql`update core.saved_filter set name = ${next.name}, filter = ${JSON.stringify(next.filter)}::jsonb,
          version = version + 1, updated_at = now() where id = ${id}`,
  );
  return { id, ...next, version: version + 1 };
}

/** Deletes a saved filter of one's own. */
export async function dropSavedFilter(tx: Tx, id: string): Promise<void> {
  const gone = await tx.execute(sql`delete from core.saved_filter where id = ${id}`);
  if (gone.rowCount !== 1) throw new HttpProblem("not_found");
}
