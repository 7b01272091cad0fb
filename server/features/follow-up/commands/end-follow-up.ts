import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { FollowEndInput } from "../../../../shared/contracts/follow-up.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { dayIn, now } from "../../../clock.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { announce } from "../../../events/record-graph-change.ts";
import { HttpProblem, invalid } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";
import type { InvestigationRow } from "../../investigations/store.ts";

/**
 * Records that a follow-up has ended for a reason no check can tell: refused, moved away, died, or
 * entered in error. It fills no other date: a death is recorded on the person's own page.
 *
 * @returns the id of the end
 * @throws HttpProblem not_found out of scope; invalid for somebody who is not under follow-up or
 *   whose follow-up ended before, a day in the future or one before day 0
 */
export async function endFollowUp(
  tx: Tx,
  actor: Actor,
  settings: InvestigationRow,
  personId: string,
  input: FollowEndInput,
): Promise<string> {
  const person = await tx.execute<{ current: boolean }>(
    sql`select classification = 'contact' or classification is null as current
        from core.person where id = ${personId} and withdrawn_at is null`,
  );
  const current = person.rows[0]?.current;
  if (current === undefined) throw new HttpProblem("not_found");
  const followed = await tx.execute<{ day_zero: string | null }>(
    sql`select day_zero from core.follow_up where person_id = ${personId}`,
  );
  const contact = followed.rows[0];
  if (!contact || !current) throw invalid({ path: "", code: "not_followed" });
  const today = dayIn(settings.timeZone, now());
  const day = input.day ?? today;
  if (day > today) throw invalid({ path: "day", code: "in_future" });
  // Who was no contact at all never had a day 0 either.
  if (input.reason !== "not_a_contact" && contact.day_zero !== null && day < contact.day_zero) {
    throw invalid({ path: "day", code: "before_day_zero" });
  }
  const id = randomUUID();
  const made = await tx.execute(
    sql`insert into core.follow_end (id, investigation_id, person_id, reason, day, recorded_by)
        values (${id}, ${actor.investigationId}, ${personId}, ${input.reason}, ${day},
          ${actor.accountId})
        on conflict do nothing`,
  );
  if (made.rowCount !== 1) throw invalid({ path: "", code: "already_ended" });
  await announce(tx, "people", personId);
  await recordEvent(tx, {
    action: "follow_up.ended",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    personIds: [personId],
    fields: input.day === null ? ["reason"] : ["reason", "day"],
  });
  return id;
}
