import { sql } from "drizzle-orm";
import type { PracticeReset } from "../../../../shared/contracts/settings.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { HttpProblem, invalid } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";
import type { KeyRing } from "../../../identity/keys.ts";
import { loadSettings, type SettingsRow } from "../settings-store.ts";
import { fillActing, lockPractice } from "./open-practice.ts";

/**
 * Empties a practice investigation and fills it again. Settings, members and the access record stay;
 * the database's function refuses whatever is not for practice.
 *
 * @returns the settings in force
 * @throws HttpProblem not_practice; stale_version; invalid when the name typed is another one
 */
export async function resetPractice(
  tx: Tx,
  ring: KeyRing,
  actor: Actor,
  input: PracticeReset,
): Promise<SettingsRow> {
  await lockPractice(tx, actor.investigationId);
  const settings = await loadSettings(tx, actor.investigationId);
  if (!settings.practice) throw new HttpProblem("not_practice");
  if (input.version !== settings.version) throw new HttpProblem("stale_version");
  if (input.name !== settings.name) throw invalid({ path: "name", code: "name_differs" });
  await tx.execute(sql`select core.empty_practice()`);
  await fillActing(tx, ring, actor);
  await recordEvent(tx, {
    action: "investigation.practice_reset",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
  });
  return settings;
}
