import { type SQL, sql } from "drizzle-orm";
import type { z } from "zod";
import type { interviewsQuery } from "../../../shared/contracts/interviews.ts";
import type { Tx } from "../../db/with-tx.ts";
import { invalid } from "../../http/problem.ts";
import type { Actor } from "../../http/route.ts";

/** An interview as the list reads it, counts included. */
export interface InterviewRow extends Record<string, unknown> {
  id: string;
  personId: string;
  studyNumber: string;
  outcome: string;
  channel: string | null;
  day: string;
  heldAt: string;
  recordedAt: string;
  contacts: number;
  groupExposures: number;
}

const SORTS: Record<string, SQL> = {
  heldAt: sql`i.held_at`,
  day: sql`i.day`,
  recordedAt: sql`i.recorded_at`,
  outcome: sql`i.outcome`,
  studyNumber: sql`p.study_number`,
};

function ordering(sort: string | undefined): SQL {
  if (!sort) return sql`i.held_at desc, i.id`;
  const down = sort.startsWith("-");
  const by = Object.hasOwn(SORTS, down ? sort.slice(1) : sort)
    ? SORTS[down ? sort.slice(1) : sort]
    : undefined;
  if (!by) throw invalid({ path: "sort", code: "not_sortable" });
  return sql`${by} ${down ? sql`desc` : sql`asc`}, i.id`;
}

/**
 * One page of the interviews and attempts that the acting person may see, the latest held first.
 * `q` is the beginning of a study number. Contacts are counted as far as their pairs are in scope.
 *
 * @throws HttpProblem invalid for a sort key that is none
 */
export async function listInterviews(
  tx: Tx,
  actor: Actor,
  query: z.output<typeof interviewsQuery>,
): Promise<{ rows: InterviewRow[]; total: number }> {
  const order = ordering(query.sort);
  const where: SQL[] = [
    sql`i.investigation_id = ${actor.investigationId}`,
    sql`i.withdrawn_at is null`,
  ];
  if (query.personId) where.push(sql`i.person_id = ${query.personId}`);
  if (query.q) {
    const start = query.q.toUpperCase().replace(/[\\%_]/g, "\\$&");
    where.push(sql`p.study_number like ${`${start}%`}`);
  }
  const from = sql`core.interview i join core.person p on p.id = i.person_id and p.withdrawn_at is null
    where ${sql.join(where, sql` and `)}`;
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from ${from}`,
  );
  const found = await tx.execute<InterviewRow>(
    sql`with page as (
          select i.id, i.person_id, p.study_number, i.outcome, i.channel, i.day, i.held_at,
            i.recorded_at, row_number() over (order by ${order}) as place
          from ${from} order by ${order}
          limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize})
        select i.id, i.person_id as "personId", i.study_number as "studyNumber", i.outcome, i.channel,
          i.day, i.held_at as "heldAt", i.recorded_at as "recordedAt",
          (select count(distinct e.pair_id)::int from core.exposure e
           where e.interview_id = i.id and e.withdrawn_at is null) as contacts,
          (select count(*)::int from core.group_exposure g
           where g.interview_id = i.id and g.withdrawn_at is null) as "groupExposures"
        from page i order by i.place`,
  );
  return { rows: found.rows, total: total.rows[0]?.count ?? 0 };
}
