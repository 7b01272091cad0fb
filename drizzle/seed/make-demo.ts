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
import { openInvented, STORY_COUNTRY, STORY_SETTINGS, STORY_ZONE } from "./open-invented.ts";

const SEED = 18;
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
  const today = dayIn(STORY_ZONE, instant);
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
      ...STORY_SETTINGS,
    });
    const roles: [string, Role][] = [...accounts].map(([role, account]) => [account, role]);
    for (const name of COLLEAGUES) roles.push([tracers.get(name) as string, "tracer"]);
    const opened = await openInvented(client, keys, {
      name: `${outbreak.story.place}: ${outbreak.story.illness}`,
      populationAtRisk: outbreak.story.populationAtRisk,
      openedBy: accounts.get("supervisor") ?? null,
      members: roles.map(([accountId, role]) => ({ accountId, role })),
    });
    await loadOutbreak(
      {
        client,
        keys: opened.keys,
        investigationId: opened.id,
        accounts: tracers,
        country: STORY_COUNTRY,
      },
      outbreak,
    );
    await client.query("insert into auth.meta (key, value) values ('demo', $1)", [opened.id]);
    await client.query("commit");
    await client.query("analyze");
  } catch (error) {
    await client.query("rollback").catch(() => {});
    throw error;
  } finally {
    await client.end();
  }
}
