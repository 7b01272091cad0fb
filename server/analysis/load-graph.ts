import type pg from "pg";
import {
  GRAPH_SQL,
  readClassified,
  readExposure,
  readGroupExposure,
  readInterview,
  readPerson,
} from "./graph-rows.ts";
import { GraphStore } from "./graph-store.ts";
import { snapshotTx } from "./snapshot-tx.ts";
import { streamRows } from "./stream-rows.ts";

/**
 * Reads an investigation's graph whole inside a transaction of one moment. People are numbered by
 * entry (then id), so that the same record gives the same numbers at every load.
 *
 * @returns the store, or null when there is no such investigation
 */
export async function readGraph(
  client: pg.PoolClient,
  investigationId: string,
): Promise<GraphStore | null> {
  const found = await client.query<{ graph_version: string; time_zone: string }>(
    "select graph_version, time_zone from core.investigation where id = $1",
    [investigationId],
  );
  const [row] = found.rows;
  if (!row) return null;
  const store = new GraphStore();
  store.version = Number(row.graph_version);
  store.timeZone = row.time_zone;
  const values = [investigationId];
  const read = (sql: string, alias: string, take: (row: readonly (string | null)[]) => void) =>
    streamRows(client, `${sql} where ${alias}.investigation_id = $1`, values, take);

  await streamRows(
    client,
    `${GRAPH_SQL.people} where p.investigation_id = $1 order by p.recorded_at, p.id`,
    values,
    (person) => store.putPerson(...readPerson(person)),
  );
  await read(GRAPH_SQL.classified, "c", (r) => store.classified.add(readClassified(store, r)));
  await read(GRAPH_SQL.interviews, "i", (r) => store.interviews.add(readInterview(store, r)));
  await read(GRAPH_SQL.groupExposures, "g", (r) =>
    store.groupExposures.add(readGroupExposure(store, r)),
  );
  await read(GRAPH_SQL.exposures, "e", (r) => store.exposures.add(readExposure(store, r)));
  return store;
}

/**
 * Reads an investigation's graph as it stands at one instant of the database.
 *
 * @param pool of the system login
 * @returns the store, or null when there is no such investigation
 */
export async function loadGraph(
  pool: pg.Pool,
  investigationId: string,
): Promise<GraphStore | null> {
  return await snapshotTx(pool, (client) => readGraph(client, investigationId));
}
