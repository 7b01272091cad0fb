import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { FollowCheckInput } from "../../../../shared/contracts/follow-up.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { dayIn, now } from "../../../clock.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { announce } from "../../../events/record-graph-change.ts";
import { HttpProblem, invalid } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";
import { checkNote } from "../../../identity/check-note.ts";
import type { KeyRing } from "../../../identity/keys.ts";
import type { InvestigationRow } from "../../investigations/store.ts";
import { endsOf } from "../store.ts";

/**
 * Records one attempt to reach a contact. The day is today in the investigation's zone unless one
 * is given; the note is sealed and stands apart.
 *
 * @returns the id of the check
 * @throws HttpProblem not_found out of scope; invalid for somebody who is no contact, a day in the
 *   future, one before day 0 or after a recorded end, and a symptom that is not in the list
 */
export async function recordCheck(
  tx: Tx,
  ring: KeyRing,
  actor: Actor,
  settings: InvestigationRow,
  personId: string,
  input: FollowCheckInput,
): Promise<string> {
  const person = await tx.execute(
    sql`select 1 from core.person where id = ${personId} and withdrawn_at is null`,
  );
  if (person.rows.length === 0) throw new HttpProblem("not_found");
  const followed = await tx.execute<{ day_zero: string | null }>(
    sql`select day_zero from core.follow_up where person_id = ${personId}`,
  );
  const contact = followed.rows[0];
  if (!contact) throw invalid({ path: "", code: "not_followed" });
  const today = dayIn(settings.timeZone, now());
  const day = input.day ?? today;
  if (day > today) throw invalid({ path: "day", code: "in_future" });
  if (contact.day_zero !== null && day < contact.day_zero) {
    throw invalid({ path: "day", code: "before_day_zero" });
  }
  const end = (await endsOf(tx, [personId], settings.timeZone)).get(personId)?.standing;
  if (end && day > end.day) throw invalid({ path: "day", code: "after_end" });
  const known = new Set(settings.symptoms.map((symptom) => symptom.code));
  if (input.symptomCodes.some((code) => !known.has(code))) {
    throw invalid({ path: "symptomCodes", code: "not_in_list" });
  }
  const id = randomUUID();
  await tx.execute(
    sql`insert into core.follow_check (id, investigation_id, person_id, day, outcome, symptoms,
          symptom_codes, respondent, recorded_by)
        values (${id}, ${actor.investigationId}, ${personId}, ${day}, ${input.outcome},
          ${input.symptoms}, ${sql.param(`{${input.symptomCodes.join(",")}}`)}::text[],
          ${input.respondent}, ${actor.accountId})`,
  );
  if (input.note !== null) {
    const keys = await ring.of(tx, actor.investigationId);
    await tx.execute(
      sql`select identity.put_check_note(${id}::uuid, ${checkNote.seal(keys, id, input.note)})`,
    );
  }
  await announce(tx, "people", personId);
  await recordEvent(tx, {
    action: "follow_check.recorded",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    personIds: [personId],
    fields: Object.entries(input).flatMap(([key, value]) =>
      value === null || (Array.isArray(value) && value.length === 0) ? [] : [key],
    ),
  });
  return id;
}
