import pg from "pg";
import { SeedRefused, seedInvestigation } from "../../drizzle/seed/seed-investigation.ts";
import { EnvError } from "../../server/config/env.ts";
import { loadSecrets } from "../../server/config/secrets.ts";
import { migrate } from "../../server/db/migrate.ts";
import { createKeyRing, type KeyRing } from "../../server/identity/keys.ts";
import { readArguments } from "./read-arguments.ts";

/** The installation's master key must be the one this database was begun with. */
async function checkKey(databaseUrl: string, keys: KeyRing): Promise<void> {
  const client = new pg.Client({ connectionString: databaseUrl });
  client.on("error", () => {});
  await client.connect();
  try {
    const found = await client.query("select value from auth.meta where key = 'key_check'");
    const value = found.rows[0]?.value as string | undefined;
    if (value === undefined) {
      throw new SeedRefused("this database has never been started; run npm start once first");
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
    const secrets = loadSecrets(dataDir);
    const keys = createKeyRing(secrets.masterKey);
    await migrate(databaseUrl, secrets.logins);
    await checkKey(databaseUrl, keys);
    const made = await seedInvestigation(databaseUrl, keys, options, say);
    const seconds = Math.round((performance.now() - began) / 1000);
    say(
      `Loaded ${made.people} people and ${made.pairs} contact pairs into "${options.name}" in ${seconds} s.`,
    );
    return null;
  } catch (error) {
    if (error instanceof SeedRefused || error instanceof EnvError || error instanceof RangeError) {
      return error.message;
    }
    throw error;
  }
}
