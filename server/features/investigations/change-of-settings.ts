import { isDeepStrictEqual } from "node:util";
import {
  SETTING_SHAPES,
  type SettingKey,
  type SettingsPatch,
} from "../../../shared/contracts/settings.ts";
import type { FieldError } from "../../../shared/errors.ts";
import type { Tx } from "../../db/with-tx.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { hasPhoneNumbers } from "../../identity/tokens.ts";
import { databaseKnowsZone, hasDemoMembers, type SettingsRow } from "./settings-store.ts";

const KEYS = Object.keys(SETTING_SHAPES) as SettingKey[];

/** A change of settings that may be made: what they will be, and which differ from what they are. */
export interface ChangeOfSettings {
  before: SettingsRow;
  after: SettingsRow;
  /** In the order of the contract; a value that stays is none of them. */
  changed: SettingKey[];
}

/** Where the longest is below the shortest: beside the one that was changed. */
function spanError({ after, changed }: ChangeOfSettings): FieldError[] {
  if (after.incubationMin <= after.incubationMax) return [];
  const path = changed.includes("incubationMax") ? "incubationMax" : "incubationMin";
  return [{ path, code: "max_below_min" }];
}

async function inventedError(tx: Tx, { after, changed }: ChangeOfSettings): Promise<FieldError[]> {
  if (after.invented || !changed.includes("invented")) return [];
  if (after.practice) return [{ path: "invented", code: "practice_is_invented" }];
  return (await hasDemoMembers(tx)) ? [{ path: "invented", code: "demo_only" }] : [];
}

/**
 * What a patch would change, checked as a whole.
 *
 * @param before the settings now
 * @throws HttpProblem stale_version when the patch was made on another version; invalid with the
 *   fields that do not go together with the rest
 */
export async function planChange(
  tx: Tx,
  before: SettingsRow,
  patch: SettingsPatch,
): Promise<ChangeOfSettings> {
  if (patch.version !== before.version) throw new HttpProblem("stale_version");
  const asked = KEYS.filter((key) => patch[key] !== undefined);
  const given = Object.fromEntries(asked.map((key) => [key, patch[key]]));
  const change: ChangeOfSettings = {
    before,
    after: { ...before, ...given },
    changed: asked.filter((key) => !isDeepStrictEqual(patch[key], before[key])),
  };
  const errors = [...spanError(change), ...(await inventedError(tx, change))];
  if (
    change.changed.includes("timeZone") &&
    !(await databaseKnowsZone(tx, change.after.timeZone))
  ) {
    errors.push({ path: "timeZone", code: "not_a_zone" });
  }
  if (change.changed.includes("countryCode") && !hasPhoneNumbers(change.after.countryCode)) {
    errors.push({ path: "countryCode", code: "not_in_list" });
  }
  if (errors.length > 0) throw invalid(...errors);
  return change;
}

/** True when a change makes a new version of the case definition. */
export function redefinesCases(changed: readonly SettingKey[]): boolean {
  return changed.includes("caseDefinition") || changed.includes("caseRules");
}
