import { existsSync } from "node:fs";
import { resolve } from "node:path";
import { pathToFileURL } from "node:url";
import pg from "pg";
import type { TestProject } from "vitest/node";
import { startCluster, stopCluster } from "../../scripts/lib/postgres.mjs";

declare module "vitest" {
  interface ProvidedContext {
    /** Superuser's connection string of the private test cluster (database `strandline`). */
    adminUrl: string;
  }
}

type DatabaseSupport = { prepareTemplate?: (adminUrl: string) => Promise<unknown> };

/** Runs that were killed left their copies; when the cluster starts anew nobody uses them. */
async function dropLeftOvers(adminUrl: string): Promise<void> {
  const client = new pg.Client({ connectionString: adminUrl });
  await client.connect();
  try {
    const { rows } = await client.query<{ name: string }>(
      "select quote_ident(datname) as name from pg_database where datname like 'strandline\\_test\\_%'",
    );
    for (const { name } of rows) await client.query(`drop database ${name} with (force)`);
  } finally {
    await client.end();
  }
}

/**
 * Starts the private test cluster, or joins the one another run holds, and has the template
 * database made that each test file copies. The last run to end stops the cluster.
 */
export async function setup(project: TestProject): Promise<() => Promise<void>> {
  const folder = resolve(project.config.root, ".test-data");
  const cluster = await startCluster(folder, { throwAway: true });
  const release = async () => {
    await stopCluster(folder);
  };
  try {
    if (!cluster.reused) await dropLeftOvers(cluster.url);
    const support = resolve(project.config.root, "tests/support/database.ts");
    if (existsSync(support)) {
      const module: DatabaseSupport = await import(pathToFileURL(support).href);
      await module.prepareTemplate?.(cluster.url);
    }
    project.provide("adminUrl", cluster.url);
  } catch (error) {
    await release();
    throw error;
  }
  return release;
}
