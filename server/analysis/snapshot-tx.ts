import type pg from "pg";

/**
 * Runs `work` on one consistent picture of the database.
 *
 * @throws whatever `work` throws; a connection that cannot be rolled back is closed
 */
export async function snapshotTx<T>(
  pool: pg.Pool,
  work: (client: pg.PoolClient) => Promise<T>,
): Promise<T> {
  const client = await pool.connect();
  let broken: Error | undefined;
  try {
    await client.query("begin isolation level repeatable read read only");
    const value = await work(client);
    await client.query("commit");
    return value;
  } catch (error) {
    await client.query("rollback").catch((failed: Error) => {
      broken = failed;
    });
    throw error;
  } finally {
    client.release(broken);
  }
}
