import { sql } from "drizzle-orm";
import type { FollowEndEntry } from "../../../shared/contracts/follow-up.ts";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem } from "../../http/problem.ts";
import type { Actor } from "../../http/route.ts";

/**
 * One page of the ends of a person's follow-up, the latest first, also those taken back. Who did it
 * is named to a supervisor.
 *
 * @throws HttpProblem not_found when the person is out of scope
 */
export async function listEnds(
  tx: Tx,
  actor: Actor,
  personId: string,
  query: { page: number; pageSize: number },
): Promise<{ items: FollowEndEntry[]; total: number }> {
  const person = await tx.execute(
    sql`select 1 from core.person where id = ${personId} and withdrawn_at is null`,
  );
  if (person.rows.length === 0) throw new HttpProblem("not_found");
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.follow_end where person_id = ${personId}`,
  );
  const name = (column: "recorded_by" | "withdrawn_by") =>
    actor.role === "supervisor"
      ? sql`(select min(m.display_name) from views.member m where m.account_id = e.${sql.raw(column)})`
      : sql`null::text`;
  const found = await tx.execute<FollowEndEntry & Record<string, unknown>>(
    sql`select e.id, e.reason, e.day, e.recorded_at as "recordedAt",
          ${name("recorded_by")} as "recordedBy", e.withdrawn_at as "takenBackAt",
          ${name("withdrawn_by")} as "takenBackBy"
        from core.follow_end e where e.person_id = ${personId}
        order by e.recorded_at desc, e.id
        limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return { items: found.rows.map((row) => ({ ...row })), total: total.rows[0]?.count ?? 0 };
}
