import { type SQL, sql } from "drizzle-orm";
import type { PeopleQuery } from "../../../shared/contracts/people.ts";
import { openableKeys, readableColumns } from "../../../shared/fields.ts";
import { peopleConditions } from "../../db/people-conditions.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { findPeople, refToken } from "../../identity/records.ts";
import { type Order, orderOf } from "./list-order.ts";
import { type CorePerson, peopleById, selection } from "./queries.ts";
import { asStudyNumber } from "./study-number.ts";

/** Most people that what was typed is looked up to; a name part more common than that says little. */
const MOST_FOUND = 5_000;

/** People met by what was typed: a study number, and for roles that read names, names or phone. */
async function typed(
  tx: Tx,
  keys: InvestigationKeys | null,
  actor: Actor,
  q: string,
  country: string,
): Promise<SQL> {
  const found: string[] = [];
  const openable = openableKeys(actor.role);
  if (keys && openable.includes("name")) {
    found.push(...(await findPeople(tx, keys, q, country, MOST_FOUND)).map((one) => one.personId));
  }
  if (keys && openable.includes("ref") && actor.role !== "tracer") {
    const met = await tx.execute<{ person_id: string }>(
      sql`select person_id from identity.people_by_ref(array[${refToken(keys, q)}::bytea])`,
    );
    found.push(...met.rows.map((row) => row.person_id));
  }
  const met = sql`p.id = any (${sql.param(`{${found.join(",")}}`)}::uuid[])`;
  const number = asStudyNumber(q);
  return number ? sql`(${met} or p.study_number like ${`${number}%`})` : met;
}

/** Who a list or an action on everybody in it is about: the condition on `core.person p`. */
export async function listCondition(
  tx: Tx,
  keys: InvestigationKeys | null,
  actor: Actor,
  query: Omit<PeopleQuery, "page" | "pageSize" | "sort">,
  country: string,
): Promise<SQL> {
  const where = [
    sql`p.investigation_id = ${actor.investigationId}`,
    sql`p.withdrawn_at is null`,
    ...peopleConditions(query, actor),
  ];
  if (query.q) where.push(await typed(tx, keys, actor, query.q, country));
  return sql.join(where, sql` and `);
}

interface Slice {
  limit: number;
  offset: number;
}

/** Which rows are asked for, in which of their orders. */
interface Run {
  where: SQL;
  by: SQL;
  down: boolean;
  /** How many rows there are, where that is known. */
  total: number | null;
}

/**
 * Ids of a slice, in the order of an index. What lies in the second half is read from the end, so
 * that no page walks over more than half of everybody.
 */
async function idsOf(
  tx: Tx,
  { where, by, down, total }: Run,
  { limit, offset }: Slice,
): Promise<string[]> {
  const count = total === null ? limit : Math.min(limit, total - offset);
  if (count <= 0) return [];
  const fromEnd = total !== null && offset > total / 2;
  const order =
    down !== fromEnd ? sql`${by} desc nulls first, p.id desc` : sql`${by} asc nulls last, p.id asc`;
  const skip = fromEnd ? total - offset - count : offset;
  const found = await tx.execute<{ id: string }>(
    sql`select p.id from core.person p where ${where} order by ${order} limit ${count} offset ${skip}`,
  );
  const ids = found.rows.map((row) => row.id);
  return fromEnd ? ids.reverse() : ids;
}

/**
 * Ids of one page. Downwards, people without a value still come last, which no index read backwards
 * gives: the two parts are asked for one after the other, each in the order of the same index.
 *
 * @param total how many there are, with and without a value
 */
async function pageIds(
  tx: Tx,
  where: SQL,
  { by, down }: Order,
  slice: Slice,
  total: number,
): Promise<string[]> {
  if (!down) return idsOf(tx, { where, by, down, total }, slice);
  const known = { where: sql`${where} and ${by} is not null`, by, down };
  const first = await idsOf(tx, { ...known, total: null }, slice);
  const missing = Math.min(slice.limit, total - slice.offset) - first.length;
  if (missing <= 0) return first;
  // Where the first part ends here its length is known; else it is counted.
  const before =
    first.length > 0 || slice.offset === 0
      ? slice.offset + first.length
      : await countOf(tx, known.where);
  const rest = await idsOf(
    tx,
    { where: sql`${where} and ${by} is null`, by, down, total: total - before },
    { limit: missing, offset: Math.max(0, slice.offset - before) },
  );
  return [...first, ...rest];
}

type Page = { rows: CorePerson[]; total: number };

async function countOf(tx: Tx, where: SQL): Promise<number> {
  // Nothing else beside it: a count alone is read from whichever index is smallest.
  const counted = await tx.execute<{ total: number }>(
    sql`select count(*)::int as total from core.person p where ${where}`,
  );
  return counted.rows[0]?.total ?? 0;
}

/**
 * A page out of everybody in the investigation: its ids first, from an index where there is one for
 * the order; the rest of the rows is read for those alone.
 */
async function pageOfAll(tx: Tx, actor: Actor, where: SQL, order: Order, slice: Slice) {
  const total = await countOf(tx, where);
  const ids = slice.offset < total ? await pageIds(tx, where, order, slice, total) : [];
  const found = new Map(
    (await peopleById(tx, actor.role, ids)).map((person) => [person.id, person]),
  );
  return { rows: ids.flatMap((id) => found.get(id) ?? []), total };
}

/**
 * A page out of what a tracer sees: a few hundred people, found by their ids. Finding them is what
 * costs, so it is done once for page and total together.
 */
async function pageInSight(tx: Tx, actor: Actor, where: SQL, order: Order, slice: Slice) {
  const columns = readableColumns("core.person", actor.role).map(
    (column) => sql`p.${sql.identifier(column)}`,
  );
  const way = order.down ? sql`desc` : sql`asc`;
  const found = await tx.execute<CorePerson & { total: number }>(
    sql`with page as materialized (
          select ${sql.join(columns, sql`, `)}, count(*) over ()::int as total, ${order.by} as by
          from core.person p where ${where}
          order by by ${way} nulls last, p.id ${way} limit ${slice.limit} offset ${slice.offset}),
        named as materialized (select core.ctx_named_of(array(select id from page)) as ids)
        select ${selection(actor.role, sql`(select ids from named)::uuid[]`)}, p.total from page p
        order by p.by ${way} nulls last, p.id ${way}`,
  );
  const [first] = found.rows;
  if (first) return { rows: found.rows, total: first.total };
  return { rows: [], total: slice.offset === 0 ? 0 : await countOf(tx, where) };
}

/** One page of the line list, and how many it has in all. */
export async function listPeople(
  tx: Tx,
  keys: InvestigationKeys | null,
  actor: Actor,
  query: PeopleQuery,
  country: string,
): Promise<Page> {
  const order = orderOf(query.sort, actor.role);
  const where = await listCondition(tx, keys, actor, query, country);
  const slice = { limit: query.pageSize, offset: (query.page - 1) * query.pageSize };
  if (actor.role === "tracer") return pageInSight(tx, actor, where, order, slice);
  // Sorting everybody by a column without an index stays in memory.
  await tx.execute(sql`select set_config('work_mem', '32MB', true)`);
  return pageOfAll(tx, actor, where, order, slice);
}
