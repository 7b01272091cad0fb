import { readdir, readFile } from "node:fs/promises";
import { fileURLToPath } from "node:url";
import pg from "pg";
import { grants, views } from "./grants.ts";
import { rowPolicies } from "./policies.ts";

const FOLDER = fileURLToPath(new URL("../../../drizzle/access/", import.meta.url));

/**
 * Takes the right to make temporary objects from everyone: what is never there cannot stand in the
 * way of a name. It belongs to the database, not to what is in it, so a restored or copied database
 * has lost it and every start says it again.
 */
export async function refuseTemporary(client: pg.ClientBase): Promise<void> {
  const found = await client.query("select current_database() as name");
  const name = pg.escapeIdentifier(found.rows[0].name as string);
  await client.query(`revoke temporary on database ${name} from public`);
}

/**
 * Brings functions, row policies, views and grants to what the code and the field registry say, in
 * one transaction. Done at every start (a fraction of a second), so that a right changed behind the
 * registry's back does not outlive a restart.
 *
 * @param client a connection that owns the schemas (an administrator's)
 */
export async function applyAccess(client: pg.ClientBase): Promise<void> {
  await refuseTemporary(client);
  const files = (await readdir(FOLDER)).filter((name) => name.endsWith(".sql")).sort();
  const sources = await Promise.all(files.map((name) => readFile(`${FOLDER}${name}`, "utf8")));
  const statements = [...sources, ...views(), ...grants(), ...rowPolicies()];
  await client.query("begin");
  try {
    await client.query("select pg_advisory_xact_lock(7203114)");
    await client.query("set local client_min_messages = warning");
    // One functions file may use another's, so bodies are checked when first called.
    await client.query("set local check_function_bodies = off");
    for (const statement of statements) await client.query(statement);
    await client.query("commit");
  } catch (error) {
    await client.query("rollback");
    throw error;
  }
}
