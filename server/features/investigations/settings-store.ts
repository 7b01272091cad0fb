import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import {
  type CaseRules,
  DEFAULT_CASE_RULES,
  type SettingChange,
  type SettingKey,
} from "../../../shared/contracts/settings.ts";
import type { Role } from "../../../shared/roles.ts";
import { savepoint, type Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import { sqlState } from "../../http/translate-error.ts";
import { type InvestigationRow, loadInvestigation } from "./store.ts";

/** The settings in force: an investigation's row with the case definition that its version names. */
export interface SettingsRow extends InvestigationRow {
  caseDefinition: string;
  caseRules: CaseRules;
}

/** The settings of the acting investigation. */
export async function loadSettings(tx: Tx, id: string): Promise<SettingsRow> {
  const row = await loadInvestigation(tx, id);
  const found = await tx.execute<{ wording: string; rules: CaseRules | null }>(
    sql`select wording, rules from core.case_definition
        where investigation_id = ${id} and number = ${row.caseDefinitionVersion}`,
  );
  const [definition] = found.rows;
  return {
    ...row,
    caseDefinition: definition?.wording ?? "",
    caseRules: definition?.rules ?? DEFAULT_CASE_RULES,
  };
}

/** Columns of settings that stand in the investigation's own row; JSON where `true`. */
const COLUMNS: Partial<Record<SettingKey, readonly [column: string, json?: true]>> = {
  name: ["name"],
  invented: ["invented"],
  timeZone: ["time_zone"],
  countryCode: ["country_code"],
  populationAtRisk: ["population_at_risk"],
  incubationMin: ["incubation_min"],
  incubationMax: ["incubation_max"],
  infectiousBefore: ["infectious_before"],
  infectiousAfter: ["infectious_after"],
  monitoringDays: ["monitoring_days"],
  clusterWindowDays: ["cluster_window_days"],
  clusterMinimumCases: ["cluster_minimum_cases"],
  closureDays: ["closure_days"],
  lostAfterDays: ["lost_after_days"],
  smallCellThreshold: ["small_cell_threshold"],
  exposureGrading: ["exposure_grading", true],
  symptoms: ["symptoms", true],
  texts: ["texts", true],
};

/**
 * Writes changed settings under the version they were made on.
 *
 * @returns false when somebody changed the investigation meanwhile
 */
export async function writeSettings(
  tx: Tx,
  actor: Actor,
  version: number,
  after: SettingsRow,
  changed: readonly SettingKey[],
): Promise<boolean> {
  const sets = [sql`version = version + 1`];
  for (const key of changed) {
    const column = COLUMNS[key];
    if (!column) continue;
    const value = after[key];
    const written = column[1] ? sql`${JSON.stringify(value)}::jsonb` : sql`${value}`;
    sets.push(sql`${sql.identifier(column[0])} = ${written}`);
  }
  const redefined = changed.includes("caseDefinition") || changed.includes("caseRules");
  if (redefined) sets.push(sql`case_definition_version = case_definition_version + 1`);
  const done = await tx.execute<{ number: number }>(
    sql`update core.investigation set ${sql.join(sets, sql`, `)}
        where id = ${actor.investigationId} and version = ${version}
        returning case_definition_version as number`,
  );
  const [row] = done.rows;
  if (!row) return false;
  if (redefined) {
    await tx.execute(
      sql`insert into core.case_definition (id, investigation_id, number, wording, rules, recorded_by)
          values (${randomUUID()}, ${actor.investigationId}, ${row.number}, ${after.caseDefinition},
            ${JSON.stringify(after.caseRules)}::jsonb, ${actor.accountId})`,
    );
  }
  return true;
}

/** Keeps what a change of settings changed, under the version that it made. */
export async function insertSettingChange(
  tx: Tx,
  actor: Actor,
  version: number,
  changes: readonly { setting: SettingKey; from: unknown; to: unknown }[],
): Promise<void> {
  await tx.execute(
    sql`insert into core.setting_change (id, investigation_id, version, changes, recorded_by)
        values (${randomUUID()}, ${actor.investigationId}, ${version},
          ${JSON.stringify(changes)}::jsonb, ${actor.accountId})`,
  );
}

/** One page of the changes of settings, the newest first; who made them where the role may know. */
export async function listSettingChanges(
  tx: Tx,
  role: Role,
  query: { page: number; pageSize: number },
): Promise<{ items: SettingChange[]; total: number }> {
  const by =
    role === "supervisor" || role === "officer"
      ? sql`(select m.display_name from views.member m where m.account_id = c.recorded_by limit 1)`
      : sql`null`;
  const counted = await tx.execute<{ total: number }>(
    sql`select count(*)::int as total from core.setting_change`,
  );
  const found = await tx.execute<SettingChange & Record<string, unknown>>(
    sql`select c.id, c.version, c.recorded_at as "recordedAt", ${by} as by, c.changes
        from core.setting_change c order by c.version desc
        limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return { items: found.rows, total: counted.rows[0]?.total ?? 0 };
}

/** One page of the versions of the case definition, the newest first. */
export async function listCaseDefinitions(tx: Tx, query: { page: number; pageSize: number }) {
  const counted = await tx.execute<{ total: number }>(
    sql`select count(*)::int as total from core.case_definition`,
  );
  const found = await tx.execute<{
    number: number;
    wording: string;
    rules: CaseRules | null;
    recordedAt: string;
  }>(
    sql`select number, wording, rules, recorded_at as "recordedAt" from core.case_definition
        order by number desc limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return {
    items: found.rows.map((row) => ({ ...row, rules: row.rules ?? DEFAULT_CASE_RULES })),
    total: counted.rows[0]?.total ?? 0,
  };
}

/** True when the database knows a time zone too: its list and the runtime's are not the same. */
export async function databaseKnowsZone(tx: Tx, zone: string): Promise<boolean> {
  const asked = await savepoint(tx, () => tx.execute(sql`select now() at time zone ${zone}`));
  if (asked.ok) return true;
  if (sqlState(asked.error) !== "22023") throw asked.error;
  return false;
}

/** True while an account of the demo is a member of the acting investigation. */
export async function hasDemoMembers(tx: Tx): Promise<boolean> {
  const found = await tx.execute<{ demo: boolean }>(sql`select core.has_demo_members() as demo`);
  return found.rows[0]?.demo === true;
}
