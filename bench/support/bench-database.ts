import { randomUUID } from "node:crypto";
import pg from "pg";
import { generateOutbreak } from "../../drizzle/seed/generator/generate-outbreak.ts";
import { loadOutbreak } from "../../drizzle/seed/load-outbreak.ts";
import { dayIn, now } from "../../server/clock.ts";
import { loadSecrets } from "../../server/config/secrets.ts";
import { migrate } from "../../server/db/migrate.ts";
import { hashPassword } from "../../server/features/session/password.ts";
import { createKeyRing, type KeyRing } from "../../server/identity/keys.ts";
import type { Role } from "../../shared/roles.ts";
import { BenchClient } from "./http-client.ts";

const PASSWORD = "only for measuring, never kept";
/**
 * Last day of every outbreak that is measured: today in the zone of its investigation, so that the
 * due lists hold what a running outbreak has. Runs of different days differ in dates only.
 */
export const LAST_DAY = dayIn("UTC", now());
const SETTINGS = {
  monitoringDays: 14,
  infectiousBefore: 2,
  infectiousAfter: 10,
  incubationMin: 2,
  incubationMax: 10,
};
/** Cases a tracer holds: a day's work, not a third of an outbreak. */
export const HELD_CASES = 60;

/** A migrated database of its own and an administrator's connection to it. */
export interface BenchDatabase {
  url: string;
  keys: KeyRing;
  client: pg.Client;
}

/** Makes a database anew under a name; the caller ends its connection. */
export async function makeDatabase(
  clusterUrl: string,
  name: string,
  folder: string,
): Promise<BenchDatabase> {
  const admin = new pg.Client({ connectionString: clusterUrl });
  await admin.connect();
  await admin.query(`drop database if exists ${name} with (force)`);
  await admin.query(`create database ${name}`);
  await admin.end();
  const url = new URL(clusterUrl);
  url.pathname = `/${name}`;
  const secrets = loadSecrets(folder);
  await migrate(url.toString(), secrets.logins);
  const client = new pg.Client({ connectionString: url.toString() });
  await client.connect();
  return { url: url.toString(), keys: createKeyRing(secrets.masterKey), client };
}

/** Makes accounts, signed in to as `<name>@bench.example`; gives their ids in the same order. */
export async function makeAccounts(
  { client }: BenchDatabase,
  names: readonly string[],
): Promise<string[]> {
  const hash = await hashPassword(PASSWORD);
  const ids: string[] = [];
  for (const name of names) {
    const id = randomUUID();
    await client.query(
      "insert into auth.account (id, email, display_name, password_hash) values ($1, $2, $3, $4)",
      [id, `${name}@bench.example`, name, hash],
    );
    ids.push(id);
  }
  return ids;
}

/**
 * An outbreak from the seeded generator; a large one runs for more than a year.
 *
 * @param followUpChecks true: with the daily checks of its contacts, else without any
 */
export function benchOutbreak(seed: number, people: number, followUpChecks = false) {
  return generateOutbreak({
    seed,
    people,
    days: people >= 100_000 ? 400 : 35,
    lastDay: LAST_DAY,
    tracers: ["first", "second", "third"],
    pairsPerPerson: 3,
    followUpChecks,
    ...SETTINGS,
  });
}

/**
 * Stores a generated outbreak as an investigation of its own, encrypted as in use.
 *
 * @param accounts who is a member with which role; the tracer holds some cases
 * @returns id of the investigation
 */
export async function storeOutbreak(
  { client, keys }: BenchDatabase,
  name: string,
  outbreak: ReturnType<typeof benchOutbreak>,
  accounts: Readonly<Record<"tracer" | "supervisor", string> & Partial<Record<Role, string>>>,
): Promise<string> {
  const id = randomUUID();
  await client.query("begin");
  await client.query(
    `insert into core.investigation (id, name, invented, time_zone, country_code, population_at_risk,
       infectious_before, infectious_after, incubation_min, incubation_max, monitoring_days)
     values ($1, $2, true, 'UTC', 'GB', $3, 2, 10, 2, 10, 14)`,
    [id, name, outbreak.story.populationAtRisk],
  );
  const wrapped = keys.wrapFresh(id);
  await client.query(
    "insert into identity.data_key (investigation_id, wrapped_key) values ($1, $2)",
    [id, wrapped],
  );
  for (const [role, account] of Object.entries(accounts)) {
    await client.query(
      "insert into core.member (id, investigation_id, account_id, role) values ($1, $2, $3, $4)",
      [randomUUID(), id, account, role],
    );
  }
  await loadOutbreak(
    {
      client,
      keys: keys.unwrap(id, wrapped),
      investigationId: id,
      accounts: new Map([["first", accounts.tracer]]),
      country: "GB",
    },
    outbreak,
  );
  await client.query(
    "update core.person set assigned_account_id = null where investigation_id = $1",
    [id],
  );
  await client.query(
    `update core.person set assigned_account_id = $2 where id in (
       select id from core.person where investigation_id = $1
         and classification in ('confirmed', 'probable', 'suspected') order by id limit $3)`,
    [id, accounts.tracer, HELD_CASES],
  );
  await client.query("commit");
  return id;
}

/** Signs in over HTTP as one of the accounts. */
export async function signIn(origin: string, name: string): Promise<BenchClient> {
  const client = new BenchClient(origin);
  await client.call("POST", "/api/session", { email: `${name}@bench.example`, password: PASSWORD });
  return client;
}
