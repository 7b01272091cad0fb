import { fileURLToPath } from "node:url";
import { drizzle } from "drizzle-orm/node-postgres";
import { migrate as runMigrations } from "drizzle-orm/node-postgres/migrator";
import pg from "pg";
import { applyAccess } from "./access/apply-access.ts";
import { ensureRoles, type LoginPasswords } from "./roles.ts";

const FOLDER = fileURLToPath(new URL("../../drizzle/migrations", import.meta.url));

/**
 * Brings a database to the current schema, logins and rights. Safe to run at every start.
 *
 * @param adminUrl connection string of an administrator of the database
 * @throws the driver's error when the server is older than 15 or the rights do not suffice
 */
export async function migrate(adminUrl: string, passwords: LoginPasswords): Promise<void> {
  const client = new pg.Client({ connectionString: adminUrl });
  client.on("error", () => {});
  await client.connect();
  try {
    const version = await client.query("show server_version_num");
    if (Number(version.rows[0].server_version_num) < 150_000) {
      throw new Error("PostgreSQL 15 or newer is needed");
    }
    await ensureRoles(client, passwords);
    await client.query("set client_min_messages = warning");
    await runMigrations(drizzle(client), { migrationsFolder: FOLDER });
    await applyAccess(client);
  } finally {
    await client.end();
  }
}
