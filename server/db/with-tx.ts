import type { NodePgDatabase } from "drizzle-orm/node-postgres";
import { drizzle } from "drizzle-orm/node-postgres";
import type pg from "pg";
import { TYPES } from "./types.ts";

/** A database handle that exists only inside a transaction. */
export type Tx = NodePgDatabase<Record<string, never>> & { readonly inTx: unique symbol };

/** What a transaction runs as: the pool decides the login, the nonce the person and investigation. */
export interface TxContext {
  pool: pg.Pool;
  /** Null only for the accounts and system logins, which act for nobody. */
  nonce: string | null;
}

const ISOLATION = {
  committed: "begin isolation level read committed",
  repeatable: "begin isolation level repeatable read read only",
  /** One moment of the record for a long reading that also writes. */
  snapshot: "begin isolation level repeatable read",
  serializable: "begin isolation level serializable",
} as const;

/** Thrown when COMMIT did not commit: a failed statement had been swallowed inside. */
export class TxLostError extends Error {
  constructor() {
    super("the transaction was rolled back although no error reached its end");
  }
}

/**
 * Drizzle brings type parsers of its own with every query, which leave instants in PostgreSQL's
 * notation; this hands its queries to the client with ours, so that instants are ISO strings.
 */
function withOurTypes(client: pg.PoolClient): pg.PoolClient {
  const query = (config: unknown, ...rest: unknown[]) => {
    const ours =
      typeof config === "object" && config !== null && "types" in config
        ? { ...config, types: TYPES }
        : config;
    return Reflect.apply(client.query as (...args: unknown[]) => unknown, client, [ours, ...rest]);
  };
  return new Proxy(client, {
    get: (target, key) => (key === "query" ? query : Reflect.get(target, key, target)),
  });
}

/**
 * Runs `work` in one transaction with the acting person's context, and returns its value only
 * after COMMIT has really committed. This is the one place where the context is set.
 *
 * @throws whatever `work` throws, after ROLLBACK; TxLostError when the commit was a rollback
 */
export async function withTx<T>(
  context: TxContext,
  work: (tx: Tx) => Promise<T>,
  isolation: keyof typeof ISOLATION = "committed",
): Promise<T> {
  const client = await context.pool.connect();
  let broken: Error | undefined;
  try {
    await client.query(ISOLATION[isolation]);
    if (context.nonce)
      await client.query("select set_config('app.ctx', $1, true)", [context.nonce]);
    const value = await work(drizzle(withOurTypes(client)) as unknown as Tx);
    const done = await client.query("commit");
    if (done.command !== "COMMIT") throw new TxLostError();
    return value;
  } catch (error) {
    try {
      await client.query("rollback");
    } catch (failed) {
      broken = failed as Error;
    }
    throw error;
  } finally {
    client.release(broken);
  }
}

/**
 * Runs a part that may fail without losing the transaction around it.
 *
 * @returns the part's value, or the error it failed with
 */
export async function savepoint<T>(
  tx: Tx,
  work: () => Promise<T>,
): Promise<{ ok: true; value: T } | { ok: false; error: unknown }> {
  await tx.execute("savepoint part");
  try {
    const value = await work();
    await tx.execute("release savepoint part");
    return { ok: true, value };
  } catch (error) {
    await tx.execute("rollback to savepoint part");
    return { ok: false, error };
  }
}
