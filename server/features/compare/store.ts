import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type {
  CompareRun,
  CompareRunInput,
  CompareRunItem,
} from "../../../shared/contracts/compare.ts";
import { CORE_VERSION, GENERATOR } from "../../../shared/core/index.ts";
import type { Role } from "../../../shared/roles.ts";
import type { AskedReport } from "../../analysis/report-question.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";

/** A run without its input and result, with the name of who asked where the role reads names. */
export interface RunRow extends Record<string, unknown>, Omit<CompareRunItem, "can"> {
  accountId: string;
  failure: string | null;
}

/** What was asked for about people, days and cut-off, as it is stored. */
export type StoredQuestion = Pick<
  CompareRunInput,
  "population" | "from" | "to" | "asOf" | "window"
>;

/** The list of columns; names of members only for roles whose login may read that view. */
function selection(role: Role) {
  const name =
    role === "epidemiologist"
      ? sql`null::text`
      : sql`(select m.display_name from views.member m where m.account_id = r.recorded_by limit 1)`;
  return sql`r.id, r.name, r.state, r.progress::float8 as progress, r.reached, r.replicates,
    r.seed::float8 as seed, r.population, r.time_window as "window", r.from_day as "from",
    r.to_day as "to", r.attribute, r.as_of as "asOf", r.cut_off as "cutOff",
    r.graph_version::float8 as "graphVersion", r.core_version as "coreVersion", r.generator,
    r.people, r.pairs, ${name} as "by", r.recorded_at as "recordedAt",
    r.finished_at as "finishedAt", r.recorded_by as "accountId", r.failure`;
}

/** A run, or undefined when there is none in the acting person's sight. */
export async function loadRun(tx: Tx, role: Role, id: string): Promise<RunRow | undefined> {
  const found = await tx.execute<RunRow>(
    sql`select ${selection(role)} from core.compare_run r where r.id = ${id}`,
  );
  return found.rows[0];
}

/** The result of a run, or null while there is none. */
export async function loadResult(tx: Tx, id: string): Promise<CompareRun["result"]> {
  const found = await tx.execute<{ result: CompareRun["result"] }>(
    sql`select result from core.compare_run where id = ${id}`,
  );
  return found.rows[0]?.result ?? null;
}

/** The stored input of a run (compressed), or null before it was read. */
export async function loadInput(tx: Tx, id: string): Promise<Buffer | null> {
  const found = await tx.execute<{ input: Buffer | null }>(
    sql`select input from core.compare_run where id = ${id}`,
  );
  return found.rows[0]?.input ?? null;
}

/** Runs of the investigation, newest first; `q` looks into names. */
export async function listRuns(
  tx: Tx,
  role: Role,
  query: { page: number; pageSize: number; q?: string | undefined },
): Promise<{ rows: RunRow[]; total: number }> {
  const q = query.q?.toLowerCase() ?? "";
  const where = q === "" ? sql`true` : sql`position(${q} in lower(r.name)) > 0`;
  const total = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.compare_run r where ${where}`,
  );
  const found = await tx.execute<RunRow>(
    sql`select ${selection(role)} from core.compare_run r where ${where}
        order by r.recorded_at desc, r.id
        limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
  );
  return { rows: found.rows, total: total.rows[0]?.count ?? 0 };
}

/** How many runs of the acting person wait or are being made. */
export async function countRunning(tx: Tx, actor: Actor): Promise<number> {
  const found = await tx.execute<{ count: number }>(
    sql`select count(*)::int as count from core.compare_run
        where recorded_by = ${actor.accountId} and state = 'running'`,
  );
  return found.rows[0]?.count ?? 0;
}

/** Records that a comparison was asked for, and gives its id. */
export async function insertRun(
  tx: Tx,
  actor: Actor,
  input: CompareRunInput,
  asked: AskedReport,
  graphVersion: number,
): Promise<string> {
  const id = randomUUID();
  const { population, from, to, asOf, window } = input;
  const question: StoredQuestion = { population, from, to, asOf, window };
  await tx.execute(
    sql`insert into core.compare_run (id, investigation_id, name, state, replicates, seed, population,
          time_window, from_day, to_day, attribute, question, as_of, cut_off, graph_version,
          core_version, generator, recorded_by)
        values (${id}, ${actor.investigationId}, ${input.name}, 'running', ${input.replicates},
          ${input.seed}, ${population}, ${asked.question.window}, ${from ?? null}, ${to ?? null},
          ${input.attribute}, ${JSON.stringify(question)}::jsonb, ${asked.asOf}, ${asked.cutOff},
          ${graphVersion}, ${CORE_VERSION}, ${GENERATOR}, ${actor.accountId})`,
  );
  return id;
}

/** Records a run of the same input, seed and cut-off. Without a stored input it is read anew. */
export async function insertAgain(tx: Tx, actor: Actor, of: string): Promise<string> {
  const id = randomUUID();
  await tx.execute(
    sql`insert into core.compare_run (id, investigation_id, name, state, replicates, seed, population,
          time_window, from_day, to_day, attribute, question, as_of, cut_off, graph_version,
          core_version, generator, people, pairs, input, again_of, recorded_by)
        select ${id}, investigation_id, name, 'running', replicates, seed, population, time_window,
          from_day, to_day, attribute, question, as_of, cut_off, graph_version, ${CORE_VERSION},
          ${GENERATOR}, people, pairs, input, id, ${actor.accountId}
        from core.compare_run where id = ${of}`,
  );
  return id;
}

/** Gives a run another name; false when it is not the acting person's to change. */
export async function renameRun(tx: Tx, id: string, name: string): Promise<boolean> {
  const done = await tx.execute(sql`update core.compare_run set name = ${name} where id = ${id}`);
  return done.rowCount === 1;
}

/** Stops a run that is not finished; its entry stays. False when there was nothing to stop. */
export async function cancelRun(tx: Tx, id: string): Promise<boolean> {
  const done = await tx.execute(
    sql`update core.compare_run set state = 'cancelled', finished_at = now()
        where id = ${id} and state = 'running'`,
  );
  return done.rowCount === 1;
}

/** Deletes a run that has ended, with its input and result. */
export async function deleteRun(tx: Tx, id: string): Promise<boolean> {
  const done = await tx.execute(
    sql`delete from core.compare_run where id = ${id} and state <> 'running'`,
  );
  return done.rowCount === 1;
}
