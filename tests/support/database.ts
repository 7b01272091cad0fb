import { createHash, randomBytes } from "node:crypto";
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import pg from "pg";
import { refuseTemporary } from "../../server/db/access/apply-access.ts";
import { migrate } from "../../server/db/migrate.ts";
import { LOGIN_NAMES, type LoginPasswords } from "../../server/db/roles.ts";

const ROOT = fileURLToPath(new URL("../../", import.meta.url));

/** Passwords of the logins on the private test cluster; they protect nothing. */
export const TEST_PASSWORDS = Object.fromEntries(
  LOGIN_NAMES.map((name) => [name, `only-for-tests-${name}`]),
) as LoginPasswords;

function filesBelow(folder: string): string[] {
  return readdirSync(join(ROOT, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name))
    .sort();
}

/** Name of the template: it changes with whatever the schema and the rights are made from. */
function templateName(): string {
  const hash = createHash("sha256");
  for (const folder of ["drizzle/migrations", "drizzle/access", "server/db", "shared/fields"]) {
    for (const file of filesBelow(folder)) hash.update(readFileSync(file));
  }
  hash.update(readFileSync(join(ROOT, "shared/fields.ts")));
  return `strandline_template_${hash.digest("hex").slice(0, 16)}`;
}

function urlOf(adminUrl: string, database: string): string {
  const url = new URL(adminUrl);
  url.pathname = `/${database}`;
  return url.toString();
}

async function withAdmin<T>(adminUrl: string, work: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: adminUrl });
  client.on("error", () => {});
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/** Makes the migrated template database unless it is there; several runs may ask at once. */
export async function prepareTemplate(adminUrl: string): Promise<void> {
  const name = templateName();
  await withAdmin(adminUrl, async (client) => {
    await client.query("select pg_advisory_lock(7203116)");
    const found = await client.query("select 1 from pg_database where datname = $1", [`${name}`]);
    if (found.rowCount === 0) {
      const making = `${name}_making`;
      await client.query(`drop database if exists ${making} with (force)`);
      await client.query(`create database ${making}`);
      await migrate(urlOf(adminUrl, making), TEST_PASSWORDS);
      await client.query(`alter database ${making} rename to ${name}`);
    }
    await client.query("select pg_advisory_unlock(7203116)");
  });
}

/** A database of a test file's own, copied from the template. */
export interface TestDatabase {
  adminUrl: string;
  drop: () => Promise<void>;
}

/** Copies the template into a fresh database. */
export async function createTestDatabase(clusterUrl: string): Promise<TestDatabase> {
  const name = `strandline_test_${randomBytes(6).toString("hex")}`;
  await withAdmin(clusterUrl, async (client) => {
    // Copying needs the template to itself for a moment.
    await client.query("select pg_advisory_lock(7203116)");
    await client.query(`create database ${name} template ${templateName()}`);
    await client.query("select pg_advisory_unlock(7203116)");
  });
  // Rights on the database itself are not copied with it.
  await withAdmin(urlOf(clusterUrl, name), refuseTemporary);
  return {
    adminUrl: urlOf(clusterUrl, name),
    drop: () =>
      withAdmin(clusterUrl, async (client) => {
        await client.query(`drop database if exists ${name} with (force)`);
      }),
  };
}
