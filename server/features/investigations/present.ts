import type { Investigation } from "../../../shared/contracts/investigations.ts";
import type { Settings } from "../../../shared/contracts/settings.ts";
import type { Role } from "../../../shared/roles.ts";
import { dayIn, now } from "../../clock.ts";
import type { SettingsRow } from "./settings-store.ts";
import type { InvestigationRow } from "./store.ts";

/** An investigation as its members see it; `today` is the local day in its own zone. */
export function presentInvestigation(row: InvestigationRow, roles: readonly Role[]): Investigation {
  return {
    id: row.id,
    name: row.name,
    invented: row.invented,
    practice: row.practice,
    timeZone: row.timeZone,
    countryCode: row.countryCode,
    today: dayIn(row.timeZone, now()),
    populationAtRisk: row.populationAtRisk,
    infectiousBefore: row.infectiousBefore,
    infectiousAfter: row.infectiousAfter,
    incubationMin: row.incubationMin,
    incubationMax: row.incubationMax,
    monitoringDays: row.monitoringDays,
    caseDefinitionVersion: row.caseDefinitionVersion,
    graphVersion: row.graphVersion,
    version: row.version,
    roles: [...roles],
  };
}

/** Days without a new case after which a cluster counts as quiet (methods A.6: default Q). */
export function closureDaysOf(row: Pick<SettingsRow, "closureDays" | "incubationMax">): number {
  return row.closureDays ?? 2 * row.incubationMax;
}

/** The settings in force, every one of them. */
export function presentSettings(row: SettingsRow): Settings {
  return {
    name: row.name,
    invented: row.invented,
    timeZone: row.timeZone,
    countryCode: row.countryCode,
    populationAtRisk: row.populationAtRisk,
    caseDefinition: row.caseDefinition,
    caseRules: row.caseRules,
    incubationMin: row.incubationMin,
    incubationMax: row.incubationMax,
    infectiousBefore: row.infectiousBefore,
    infectiousAfter: row.infectiousAfter,
    monitoringDays: row.monitoringDays,
    clusterWindowDays: row.clusterWindowDays,
    clusterMinimumCases: row.clusterMinimumCases,
    closureDays: row.closureDays,
    lostAfterDays: row.lostAfterDays,
    smallCellThreshold: row.smallCellThreshold,
    exposureGrading: row.exposureGrading,
    symptoms: row.symptoms,
    texts: row.texts,
    practice: row.practice,
    caseDefinitionVersion: row.caseDefinitionVersion,
    closureDaysInForce: closureDaysOf(row),
    today: dayIn(row.timeZone, now()),
    version: row.version,
  };
}
