import { sql } from "drizzle-orm";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem } from "../../http/problem.ts";

/** @throws HttpProblem not_found when the person is out of scope or not there */
export async function requirePerson(
  tx: Tx,
  personId: string,
): Promise<{ classification: string | null }> {
  const found = await tx.execute<{ classification: string | null }>(
    sql`select classification from core.person where id = ${personId} and withdrawn_at is null`,
  );
  const row = found.rows[0];
  if (!row) throw new HttpProblem("not_found");
  return row;
}

/** One page of a person's tests, the latest specimen first. */
export async function listTests(
  tx: Tx,
  personId: string,
  query: { page: number; pageSize: number },
): Promise<{ rows: Record<string, unknown>[]; total: number }> {
  const where = sql`person_id = ${personId} and withdrawn_at is null`;
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.test_result where ${where}`,
  );
  const found = await tx.execute(
    sql`select id, specimen_date as "specimenDate", kind, result, result_date as "resultDate",
          result_at as "resultAt", recorded_at as "recordedAt", version
        from core.test_result where ${where}
        order by specimen_date desc nulls last, recorded_at desc
        limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return { rows: found.rows, total: total.rows[0]?.count ?? 0 };
}
