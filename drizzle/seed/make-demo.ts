import { randomBytes, randomUUID } from "node:crypto";
import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import pg from "pg";
import { dayIn, now, shiftDay } from "../../server/clock.ts";
import type { Pools } from "../../server/db/pools.ts";
import { hashPassword, verifyPassword } from "../../server/features/session/password.ts";
import type { KeyRing } from "../../server/identity/keys.ts";
import type { Role } from "../../shared/roles.ts";
import { generateOutbreak } from "./generator/generate-outbreak.ts";
import { loadOutbreak } from "./load-outbreak.ts";

const SEED = 18;
const ZONE = "UTC";
const SETTINGS = {
  monitoringDays: 14,
  infectiousBefore: 2,
  infectiousAfter: 10,
  incubationMin: 2,
  incubationMax: 10,
};
const ROLE_ACCOUNTS: Record<Role, string> = {
  tracer: "Demo tracer",
  supervisor: "Demo supervisor",
  epidemiologist: "Demo epidemiologist",
  officer: "Demo data officer",
};
/** Colleagues who are assigned work in the story; nobody can sign in as them. */
const COLLEAGUES = ["Second tracer", "Third tracer"];

const emailOf = (name: string) => `${name}@strandline.example`;

interface DemoOptions {
  databaseUrl: string;
  dataDir: string;
  pools: Pools;
  keys: KeyRing;
  /** Password of the demo accounts; one is made and kept in the data folder when not given. */
  password: string | undefined;
}

function passwordFile(dataDir: string): string {
  return join(dataDir, "demo-password");
}

/** The demo password: the one given, else the one made at the first start. */
function demoPassword(dataDir: string, given: string | undefined): string {
  if (given) return given;
  const file = passwordFile(dataDir);
  if (existsSync(file)) return readFileSync(file, "utf8").trim();
  const made = randomBytes(12).toString("base64url");
  writeFileSync(file, `${made}\n`, { mode: 0o600 });
  return made;
}

/** Lines that name the demo accounts at start. */
export function demoNotice(dataDir: string, given: string | undefined): string {
  const password = given ? "the one in STRANDLINE_DEMO_PASSWORD" : demoPassword(dataDir, given);
  const accounts = Object.keys(ROLE_ACCOUNTS).map((role) => `  ${emailOf(role)}`);
  return `Demo accounts (invented data, this machine only):\n${accounts.join("\n")}\n  password: ${password}\n`;
}

/** The last day of the story: today when the working day has begun, else yesterday evening. */
function storyEnd(): { lastDay: string; lastMinute: number } {
  const instant = now();
  const minute = instant.getUTCHours() * 60 + instant.getUTCMinutes();
  const today = dayIn(ZONE, instant);
  return minute < 9 * 60
    ? { lastDay: shiftDay(today, -1), lastMinute: 18 * 60 }
    : { lastDay: today, lastMinute: Math.min(minute, 18 * 60) };
}

/** Makes the password named at this start the one that signs in, if it is not already. */
async function takeOverPassword(pools: Pools, password: string): Promise<void> {
  const emails = Object.keys(ROLE_ACCOUNTS).map(emailOf);
  const found = await pools.auth.query<{ password_hash: string }>(
    "select password_hash from auth.account where demo and email = any ($1)",
    [emails],
  );
  const stored = found.rows[0]?.password_hash;
  if (!stored || (await verifyPassword(stored, password))) return;
  await pools.auth.query(
    "update auth.account set password_hash = $1, epoch = epoch + 1 where demo and email = any ($2)",
    [await hashPassword(password), emails],
  );
}

/**
 * Makes the demo once: four accounts, two colleagues, and the invented investigation with its
 * outbreak. At later starts only a changed password is taken over.
 */
export async function makeDemo(options: DemoOptions): Promise<void> {
  const { pools, keys, databaseUrl } = options;
  const password = demoPassword(options.dataDir, options.password);
  const known = await pools.auth.query("select value from auth.meta where key = 'demo'");
  if (known.rowCount) {
    await takeOverPassword(pools, password);
    return;
  }
  const hash = await hashPassword(password);
  const locked = await hashPassword(randomBytes(32).toString("base64"));
  const client = new pg.Client({ connectionString: databaseUrl });
  client.on("error", () => {});
  await client.connect();
  try {
    await client.query("begin");
    const accounts = new Map<Role, string>();
    const tracers = new Map<string, string>();
    const addAccount = async (email: string, name: string, passwordHash: string) => {
      const id = randomUUID();
      await client.query(
        "insert into auth.account (id, email, display_name, password_hash, demo) values ($1, $2, $3, $4, true)",
        [id, email, name, passwordHash],
      );
      return id;
    };
    for (const [role, name] of Object.entries(ROLE_ACCOUNTS) as [Role, string][]) {
      accounts.set(role, await addAccount(emailOf(role), name, hash));
    }
    tracers.set("first", accounts.get("tracer") as string);
    for (const [index, name] of COLLEAGUES.entries()) {
      tracers.set(name, await addAccount(emailOf(`tracer${index + 2}`), name, locked));
    }
    const { lastDay, lastMinute } = storyEnd();
    const outbreak = generateOutbreak({
      seed: SEED,
      lastDay,
      lastMinute,
      tracers: [...tracers.keys()],
      ...SETTINGS,
    });
    const id = randomUUID();
    await client.query(
      `insert into core.investigation (id, name, invented, time_zone, country_code, population_at_risk,
         infectious_before, infectious_after, incubation_min, incubation_max, monitoring_days, recorded_by)
       values ($1, $2, true, $3, 'GB', $4, $5, $6, $7, $8, $9, $10)`,
      [
        id,
        `${outbreak.story.place}: ${outbreak.story.illness}`,
        ZONE,
        outbreak.story.populationAtRisk,
        SETTINGS.infectiousBefore,
        SETTINGS.infectiousAfter,
        SETTINGS.incubationMin,
        SETTINGS.incubationMax,
        SETTINGS.monitoringDays,
        accounts.get("supervisor"),
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
    const members: [string, Role][] = [...accounts].map(([role, account]) => [account, role]);
    for (const name of COLLEAGUES) members.push([tracers.get(name) as string, "tracer"]);
    for (const [account, role] of members) {
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
        accounts: tracers,
        country: "GB",
      },
      outbreak,
    );
    await client.query("insert into auth.meta (key, value) values ('demo', $1)", [id]);
    await client.query("commit");
    await client.query("analyze");
  } catch (error) {
    await client.query("rollback").catch(() => {});
    throw error;
  } finally {
    await client.end();
  }
}
