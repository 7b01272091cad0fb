import type { SettingsPatch } from "../../../../shared/contracts/settings.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { announce } from "../../../events/record-graph-change.ts";
import { HttpProblem } from "../../../http/problem.ts";
import type { Actor } from "../../../http/route.ts";
import { planChange } from "../change-of-settings.ts";
import {
  insertSettingChange,
  loadSettings,
  type SettingsRow,
  writeSettings,
} from "../settings-store.ts";

/**
 * Changes settings under the version they were read at: a new version, a row that says what was
 * changed, a new version of the case definition where its wording or rules changed, and one event
 * that names the fields. Nothing happens when nothing differs. Classifications stay as they are.
 *
 * @returns the settings in force
 * @throws HttpProblem stale_version; invalid with the fields that do not go together
 */
export async function changeSettings(
  tx: Tx,
  actor: Actor,
  patch: SettingsPatch,
): Promise<SettingsRow> {
  const change = await planChange(tx, await loadSettings(tx, actor.investigationId), patch);
  const { before, after, changed } = change;
  if (changed.length === 0) return before;
  if (!(await writeSettings(tx, actor, patch.version, after, changed))) {
    throw new HttpProblem("stale_version");
  }
  await insertSettingChange(
    tx,
    actor,
    patch.version + 1,
    changed.map((setting) => ({ setting, from: before[setting], to: after[setting] })),
  );
  await announce(tx, "settings", null);
  await recordEvent(tx, {
    action: "investigation.changed",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    fields: changed,
  });
  return loadSettings(tx, actor.investigationId);
}
