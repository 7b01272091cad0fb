import { existsSync, readFileSync, statSync } from "node:fs";
import { join, resolve } from "node:path";
import { runningCluster } from "../../../scripts/lib/postgres.mjs";
import type { World } from "./world.ts";

async function logFile(): Promise<string> {
  const cluster = await runningCluster(resolve(".test-data"));
  if (!cluster) throw new Error("the test cluster does not run");
  const file = join(cluster.dir, "log");
  if (!existsSync(file)) throw new Error("the test cluster keeps no log");
  return file;
}

/** Length of PostgreSQL's log now: what a test is answerable for comes after. */
export async function postgresLogSize(): Promise<number> {
  return statSync(await logFile()).size;
}

/** Where markers stand in stored rows (every column as text) or in PostgreSQL's own log. */
export async function hitsAtRest(
  world: World,
  logFrom: number,
): Promise<{ where: string; keys: string[] }[]> {
  const tables = await world.admin.query(
    `select schemaname || '.' || tablename as name from pg_tables
     where schemaname in ('core', 'identity', 'auth', 'audit') order by 1`,
  );
  const out: { where: string; keys: string[] }[] = [];
  const note = (where: string, text: string) => {
    const keys = [...new Set(world.scan.hits(text).map((hit) => hit.key))].sort();
    if (keys.length > 0) out.push({ where, keys });
  };
  for (const { name } of tables.rows) {
    const rows = await world.admin.query(`select t::text as line from ${name} t`);
    note(name, rows.rows.map((row) => row.line).join("\n"));
  }
  const log = readFileSync(await logFile());
  // A log begun anew meanwhile is shorter than it was.
  note("PostgreSQL's log", log.subarray(log.length < logFrom ? 0 : logFrom).toString());
  return out;
}
