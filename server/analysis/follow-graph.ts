import type pg from "pg";
import { applyStep, type Change, fetchStep, type StepRows, type Touched } from "./graph-step.ts";
import type { GraphStore } from "./graph-store.ts";
import { snapshotTx } from "./snapshot-tx.ts";

/** More changes than this are read faster as a whole. */
const MOST_CHANGES = 5_000;

type Step = { readonly version: number; readonly rows: StepRows | null };

/** What changed since the store's version, or null when the graph has to be read whole. */
async function readStep(
  client: pg.PoolClient,
  investigationId: string,
  store: GraphStore,
): Promise<Step | null> {
  const found = await client.query<{ graph_version: string; time_zone: string }>(
    "select graph_version, time_zone from core.investigation where id = $1",
    [investigationId],
  );
  const version = Number(found.rows[0]?.graph_version ?? Number.NaN);
  // A setting, not a change of the graph: it may be another one at the same version.
  store.timeZone = found.rows[0]?.time_zone ?? store.timeZone;
  if (version === store.version) return { version, rows: null };
  if (!(version > store.version)) return null;
  const { rows: changes } = await client.query<Change>(
    `select distinct kind, person_a, person_b from core.graph_change
     where investigation_id = $1 and graph_version > $2 and graph_version <= $3
     limit ${MOST_CHANGES + 1}`,
    [investigationId, store.version, version],
  );
  if (changes.length > MOST_CHANGES || changes.some((change) => change.kind === "bulk"))
    return null;
  return { version, rows: await fetchStep(client, investigationId, store, changes) };
}

/**
 * Brings a store up to the database's graph version by fetching only what the changes since then
 * touched: a small change costs what it touches, whatever is stored.
 *
 * @param pool of the system login
 * @param changed called with what was touched in the same turn of the event loop as the store
 *   changes, so that what follows the store never differs from it
 * @returns false when the graph has to be read whole: a bulk change, too many changes, or a
 *   database put back to an earlier state
 */
export async function followGraph(
  pool: pg.Pool,
  investigationId: string,
  store: GraphStore,
  changed: (touched: Touched) => void,
): Promise<boolean> {
  const step = await snapshotTx(pool, (client) => readStep(client, investigationId, store));
  if (step?.rows) {
    const touched = applyStep(store, step.rows);
    store.version = step.version;
    changed(touched);
  }
  return step !== null;
}
