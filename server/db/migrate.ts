import { fileURLToPath } from "node:url";
import { drizzle } from "drizzle-orm/node-postgres";
import { migrate as runMigrations } from "drizzle-orm/node-postgres/migrator";
import pg from "pg";
import { EnvError } from "../config/env.ts";
import { sqlState } from "../http/translate-error.ts";
import { applyAccess } from "./access/apply-access.ts";
import { ensureRoles, type LoginPasswords } from "./roles.ts";

const FOLDER = fileURLToPath(new URL("../../drizzle/migrations", import.meta.url));

/** Why an administrator's connection could not be made, without what stands in its address. */
function whyNoConnection({ code }: { code?: unknown }, adminUrl: string): string {
  if (code === "28P01" || code === "28000") {
    return "the database refuses the user or the password of DATABASE_URL";
  }
  if (code === "3D000") return "the database that DATABASE_URL names does not exist";
  const { hostname, port } = new URL(adminUrl);
  const why = typeof code === "string" ? ` (${code})` : "";
  return `no PostgreSQL answers at ${hostname || "the place DATABASE_URL names"}:${port || 5432}${why}`;
}

/**
 * Brings a database to the current schema, logins and rights. Safe to run at every start.
 *
 * @param adminUrl connection string of an administrator of the database
 * @throws EnvError when no connection can be made, its user's rights do not suffice, or the server
 *   is older than 15; else the driver's error
 */
export async function migrate(adminUrl: string, passwords: LoginPasswords): Promise<void> {
  const client = new pg.Client({ connectionString: adminUrl, connectionTimeoutMillis: 10_000 });
  client.on("error", () => {});
  try {
    await client.connect();
  } catch (error) {
    throw new EnvError(whyNoConnection(error as { code?: unknown }, adminUrl));
  }
  try {
    const version = await client.query("show server_version_num");
    if (Number(version.rows[0].server_version_num) < 150_000) {
      throw new EnvError("PostgreSQL 15 or newer is needed");
    }
    await ensureRoles(client, passwords);
    await client.query("set client_min_messages = warning");
    await runMigrations(drizzle(client), { migrationsFolder: FOLDER });
    await applyAccess(client);
  } catch (error) {
    if (sqlState(error) !== "42501") throw error;
    throw new EnvError("the user of DATABASE_URL may not make logins and schemas in its database");
  } finally {
    await client.end();
  }
}
