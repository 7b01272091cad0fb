import { type SQL, sql } from "drizzle-orm";
import type { z } from "zod";
import type { AccessEvent, accessEventsQuery } from "../../../shared/contracts/safeguard.ts";
import type { Tx } from "../../db/with-tx.ts";

/** People listed of one event; an export may name a hundred thousand, whose number is then told. */
const MOST_PEOPLE = 200;

type Query = z.output<typeof accessEventsQuery>;

function filtersOf(query: Query): SQL {
  const filters: SQL[] = [sql`true`];
  if (query.action) filters.push(sql`e.action = ${query.action}`);
  if (query.accountId) filters.push(sql`e.account_id = ${query.accountId}::uuid`);
  if (query.personId) filters.push(sql`e.person_ids @> array[${query.personId}::uuid]`);
  if (query.q) {
    // What an officer may name: a study number, or who looked.
    filters.push(sql`(
      e.person_ids && (select coalesce(array_agg(p.id), '{}') from core.person p
        where upper(p.study_number) = upper(${query.q}))
      or e.account_id in (select m.account_id from views.member m
        where position(lower(${query.q}) in lower(m.display_name)) > 0))`);
  }
  return sql.join(filters, sql` and `);
}

/**
 * Events of the acting investigation, newest first. Accounts appear by name also when their
 * membership has ended, people by study number.
 */
export async function listAccessEvents(
  tx: Tx,
  query: Query,
): Promise<{ items: AccessEvent[]; total: number }> {
  const where = filtersOf(query);
  const counted = await tx.execute<{ total: number }>(
    sql`select count(*)::int as total from audit.event e where ${where}`,
  );
  const rows = await tx.execute<AccessEvent & Record<string, unknown>>(
    sql`with page as materialized (
        select e.id, e.at, e.account_id, e.role, e.action, e.fields,
          e.person_ids[1:${MOST_PEOPLE}] as person_ids,
          case when cardinality(e.person_ids) > ${MOST_PEOPLE}
            then e.counts || jsonb_build_object('people', cardinality(e.person_ids))
            else e.counts end as counts
        from audit.event e where ${where}
        order by e.at desc, e.id desc
        limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}),
      who as (select distinct on (account_id) account_id, display_name from views.member
        order by account_id)
      select e.id, e.at, e.account_id as "accountId", w.display_name as "displayName", e.role,
        e.action, e.fields, e.person_ids as "personIds", e.counts,
        (select coalesce(array_agg(p.study_number order by u.place), '{}')
          from unnest(e.person_ids) with ordinality as u (id, place)
          join core.person p on p.id = u.id) as "studyNumbers"
      from page e left join who w on w.account_id = e.account_id
      order by e.at desc, e.id desc`,
  );
  return {
    items: rows.rows.map((row) => ({ ...row, at: new Date(row.at).toISOString() })),
    total: counted.rows[0]?.total ?? 0,
  };
}
