import { sql } from "drizzle-orm";
import type { CheckOutcome } from "../../../shared/vocabulary.ts";
import type { Tx } from "../../db/with-tx.ts";

/** A check as states are derived from it. */
export interface CheckRow {
  personId: string;
  day: string;
  outcome: CheckOutcome;
  symptoms: "yes" | "no" | "unknown" | "refused" | null;
  recordedAt: string;
}

/** Checks by person, oldest first, as far as row security shows them. */
export async function checksOf(
  tx: Tx,
  personIds: readonly string[],
): Promise<Map<string, CheckRow[]>> {
  const checks = new Map<string, CheckRow[]>(personIds.map((id) => [id, []]));
  if (personIds.length === 0) return checks;
  const found = await tx.execute<CheckRow & Record<string, unknown>>(
    sql`select person_id as "personId", day, outcome, symptoms, recorded_at as "recordedAt"
        from core.follow_check
        where person_id = any (${sql.param(`{${personIds.join(",")}}`)}::uuid[])
          and withdrawn_at is null
        order by day, recorded_at, id`,
  );
  for (const row of found.rows) checks.get(row.personId)?.push(row);
  return checks;
}
