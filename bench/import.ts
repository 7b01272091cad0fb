import { mkdirSync, rmSync } from "node:fs";
import { resolve } from "node:path";
import { startCluster, stopCluster } from "../scripts/lib/postgres.mjs";
import { measureImport } from "./support/measure-import.ts";

/**
 * Import of a file of people and one of their pairs while interviews go on, as JSON. Arguments:
 * people, pairs (default 100,000 and 300,000); `alone` leaves the interviews out.
 */
const [people = 100_000, pairs = 300_000] = process.argv.slice(2).map(Number).filter(Boolean);
const interviews = !process.argv.includes("alone");
const FOLDER = resolve(import.meta.dirname, "../.test-data/bench-import");

rmSync(FOLDER, { recursive: true, force: true });
mkdirSync(FOLDER, { recursive: true });
const cluster = await startCluster(FOLDER);
try {
  const options = process.env.BENCH_NODE_OPTIONS?.split(" ") ?? [];
  const result = await measureImport(cluster.url, FOLDER, { people, pairs, interviews }, options);
  process.stdout.write(`${JSON.stringify(result, null, 2)}\n`);
} finally {
  await stopCluster(FOLDER);
}
