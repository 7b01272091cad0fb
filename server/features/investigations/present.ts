import type { Investigation } from "../../../shared/contracts/investigations.ts";
import type { Role } from "../../../shared/roles.ts";
import { dayIn, now } from "../../clock.ts";
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
