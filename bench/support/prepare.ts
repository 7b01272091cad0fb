import { randomUUID } from "node:crypto";
import { resolve } from "node:path";
import pg from "pg";
import { generateOutbreak } from "../../drizzle/seed/generator/generate-outbreak.ts";
import { loadOutbreak } from "../../drizzle/seed/load-outbreak.ts";
import { loadSecrets } from "../../server/config/secrets.ts";
import { migrate } from "../../server/db/migrate.ts";
import { hashPassword } from "../../server/features/session/password.ts";
import { createKeyRing } from "../../server/identity/keys.ts";

// Fixed, so that two runs measure the same data.
const SEED = 7;
export const LAST_DAY = "2026-05-20";
export const PASSWORD = "only for measuring, never kept";
export const FOLDER = resolve(import.meta.dirname, "../../.test-data/bench");
/** Cases that the tracer holds. */
export const INTERVIEWS = 60;
export const BENCH_ROLES = ["tracer", "supervisor", "epidemiologist", "officer"] as const;
export type BenchRole = (typeof BENCH_ROLES)[number];

/** A loaded database, ready for a server. */
export interface Prepared {
  databaseUrl: string;
  investigationId: string;
  people: number;
  pairs: number;
}

/**
 * Loads a generated outbreak of about `size` people into a database of its own, encrypted as in use.
 * The first sixty cases are the tracer's.
 *
 * @param days length of the outbreak; contacts lie within it
 */
export async function prepare(clusterUrl: string, size: number, days: number): Promise<Prepared> {
  const name = `bench_${size}`;
  const admin = new pg.Client({ connectionString: clusterUrl });
  await admin.connect();
  await admin.query(`drop database if exists ${name} with (force)`);
  await admin.query(`create database ${name}`);
  await admin.end();
  const url = new URL(clusterUrl);
  url.pathname = `/${name}`;
  const secrets = loadSecrets(FOLDER);
  await migrate(url.toString(), secrets.logins);
  const keys = createKeyRing(secrets.masterKey);
  const client = new pg.Client({ connectionString: url.toString() });
  await client.connect();
  await client.query("begin");
  const accounts = new Map<string, string>();
  const hash = await hashPassword(PASSWORD);
  for (const role of BENCH_ROLES) {
    const id = randomUUID();
    await client.query(
      "insert into auth.account (id, email, display_name, password_hash) values ($1, $2, $3, $4)",
      [id, `${role}@bench.example`, role, hash],
    );
    accounts.set(role, id);
  }
  const settings = {
    monitoringDays: 14,
    infectiousBefore: 2,
    infectiousAfter: 10,
    incubationMin: 2,
    incubationMax: 10,
  };
  const outbreak = generateOutbreak({
    seed: SEED,
    people: size,
    days,
    lastDay: LAST_DAY,
    tracers: ["first", "second", "third"],
    pairsPerPerson: 3,
    followUpChecks: false,
    ...settings,
  });
  const id = randomUUID();
  await client.query(
    `insert into core.investigation (id, name, invented, time_zone, country_code, population_at_risk,
       infectious_before, infectious_after, incubation_min, incubation_max, monitoring_days)
     values ($1, 'Bench', true, 'UTC', 'GB', $2, 2, 10, 2, 10, 14)`,
    [id, outbreak.story.populationAtRisk],
  );
  const wrapped = keys.wrapFresh(id);
  await client.query(
    "insert into identity.data_key (investigation_id, wrapped_key) values ($1, $2)",
    [id, wrapped],
  );
  for (const role of BENCH_ROLES) {
    await client.query(
      "insert into core.member (id, investigation_id, account_id, role) values ($1, $2, $3, $4)",
      [randomUUID(), id, accounts.get(role), role],
    );
  }
  const tracers = new Map([["first", accounts.get("tracer") as string]]);
  await loadOutbreak(
    {
      client,
      keys: keys.unwrap(id, wrapped),
      investigationId: id,
      accounts: tracers,
      country: "GB",
    },
    outbreak,
  );
  // A tracer holds a day's work, not a third of an outbreak.
  await client.query(
    "update core.person set assigned_account_id = null where investigation_id = $1",
    [id],
  );
  await client.query(
    `update core.person set assigned_account_id = $2 where id in (
       select id from core.person where investigation_id = $1
         and classification in ('confirmed', 'probable', 'suspected') order by id limit $3)`,
    [id, accounts.get("tracer"), INTERVIEWS],
  );
  await client.query("commit");
  await client.query("analyze");
  const counts = await client.query(
    `select (select count(*) from core.person) as people, (select count(*) from core.contact_pair) as pairs`,
  );
  await client.end();
  return {
    databaseUrl: url.toString(),
    investigationId: id,
    people: Number(counts.rows[0].people),
    pairs: Number(counts.rows[0].pairs),
  };
}
