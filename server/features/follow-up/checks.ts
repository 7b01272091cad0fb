import { sql } from "drizzle-orm";
import type { FollowCheck } from "../../../shared/contracts/follow-up.ts";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem } from "../../http/problem.ts";
import type { Actor } from "../../http/route.ts";
import { checkNote } from "../../identity/check-note.ts";
import type { KeyRing } from "../../identity/keys.ts";

/**
 * One page of a person's checks, the latest first. Notes are there where the person's identity is
 * the acting person's to open, and opening them is recorded.
 *
 * @throws HttpProblem not_found when the person is out of scope
 */
export async function listChecks(
  tx: Tx,
  ring: KeyRing,
  actor: Actor,
  personId: string,
  query: { page: number; pageSize: number },
): Promise<{ items: FollowCheck[]; total: number }> {
  const person = await tx.execute<{ mine: boolean }>(
    sql`select core.ctx_may_name(id) as mine from core.person
        where id = ${personId} and withdrawn_at is null`,
  );
  const mine = person.rows[0]?.mine;
  if (mine === undefined) throw new HttpProblem("not_found");
  const where = sql`person_id = ${personId} and withdrawn_at is null`;
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.follow_check where ${where}`,
  );
  const found = await tx.execute<FollowCheck & Record<string, unknown>>(
    sql`select id, day, outcome, symptoms, symptom_codes as "symptomCodes", respondent,
          recorded_at as "recordedAt"
        from core.follow_check where ${where}
        order by day desc, recorded_at desc, id
        limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  const notes = new Map<string, string>();
  if (mine && found.rows.length > 0) {
    const keys = await ring.of(tx, actor.investigationId);
    const opened = await tx.execute<{ check_id: string; cipher: Buffer }>(
      sql`select check_id, cipher from identity.open_check_notes(${personId}::uuid)`,
    );
    for (const row of opened.rows) {
      notes.set(row.check_id, checkNote.open(keys, row.check_id, row.cipher));
    }
  }
  return {
    items: found.rows.map((row) =>
      mine ? { ...row, note: notes.get(row.id) ?? null } : { ...row },
    ),
    total: total.rows[0]?.count ?? 0,
  };
}
