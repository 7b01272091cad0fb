import { sql } from "drizzle-orm";
import { recordEvent } from "../../../audit/record-event.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { announce } from "../../../events/record-graph-change.ts";
import { HttpProblem } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";

/**
 * Takes back a check that was entered by mistake: it stays on record and counts no more. Which
 * checks may be reached is said by row security.
 *
 * @throws HttpProblem not_found when it is out of scope, another person's, or taken back already
 */
export async function withdrawCheck(
  tx: Tx,
  actor: Actor,
  personId: string,
  checkId: string,
): Promise<null> {
  const done = await tx.execute(
    sql`update core.follow_check set withdrawn_at = now()
        where id = ${checkId} and person_id = ${personId} and withdrawn_at is null`,
  );
  if (done.rowCount !== 1) throw new HttpProblem("not_found");
  await announce(tx, "people", personId);
  await recordEvent(tx, {
    action: "follow_check.withdrawn",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    personIds: [personId],
  });
  return null;
}
