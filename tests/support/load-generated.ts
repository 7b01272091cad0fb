import pg from "pg";
import type { Outbreak } from "../../drizzle/seed/generator/types.ts";
import { loadOutbreak } from "../../drizzle/seed/load-outbreak.ts";
import type { TestApp } from "./app.ts";
import { asAdmin } from "./field-work.ts";

/**
 * Loads a generated outbreak into an investigation, as the demo's code loads it: past the routes,
 * so the live graph reads itself when the next change says so.
 */
export async function loadGenerated(
  app: TestApp,
  investigationId: string,
  outbreak: Outbreak,
): Promise<void> {
  const [key] = await asAdmin<{ wrapped_key: Buffer }>(
    app,
    "select wrapped_key from identity.data_key where investigation_id = $1",
    [investigationId],
  );
  if (!key) throw new Error("the investigation has no data key");
  const client = new pg.Client({ connectionString: app.adminUrl });
  await client.connect();
  try {
    await loadOutbreak(
      {
        client,
        keys: app.keys.unwrap(investigationId, key.wrapped_key),
        investigationId,
        accounts: new Map(),
        country: "GB",
      },
      outbreak,
    );
    await client.query("analyze");
  } finally {
    await client.end();
  }
}
