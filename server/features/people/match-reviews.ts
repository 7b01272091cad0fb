import { sql } from "drizzle-orm";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";

/** A new person beside one who may be the same; by study number only. */
export interface MatchReviewRow extends Record<string, unknown> {
  id: string;
  personId: string;
  studyNumber: string;
  otherId: string;
  otherStudyNumber: string;
  matchedOn: string[];
  recordedAt: string;
}

/** One page of the pairs that wait for a supervisor, newest first. */
export async function listMatchReviews(
  tx: Tx,
  actor: Actor,
  query: { page: number; pageSize: number },
): Promise<{ rows: MatchReviewRow[]; total: number }> {
  const where = sql`r.investigation_id = ${actor.investigationId} and r.state = 'open'`;
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.match_review r where ${where}`,
  );
  const found = await tx.execute<MatchReviewRow>(
    sql`select r.id, r.person_id as "personId", p.study_number as "studyNumber",
          r.other_id as "otherId", o.study_number as "otherStudyNumber",
          r.matched_on as "matchedOn", r.recorded_at as "recordedAt"
        from core.match_review r
        join core.person p on p.id = r.person_id join core.person o on o.id = r.other_id
        where ${where} order by r.recorded_at desc, r.id
        limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return { rows: found.rows, total: total.rows[0]?.count ?? 0 };
}
