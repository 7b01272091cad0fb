import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type { Import, ImportReading } from "../../../shared/contracts/imports.ts";
import { byteas } from "../../db/binary-arrays.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import { refToken } from "../../identity/records.ts";
import type { Pause } from "./pause.ts";
import { type SealedChunk, sealChunk } from "./staged-chunk.ts";
import type { ImportKind, ImportProblem } from "./staged-row.ts";

/** An import as stored. `counts.stagedAt` (s since the epoch) stands while checked rows are kept. */
export interface ImportRow {
  id: string;
  kind: ImportKind;
  state: Import["state"];
  rowCount: number;
  counts: Record<string, number>;
  problems: ImportProblem[];
  reading: ImportReading | null;
  progress: number;
  createMissing: boolean;
  recordedAt: string;
  committedAt: string | null;
}

const BARE = `id, kind, state, row_count as "rowCount", counts, reading, progress,
  create_missing as "createMissing", recorded_at as "recordedAt", committed_at as "committedAt"`;

/** An import with its problems, or undefined when there is none in this investigation. */
export async function loadImport(tx: Tx, id: string): Promise<ImportRow | undefined> {
  const found = await tx.execute<ImportRow & Record<string, unknown>>(
    sql`select ${sql.raw(BARE)}, problems from core.import where id = ${id}`,
  );
  return found.rows[0];
}

/** Imports, newest first, without their problems. */
export async function listImports(
  tx: Tx,
  page: { page: number; pageSize: number },
): Promise<{ rows: ImportRow[]; total: number }> {
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.import`,
  );
  const found = await tx.execute<ImportRow & Record<string, unknown>>(
    sql`select ${sql.raw(BARE)}, '[]'::jsonb as problems from core.import
        order by recorded_at desc, id
        limit ${page.pageSize} offset ${(page.page - 1) * page.pageSize}`,
  );
  return { rows: found.rows, total: total.rows[0]?.count ?? 0 };
}

/**
 * Opens an import for a file, or finds the one the same file (bytes, kind and columns) made before and
 * locks it.
 */
export async function openImport(
  tx: Tx,
  actor: Actor,
  kind: ImportKind,
  sha256: string,
  reading: ImportReading,
): Promise<{ id: string; state: ImportRow["state"]; unknownRows: number; fresh: boolean }> {
  const id = randomUUID();
  const made = await tx.execute(
    sql`insert into core.import (id, investigation_id, kind, sha256, reading, state, recorded_by)
        values (${id}, ${actor.investigationId}, ${kind}, ${sha256},
          ${JSON.stringify(reading)}::jsonb, 'checking', ${actor.accountId})
        on conflict do nothing`,
  );
  if (made.rowCount === 1) return { id, state: "checking", unknownRows: 0, fresh: true };
  const found = await tx.execute<{ id: string; state: ImportRow["state"]; unknownRows: number }>(
    sql`select id, state, coalesce((counts ->> 'unknownRows')::int, 0) as "unknownRows"
        from core.import where kind = ${kind} and sha256 = ${sha256} for update`,
  );
  const row = found.rows[0];
  if (!row) throw new Error("an import of this file is there and is not");
  return { ...row, fresh: false };
}

/** Puts an import that is not on record back to the beginning of its check. */
export async function restartCheck(tx: Tx, id: string): Promise<void> {
  await tx.execute(
    sql`update core.import set state = 'checking' where id = ${id} and state <> 'committing'`,
  );
}

/**
 * Stores what an import has come to.
 *
 * @throws Error when the acting person no longer sees the import
 */
export async function keepImport(
  tx: Tx,
  id: string,
  change: {
    state: ImportRow["state"];
    counts: Record<string, number>;
    problems: readonly ImportProblem[];
    committed?: boolean;
  },
): Promise<void> {
  const done = await tx.execute(
    sql`update core.import set state = ${change.state}, row_count = ${change.counts.rows ?? 0},
          counts = ${JSON.stringify(change.counts)}::jsonb,
          problems = ${JSON.stringify(change.problems)}::jsonb,
          progress = ${change.committed ? 1 : 0},
          committed_at = ${change.committed ? sql`now()` : null}
        where id = ${id}`,
  );
  if (done.rowCount !== 1) throw new Error("the import is out of sight");
}

/**
 * Claims an import for committing.
 *
 * @returns false when it is not ready (gone, being committed, committed, or its rows were deleted)
 */
export async function claimCommit(tx: Tx, id: string, createMissing: boolean): Promise<boolean> {
  const done = await tx.execute(
    sql`update core.import set state = 'committing', progress = 0, create_missing = ${createMissing}
        where id = ${id} and state in ('ready', 'failed') and counts ? 'stagedAt'`,
  );
  return done.rowCount === 1;
}

/** Keeps a chunk of checked rows, encrypted. */
export async function keepStage(
  tx: Tx,
  keys: InvestigationKeys,
  id: string,
  chunk: number,
  rows: readonly unknown[],
): Promise<void> {
  const sealed = sealChunk(keys, id, chunk, rows);
  await tx.execute(sql`select identity.keep_stage(${id}::uuid, ${chunk}, ${sealed}::bytea)`);
}

/**
 * The next kept chunks in order, sealed.
 *
 * @param after number of the last chunk that was read; -1 at first
 * @param count how many, at most
 */
export async function readStage(
  tx: Tx,
  id: string,
  after: number,
  count: number,
): Promise<SealedChunk[]> {
  const found = await tx.execute<{ chunk: number; body_cipher: Buffer }>(
    sql`select chunk, body_cipher from identity.read_stage(${id}::uuid, ${after}, ${count})`,
  );
  return found.rows.map(({ chunk, body_cipher: body }) => ({ importId: id, chunk, body }));
}

/** Deletes the kept rows of an import. */
export async function dropStage(tx: Tx, id: string): Promise<void> {
  await tx.execute(sql`select identity.drop_stage(${id}::uuid)`);
}

/** References whose tokens are made at a stretch: some 3 ms of work. */
const REF_SLICE = 500;

/** References to ids of people on record; those not on record are absent. */
export async function peopleByRef(
  tx: Tx,
  keys: InvestigationKeys,
  refs: readonly string[],
  pause?: Pause,
): Promise<Map<string, string>> {
  if (refs.length === 0) return new Map();
  const refOf = new Map<string, string>();
  const tokens: Buffer[] = [];
  for (const [at, ref] of refs.entries()) {
    const token = refToken(keys, ref);
    tokens.push(token);
    refOf.set(token.toString("latin1"), ref);
    if (at % REF_SLICE === REF_SLICE - 1) await pause?.();
  }
  const found = await tx.execute<{ token: Buffer; person_id: string }>(
    sql`select token, person_id from identity.people_by_ref(${byteas(tokens)}::bytea[])`,
  );
  const out = new Map<string, string>();
  for (const row of found.rows) {
    const ref = refOf.get(row.token.toString("latin1"));
    if (ref !== undefined) out.set(ref, row.person_id);
  }
  return out;
}
