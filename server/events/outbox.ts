import type pg from "pg";
import type { LiveMessage } from "./live-hub.ts";

/** An undone message of the outbox. */
export type OutboxRow = LiveMessage & { readonly investigationId: string };

const BATCH = 200;

/** Investigations that have undone messages. */
export async function waitingInvestigations(pool: pg.Pool): Promise<string[]> {
  const { rows } = await pool.query<{ investigation_id: string }>(
    "select distinct investigation_id from core.outbox where done_at is null",
  );
  return rows.map((row) => row.investigation_id);
}

/**
 * Claims undone messages of investigations, delivers them and marks them done, in one transaction:
 * when the process dies in between they are undone still and delivered again.
 *
 * @param deliver must bear being given a message twice
 * @returns how many were delivered; call again while it is above 0
 */
export async function deliverOutbox(
  pool: pg.Pool,
  investigationIds: readonly string[],
  deliver: (row: OutboxRow) => void,
): Promise<number> {
  const client = await pool.connect();
  let broken: Error | undefined;
  try {
    await client.query("begin");
    const { rows } = await client.query<{
      id: string;
      investigation_id: string;
      topic: LiveMessage["topic"];
      entity_id: string | null;
      graph_version: string | null;
    }>(
      `select id, investigation_id, topic, entity_id, graph_version from core.outbox
       where done_at is null and investigation_id = any ($1::uuid[])
       order by id limit ${BATCH} for update skip locked`,
      [investigationIds],
    );
    for (const row of rows) {
      deliver({
        investigationId: row.investigation_id,
        topic: row.topic,
        id: row.entity_id,
        version: row.graph_version === null ? null : Number(row.graph_version),
      });
    }
    await client.query("update core.outbox set done_at = now() where id = any ($1::bigint[])", [
      rows.map((row) => row.id),
    ]);
    await client.query("commit");
    return rows.length;
  } catch (error) {
    await client.query("rollback").catch((failed: Error) => {
      broken = failed;
    });
    throw error;
  } finally {
    client.release(broken);
  }
}
