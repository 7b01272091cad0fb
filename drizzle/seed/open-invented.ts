import { randomUUID } from "node:crypto";
import type pg from "pg";
import type { InvestigationKeys, KeyRing } from "../../server/identity/keys.ts";
import type { EventName } from "../../shared/events.ts";
import type { Role } from "../../shared/roles.ts";

/**
 * Settings of invented investigations. An incubation of at most 10 days makes a cluster ready to be
 * closed after 20 quiet days, for which a story of 35 days has room.
 */
export const STORY_SETTINGS = {
  monitoringDays: 14,
  infectiousBefore: 2,
  infectiousAfter: 10,
  incubationMin: 2,
  incubationMax: 10,
} as const;
/** A week, and five cases: proposed clusters then stay apart from each other, and few. */
export const STORY_CLUSTERS = { windowDays: 7, minimumCases: 5 } as const;

const GIVEN: EventName = "member.added";

export const STORY_ZONE = "UTC";
export const STORY_COUNTRY = "GB";

export interface InventedInvestigation {
  name: string;
  populationAtRisk: number;
  /** Account it is recorded as opened by. */
  openedBy: string | null;
  members: readonly { accountId: string; role: Role; teamId?: string | undefined }[];
  teams?: readonly { id: string; name: string }[];
}

/**
 * Opens an empty investigation marked invented, with its data key, case definition, teams and
 * members, as an administrator. Runs inside the caller's transaction.
 */
export async function openInvented(
  client: pg.ClientBase,
  keys: KeyRing,
  input: InventedInvestigation,
): Promise<{ id: string; keys: InvestigationKeys }> {
  const id = randomUUID();
  const settings = STORY_SETTINGS;
  await client.query(
    `insert into core.investigation (id, name, invented, time_zone, country_code, population_at_risk,
       infectious_before, infectious_after, incubation_min, incubation_max, monitoring_days,
       cluster_window_days, cluster_minimum_cases, recorded_by)
     values ($1, $2, true, $3, $4, $5, $6, $7, $8, $9, $10, $11, $12, $13)`,
    [
      id,
      input.name,
      STORY_ZONE,
      STORY_COUNTRY,
      input.populationAtRisk,
      settings.infectiousBefore,
      settings.infectiousAfter,
      settings.incubationMin,
      settings.incubationMax,
      settings.monitoringDays,
      STORY_CLUSTERS.windowDays,
      STORY_CLUSTERS.minimumCases,
      input.openedBy,
    ],
  );
  await client.query(
    "insert into core.case_definition (id, investigation_id, number, wording) values ($1, $2, 1, $3)",
    [
      randomUUID(),
      id,
      "Invented. Suspected: fever with shore rash. Probable: and a link to a confirmed case. Confirmed: and a positive test.",
    ],
  );
  const wrapped = keys.wrapFresh(id);
  await client.query(
    "insert into identity.data_key (investigation_id, wrapped_key) values ($1, $2)",
    [id, wrapped],
  );
  for (const team of input.teams ?? []) {
    await client.query("insert into core.team (id, investigation_id, name) values ($1, $2, $3)", [
      team.id,
      id,
      team.name,
    ]);
  }
  for (const member of input.members) {
    await client.query(
      "insert into core.member (id, investigation_id, account_id, role, team_id) values ($1, $2, $3, $4, $5)",
      [randomUUID(), id, member.accountId, member.role, member.teamId ?? null],
    );
    // Nobody signed in gave the role: the event has no account, and names the role as others do.
    await client.query(
      "insert into audit.event (investigation_id, action, fields) values ($1, $2, $3)",
      [id, GIVEN, [`role:${member.role}`]],
    );
  }
  return { id, keys: keys.unwrap(id, wrapped) };
}
