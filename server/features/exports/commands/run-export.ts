import { sql } from "drizzle-orm";
import { csvRecord } from "../../../../shared/csv-cells.ts";
import type { FieldErrorCode } from "../../../../shared/errors.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { type Tx, withTx } from "../../../db/with-tx.ts";
import { announce } from "../../../events/record-graph-change.ts";
import type { Actor } from "../../../http/route.ts";
import { safeError, sqlState } from "../../../http/translate-error.ts";
import type { Services } from "../../../services.ts";
import type { BuildContext } from "../build-context.ts";
import { createPartWriter, keysForFile } from "../parts.ts";
import { dropParts, failExport, finishExport, loadExport, type MadeFile } from "../store.ts";
import { writePairs } from "../write-pairs.ts";
import { writePeople } from "../write-people.ts";

type ExportServices = Pick<Services, "pools" | "keys" | "log">;

const PROGRESS_MS = 300;

/** The file was cancelled while it was being made. */
class CancelledError extends Error {}
/** The person who asked for it no longer acts in this investigation in that role. */
class AccessEndedError extends Error {}

const contextOf = (services: ExportServices, actor: Actor) => ({
  pool: services.pools[actor.role],
  nonce: actor.nonce,
});

/**
 * Writes progress where others can see it before the file is done, and so learns of a cancel. The
 * file's own transaction sees one moment only and never touches the row.
 */
function progressWriter(services: ExportServices, id: string) {
  let written = performance.now();
  return async (share: number) => {
    if (performance.now() - written < PROGRESS_MS) return;
    written = performance.now();
    const done = await services.pools.system.query(
      "update core.export set progress = $2 where id = $1 and state = 'building'",
      [id, Math.min(share, 0.99)],
    );
    if (done.rowCount !== 1) throw new CancelledError();
  };
}

/** Makes the file from one moment of the record; its parts are stored whole or not at all. */
async function build(services: ExportServices, actor: Actor, id: string, tx: Tx) {
  await tx.execute(sql`select set_config('statement_timeout', '10min', true),
    set_config('idle_in_transaction_session_timeout', '10min', true)`);
  const row = await loadExport(tx, actor.role, id);
  if (!row) throw new AccessEndedError();
  if (row.state !== "building") throw new CancelledError();
  const keys = await keysForFile(services, actor.investigationId);
  const parts = createPartWriter(tx, keys, id);
  const context: BuildContext = {
    tx,
    actor,
    keys: row.identified ? keys : null,
    exportId: id,
    filter: row.filter,
    columns: new Set(row.columns),
    identified: row.identified,
    write: (cells) => parts.add(csvRecord(cells)),
    progress: progressWriter(services, id),
  };
  const written = await (row.kind === "people" ? writePeople(context) : writePairs(context));
  return { ...written, ...(await parts.end()), row };
}

type Built = Awaited<ReturnType<typeof build>>;

/** Gives the file out and puts on record what it holds; both or neither. */
async function finish(actor: Actor, id: string, built: Built, tx: Tx): Promise<boolean> {
  const made: MadeFile = built;
  if (!(await finishExport(tx, id, made))) {
    // Out of sight altogether: whoever asked has signed out or changed role since.
    if (!(await loadExport(tx, actor.role, id))) throw new AccessEndedError();
    await dropParts(tx, id);
    return false;
  }
  await recordEvent(tx, {
    action: "export.made",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    fields: built.row.columns,
    counts: {
      export: id,
      of: built.row.kind,
      identity: built.row.identified ? "with" : "without",
      purpose: built.row.purpose,
      rows: made.rows,
      people: made.people,
      sha256: made.sha256,
    },
  });
  await announce(tx, "exports", id);
  return true;
}

function failureCode(error: unknown): FieldErrorCode {
  const gone = error instanceof AccessEndedError || sqlState(error) === "42501";
  return gone ? "export_no_access" : "export_failed";
}

async function markFailed(services: ExportServices, actor: Actor, id: string, error: unknown) {
  const code = failureCode(error);
  const said = await withTx(contextOf(services, actor), async (tx) => {
    const done = await failExport(tx, id, code);
    if (done) await announce(tx, "exports", id);
    return done;
  }).catch(() => false);
  if (said) return;
  // Its bytes, if any were kept, go at once rather than with the next sweep.
  await services.pools.system
    .query(
      "update core.export set state = 'failed', failure = $2 where id = $1 and state = 'building'",
      [id, code],
    )
    .then(() => services.pools.system.query("select core.sweep_exports()"))
    .catch(() => undefined);
}

/**
 * Makes a file that was asked for, in the background of the process, as the login of the person who
 * asked. Never throws: a failure becomes the export's state, and nothing of the file is kept.
 */
async function runExport(services: ExportServices, actor: Actor, id: string): Promise<void> {
  const context = contextOf(services, actor);
  try {
    const built = await withTx(context, (tx) => build(services, actor, id, tx), "snapshot");
    const done = await withTx(context, (tx) => finish(actor, id, built, tx));
    services.log.info({ event: done ? "export made" : "export cancelled", exportId: id });
  } catch (error) {
    if (error instanceof CancelledError) {
      services.log.info({ event: "export cancelled", exportId: id });
      return;
    }
    services.log.error({ event: "export failed", exportId: id, error: safeError(error) });
    await markFailed(services, actor, id, error);
  }
}

/** Files are made one after the other: each holds a connection, and its moment of the record. */
let lane: Promise<void> = Promise.resolve();

/** Has a file made as soon as those asked for before it are done. */
export function queueExport(services: ExportServices, actor: Actor, id: string): void {
  lane = lane.then(() => runExport(services, actor, id));
}
