import { existsSync } from "node:fs";
import { resolve } from "node:path";
import { pathToFileURL } from "node:url";
import type { TestProject } from "vitest/node";
import { startCluster, stopCluster } from "../../scripts/lib/postgres.mjs";

declare module "vitest" {
  interface ProvidedContext {
    /** Superuser's connection string of the private test cluster (database `strandline`). */
    adminUrl: string;
  }
}

type DatabaseSupport = { prepareTemplate?: (adminUrl: string) => Promise<unknown> };

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
