import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import { EXPORT_HOURS, type Export, type ExportInput } from "../../../shared/contracts/exports.ts";
import { filledColumns } from "../../../shared/export-columns.ts";
import type { Role } from "../../../shared/roles.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";

/** An export as stored, with the name of who asked where the acting role reads names. */
export interface ExportRow extends Record<string, unknown> {
  id: string;
  kind: Export["kind"];
  identified: boolean;
  purpose: Export["purpose"];
  reason: string | null;
  role: Role;
  filter: Export["filter"];
  columns: string[];
  state: Export["state"];
  progress: number;
  failure: string | null;
  rows: number;
  bytes: number;
  parts: number;
  sha256: string | null;
  downloads: number;
  recordedAt: string;
  accountId: string;
  displayName: string | null;
  finishedAt: string | null;
  expiresAt: string | null;
}

/** What a finished file came to. */
export interface MadeFile {
  rows: number;
  /** People the file names. */
  people: number;
  bytes: number;
  parts: number;
  sha256: string;
}

const list = (values: readonly string[]) =>
  sql`${sql.param(`{${values.map((one) => `"${one}"`).join(",")}}`)}::text[]`;

/** The list of columns; names of members only for roles whose login may read that view. */
function selection(role: Role) {
  const name =
    role === "epidemiologist"
      ? sql`null::text`
      : sql`(select m.display_name from views.member m where m.account_id = e.recorded_by limit 1)`;
  return sql`e.id, e.kind, e.identified, e.purpose, e.reason, e.role, e.filter, e.columns, e.state,
    e.progress, e.failure, e.row_count as rows, e.bytes, e.parts, e.sha256, e.downloads,
    e.recorded_at as "recordedAt", e.recorded_by as "accountId", ${name} as "displayName",
    e.finished_at as "finishedAt", e.expires_at as "expiresAt"`;
}

/** An export, or undefined when there is none in the acting person's sight. */
export async function loadExport(tx: Tx, role: Role, id: string): Promise<ExportRow | undefined> {
  const found = await tx.execute<ExportRow>(
    sql`select ${selection(role)} from core.export e where e.id = ${id}`,
  );
  return found.rows[0];
}

/** Exports in sight, newest first: a data officer's are all, others' their own. */
export async function listExports(
  tx: Tx,
  role: Role,
  page: { page: number; pageSize: number },
): Promise<{ rows: ExportRow[]; total: number }> {
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.export`,
  );
  const found = await tx.execute<ExportRow>(
    sql`select ${selection(role)} from core.export e order by e.recorded_at desc, e.id
        limit ${page.pageSize} offset ${(page.page - 1) * page.pageSize}`,
  );
  return { rows: found.rows, total: total.rows[0]?.count ?? 0 };
}

/** How many files of the acting person are being made. */
export async function countBuilding(tx: Tx, actor: Actor): Promise<number> {
  const found = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.export
        where recorded_by = ${actor.accountId} and state = 'building'`,
  );
  return found.rows[0]?.count ?? 0;
}

/** Records that a file was asked for, and gives its id. */
export async function insertExport(tx: Tx, actor: Actor, input: ExportInput): Promise<string> {
  const id = randomUUID();
  const columns = filledColumns(input.kind, actor.role, input.identified);
  await tx.execute(
    sql`insert into core.export (id, investigation_id, kind, identified, purpose, reason, role,
          filter, columns, state, recorded_by)
        values (${id}, ${actor.investigationId}, ${input.kind}, ${input.identified},
          ${input.purpose}, ${input.reason}, ${actor.role},
          ${JSON.stringify(input.filter ?? {})}::jsonb, ${list(columns)}, 'building',
          ${actor.accountId})`,
  );
  return id;
}

/**
 * Makes a finished file available for a day.
 *
 * @returns false when it was cancelled meanwhile
 */
export async function finishExport(tx: Tx, id: string, made: MadeFile): Promise<boolean> {
  const done = await tx.execute(
    sql`update core.export set state = 'ready', progress = 1, row_count = ${made.rows},
          bytes = ${made.bytes}, parts = ${made.parts}, sha256 = ${made.sha256},
          finished_at = now(), expires_at = now() + make_interval(hours => ${EXPORT_HOURS})
        where id = ${id} and state = 'building'`,
  );
  return done.rowCount === 1;
}

/** Says that a file could not be made. */
export async function failExport(tx: Tx, id: string, failure: string): Promise<boolean> {
  const done = await tx.execute(
    sql`update core.export set state = 'failed', failure = ${failure}, finished_at = now()
        where id = ${id} and state = 'building'`,
  );
  return done.rowCount === 1;
}

/**
 * Ends a file: one being made is cancelled, one that is ready deleted. Its row stays.
 *
 * @returns false when there was nothing left to end
 */
export async function endExport(tx: Tx, id: string): Promise<boolean> {
  const done = await tx.execute(
    sql`update core.export set finished_at = coalesce(finished_at, now()),
          state = case state when 'building' then 'cancelled' else 'deleted' end
        where id = ${id} and state in ('building', 'ready')`,
  );
  if (done.rowCount === 1) await dropParts(tx, id);
  return done.rowCount === 1;
}

/** Counts a download. */
export async function countDownload(tx: Tx, id: string): Promise<void> {
  await tx.execute(sql`update core.export set downloads = downloads + 1 where id = ${id}`);
}

/** Deletes the bytes of a file. */
export async function dropParts(tx: Tx, id: string): Promise<void> {
  await tx.execute(sql`select core.drop_export_parts(${id}::uuid)`);
}
