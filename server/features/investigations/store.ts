import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { InvestigationInput } from "../../../shared/contracts/investigations.ts";
import {
  DEFAULT_EXPOSURE_GRADING,
  DEFAULT_SYMPTOMS,
  type ExposureGrading,
  type SettingTexts,
  type SymptomList,
} from "../../../shared/contracts/settings.ts";
import type { Role } from "../../../shared/roles.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { KeyRing } from "../../identity/keys.ts";

/** An investigation's row as handlers use it. */
export interface InvestigationRow {
  id: string;
  name: string;
  invented: boolean;
  timeZone: string;
  countryCode: string;
  populationAtRisk: number | null;
  infectiousBefore: number;
  infectiousAfter: number;
  incubationMin: number;
  incubationMax: number;
  monitoringDays: number;
  /** Due days in a row without being reached after which a contact counts as lost. */
  lostAfterDays: number;
  clusterWindowDays: number;
  clusterMinimumCases: number;
  /** Null: twice the longest incubation. */
  closureDays: number | null;
  smallCellThreshold: number;
  exposureGrading: ExposureGrading;
  symptoms: SymptomList;
  texts: SettingTexts;
  practice: boolean;
  caseDefinitionVersion: number;
  graphVersion: number;
  version: number;
}

const quoted = (value: unknown) => `'${JSON.stringify(value).replaceAll("'", "''")}'::jsonb`;

const COLUMNS = sql.raw(`id, name, invented, time_zone as "timeZone", country_code as "countryCode",
  population_at_risk as "populationAtRisk", infectious_before as "infectiousBefore",
  infectious_after as "infectiousAfter", incubation_min as "incubationMin",
  incubation_max as "incubationMax", monitoring_days as "monitoringDays",
  lost_after_days as "lostAfterDays", cluster_window_days as "clusterWindowDays",
  cluster_minimum_cases as "clusterMinimumCases", closure_days as "closureDays",
  small_cell_threshold as "smallCellThreshold",
  coalesce(exposure_grading, ${quoted(DEFAULT_EXPOSURE_GRADING)}) as "exposureGrading",
  coalesce(symptoms, ${quoted(DEFAULT_SYMPTOMS)}) as "symptoms", texts, practice,
  case_definition_version as "caseDefinitionVersion", graph_version::float8 as "graphVersion", version`);

/** The acting investigation with its settings. Row security lets no other one through. */
export async function loadInvestigation(tx: Tx, id: string): Promise<InvestigationRow> {
  const found = await tx.execute<InvestigationRow & Record<string, unknown>>(
    sql`select ${COLUMNS} from core.investigation where id = ${id}`,
  );
  const row = found.rows[0];
  if (!row) throw new Error("no investigation in this context");
  return row;
}

/** Investigations by id, for the accounts login. */
export async function listInvestigations(
  tx: Tx,
  ids: readonly string[],
): Promise<InvestigationRow[]> {
  const found = await tx.execute<InvestigationRow & Record<string, unknown>>(
    sql`select ${COLUMNS} from core.investigation
        where id = any (${sql.param(`{${ids.join(",")}}`)}::uuid[]) order by recorded_at, id`,
  );
  return found.rows;
}

/** Makes an investigation with its data key, case definition and first member (accounts login). */
export async function insertInvestigation(
  tx: Tx,
  keys: KeyRing,
  input: InvestigationInput & { invented: boolean },
  accountId: string,
  roles: readonly Role[],
): Promise<string> {
  const id = randomUUID();
  await tx.execute(
    sql`insert into core.investigation (id, name, invented, time_zone, country_code, population_at_risk,
        infectious_before, infectious_after, incubation_min, incubation_max, monitoring_days, practice,
        recorded_by)
      values (${id}, ${input.name}, ${input.invented}, ${input.timeZone}, ${input.countryCode},
        ${input.populationAtRisk}, ${input.infectiousBefore}, ${input.infectiousAfter},
        ${input.incubationMin}, ${input.incubationMax}, ${input.monitoringDays}, ${input.practice},
        ${accountId})`,
  );
  await tx.execute(
    sql`insert into core.case_definition (id, investigation_id, number, wording, recorded_by)
        values (${randomUUID()}, ${id}, 1, ${input.caseDefinition}, ${accountId})`,
  );
  await tx.execute(
    sql`insert into identity.data_key (investigation_id, wrapped_key) values (${id}, ${keys.wrapFresh(id)})`,
  );
  for (const role of roles) {
    await tx.execute(
      sql`insert into core.member (id, investigation_id, account_id, role, recorded_by)
          values (${randomUUID()}, ${id}, ${accountId}, ${role}, ${accountId})`,
    );
  }
  return id;
}
