import { readFileSync } from "node:fs";
import pg from "pg";
import { SeedRefused, seedInvestigation } from "../../drizzle/seed/seed-investigation.ts";
import { loadSecrets } from "../../server/config/secrets.ts";
import { createKeyRing, type KeyRing } from "../../server/identity/keys.ts";
import { readArguments } from "./read-arguments.ts";

const JOURNAL = new URL("../../drizzle/migrations/meta/_journal.json", import.meta.url);

/**
 * The database must have been started by this version and belong to the master key. Nothing is
 * migrated here: that locks tables, and the product may be running.
 */
async function checkInstallation(databaseUrl: string, keys: KeyRing): Promise<void> {
  const client = new pg.Client({ connectionString: databaseUrl, connectionTimeoutMillis: 10_000 });
  client.on("error", () => {});
  try {
    await client.connect();
  } catch {
    throw new SeedRefused("no PostgreSQL answers at the place DATABASE_URL names");
  }
  try {
    const begun = await client.query("select to_regclass('drizzle.__drizzle_migrations') as name");
    const key = begun.rows[0]?.name
      ? await client.query("select value from auth.meta where key = 'key_check'")
      : null;
    const value = key?.rows[0]?.value as string | undefined;
    if (value === undefined) {
      throw new SeedRefused("this database has never been started; run npm start once first");
    }
    const applied = await client.query(
      "select count(*)::int as n from drizzle.__drizzle_migrations",
    );
    const { entries } = JSON.parse(readFileSync(JOURNAL, "utf8")) as { entries: unknown[] };
    if (applied.rows[0]?.n !== entries.length) {
      throw new SeedRefused(
        "this database is of another version; start this version once with npm start first",
      );
    }
    if (!keys.opensCheck(value)) {
      throw new SeedRefused(
        "the master key does not open this database; restore secrets.json from its backup",
      );
    }
  } finally {
    await client.end();
  }
}

/**
 * Runs the command on the database of an installation.
 *
 * @param databaseUrl connection string of an administrator
 * @param dataDir folder with secrets.json, which must exist
 * @returns null when done, else the one line that says why nothing was loaded
 */
export async function seed(
  databaseUrl: string,
  dataDir: string,
  args: readonly string[],
  say: (line: string) => void,
): Promise<string | null> {
  const options = readArguments(args);
  if (!options) return null;
  const began = performance.now();
  try {
    const keys = createKeyRing(loadSecrets(dataDir).masterKey);
    await checkInstallation(databaseUrl, keys);
    const made = await seedInvestigation(databaseUrl, keys, options, say);
    const seconds = Math.round((performance.now() - began) / 1000);
    say(
      `Loaded ${made.people} people and ${made.pairs} contact pairs into "${options.name}" in ${seconds} s.`,
    );
    return null;
  } catch (error) {
    if (error instanceof SeedRefused || error instanceof RangeError) {
      return error.message;
    }
    throw error;
  }
}
