import { sql } from "drizzle-orm";
import type { SymptomList } from "../../../../shared/contracts/settings.ts";
import type { Tx } from "../../../db/with-tx.ts";

/** Checks that tell of a symptom which a list does not have. */
export async function countChecksOutside(
  tx: Tx,
  investigationId: string,
  symptoms: SymptomList,
): Promise<number> {
  // Codes are letters, digits and underscores by contract, so they need no quoting.
  const codes = sql.param(`{${symptoms.map((one) => one.code).join(",")}}`);
  const found = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.follow_check k
        where k.investigation_id = ${investigationId} and k.withdrawn_at is null
          and not (k.symptom_codes <@ ${codes}::text[])`,
  );
  return found.rows[0]?.count ?? 0;
}

/** Tables whose rows stand on the local day of their entry. */
const ENTERED = ["person", "exposure", "interview", "test_result", "classification"] as const;

/**
 * Entries (people, tellings, interviews, tests, classifications) whose day of entry is another one
 * in another zone. "As of" a day counts by it.
 */
export async function countEntriesMoved(
  tx: Tx,
  investigationId: string,
  from: string,
  to: string,
): Promise<number> {
  const parts = ENTERED.map(
    (table) => sql`(select count(*) from ${sql.identifier("core")}.${sql.identifier(table)} t
      where t.investigation_id = ${investigationId}
        and (t.recorded_at at time zone ${from})::date <> (t.recorded_at at time zone ${to})::date)`,
  );
  const found = await tx.execute<{ count: number }>(
    sql`select (${sql.join(parts, sql` + `)})::int as count`,
  );
  return found.rows[0]?.count ?? 0;
}
