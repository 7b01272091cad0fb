import type pg from "pg";

/** What a statement came to: its rows, or the SQLSTATE it was refused with. */
export interface Outcome {
  rows: Record<string, unknown>[];
  count: number;
  state: string | null;
}

async function run(client: pg.PoolClient, statement: string, values: unknown[]): Promise<Outcome> {
  try {
    const found = await client.query(statement, values);
    const last = Array.isArray(found) ? found.at(-1) : found;
    return { rows: last?.rows ?? [], count: last?.rowCount ?? 0, state: null };
  } catch (error) {
    return { rows: [], count: 0, state: (error as { code?: string }).code ?? "no SQLSTATE" };
  }
}

/** A statement as a login within one transaction under a context, rolled back afterwards. */
export type Ask = (statement: string, values?: unknown[]) => Promise<Outcome>;

/**
 * Lets `work` ask questions as a login with a context set the way the application sets it; each
 * runs behind a savepoint, and nothing is kept.
 */
export async function asLogin<T>(
  pool: pg.Pool,
  nonce: string | null,
  work: (ask: Ask) => Promise<T>,
): Promise<T> {
  const client = await pool.connect();
  try {
    await client.query("begin");
    if (nonce) await client.query("select set_config('app.ctx', $1, true)", [nonce]);
    return await work(async (statement, values = []) => {
      await client.query("savepoint question");
      const outcome = await run(client, statement, values);
      await client.query(`rollback to savepoint question`);
      return outcome;
    });
  } finally {
    // A hostile statement may have left anything behind on this connection.
    client.release(true);
  }
}
