import { sql } from "drizzle-orm";
import { recordEvent } from "../../../audit/record-event.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { announce } from "../../../events/record-graph-change.ts";
import { HttpProblem } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";

/**
 * Takes back the end of a follow-up, which is thereby open again. The end stays on record with who
 * took it back and when. Which ends may be reached is said by row security.
 *
 * @throws HttpProblem not_found when it is out of scope, another person's, or taken back already
 */
export async function reopenFollowUp(
  tx: Tx,
  actor: Actor,
  personId: string,
  endId: string,
): Promise<null> {
  const done = await tx.execute(
    sql`update core.follow_end set withdrawn_at = now(), withdrawn_by = ${actor.accountId}
        where id = ${endId} and person_id = ${personId} and withdrawn_at is null`,
  );
  if (done.rowCount !== 1) throw new HttpProblem("not_found");
  await announce(tx, "people", personId);
  await recordEvent(tx, {
    action: "follow_up.reopened",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    personIds: [personId],
  });
  return null;
}
