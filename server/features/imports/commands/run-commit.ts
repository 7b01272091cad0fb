import { sql } from "drizzle-orm";
import type { FieldErrorCode } from "../../../../shared/errors.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { dayIn, now } from "../../../clock.ts";
import { type Tx, withTx } from "../../../db/with-tx.ts";
import { announce, recordGraphChange } from "../../../events/record-graph-change.ts";
import type { Actor } from "../../../http/route.ts";
import { safeError, sqlState } from "../../../http/translate-error.ts";
import type { Services } from "../../../services.ts";
import { loadInvestigation } from "../../investigations/store.ts";
import { COMPARED_FIELDS } from "../known-people.ts";
import { createPackLane } from "../pack-lane.ts";
import { createPause } from "../pause.ts";
import { createPlaceBook } from "../place-book.ts";
import { ProblemList } from "../problem-list.ts";
import { dropStage, type ImportRow, keepImport, loadImport } from "../store.ts";
import { type CommitContext, type CommitCounts, noCounts } from "./commit-context.ts";
import { commitPairs } from "./commit-pairs.ts";
import { commitPeople } from "./commit-people.ts";

type CommitServices = Pick<Services, "pools" | "keys" | "log">;

const PROGRESS_MS = 400;
/** From this many rows on, a thread of its own is worth its start. */
const LANE_ROWS = 2_000;

/** Codes that are not about a row by itself: they are found at each try. */
const AFTER_ROWS: ReadonlySet<FieldErrorCode> = new Set([
  "unknown_ref",
  "waiting_ref",
  "conflict",
  "commit_failed",
  "commit_clash",
  "commit_no_access",
] as const);

/**
 * A long import is one transaction, so the limits are raised for it alone. It reads by index only:
 * the planner knows nothing yet of tables that this very transaction fills.
 */
export async function raiseLimits(tx: Tx): Promise<void> {
  await tx.execute(sql`select set_config('statement_timeout', '10min', true),
    set_config('idle_in_transaction_session_timeout', '10min', true),
    set_config('enable_seqscan', 'off', true)`);
}

/** Writes progress from outside the transaction, where others can see it before it ends. */
function progressWriter(services: CommitServices, { id, counts }: ImportRow) {
  let written = performance.now();
  let done = 0;
  return async (rows: number) => {
    done += rows;
    if (performance.now() - written < PROGRESS_MS) return;
    written = performance.now();
    await services.pools.system
      .query("update core.import set progress = $2 where id = $1 and state = 'committing'", [
        id,
        Math.min(done / Math.max(counts.rows ?? 0, 1), 0.99),
      ])
      .catch(() => undefined);
  };
}

function reserveNumbers(services: CommitServices, actor: Actor) {
  return (count: number) =>
    withTx({ pool: services.pools[actor.role], nonce: actor.nonce }, async (tx) => {
      const found = await tx.execute<{ first: number | null }>(
        sql`select core.next_numbers(${count}) as first`,
      );
      const first = found.rows[0]?.first;
      if (first == null) throw new Error("no place numbers were given");
      return first;
    });
}

/** Counts of the finished import: what the file held, and what became of it. */
function finalCounts(row: ImportRow, added: CommitCounts, problems: number) {
  const { rows = 0, bad = 0, unknownRows = 0, setAside = 0 } = row.counts;
  const skipped = bad - unknownRows + added.unknownRows;
  return {
    ...added,
    rows,
    good: rows - skipped - setAside,
    setAside,
    bad: skipped,
    skipped,
    problems,
  };
}

/** Records people; of a long file, the thread that seals them lives as long as that takes. */
async function recordPeople(context: CommitContext, rows: number): Promise<void> {
  const lane = rows >= LANE_ROWS ? createPackLane() : null;
  try {
    await commitPeople(context, lane);
  } finally {
    await lane?.stop();
  }
}

async function commitInTx(services: CommitServices, actor: Actor, id: string, tx: Tx) {
  await raiseLimits(tx);
  // Two claims cannot both stand, but a repeated request could start two runs of one claim.
  const alone = await tx.execute<{ alone: boolean }>(
    sql`select pg_try_advisory_xact_lock(hashtextextended(${id}, 7203117)) as alone`,
  );
  if (!alone.rows[0]?.alone) return;
  const row = await loadImport(tx, id);
  if (!row) throw new AccessEndedError();
  if (row.state !== "committing") return;
  const settings = await loadInvestigation(tx, actor.investigationId);
  const keys = await services.keys.of(tx, actor.investigationId);
  const problems = new ProblemList();
  // What depends on the record is found anew; what is wrong with a row by itself stays.
  const own = row.problems.filter(({ code }) => !AFTER_ROWS.has(code));
  problems.add(own);
  problems.count = (row.counts.problems ?? 0) - (row.counts.recordProblems ?? 0);
  const counts = noCounts();
  const pause = createPause();
  const context: CommitContext = {
    tx,
    actor,
    keys,
    settings,
    importId: id,
    createMissing: row.createMissing && row.kind === "pairs",
    today: dayIn(settings.timeZone, now()),
    places: createPlaceBook(tx, actor, keys, reserveNumbers(services, actor), pause),
    counts,
    problems,
    pause,
    progress: progressWriter(services, row),
  };
  await (row.kind === "people"
    ? recordPeople(context, row.counts.rows ?? 0)
    : commitPairs(context));
  counts.addedPlaces = context.places.made;
  await dropStage(tx, id);
  const final = finalCounts(row, counts, problems.count);
  await recordEvent(tx, {
    action: "import.committed",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    fields: counts.knownPeople > 0 ? COMPARED_FIELDS : [],
    counts: final,
  });
  await keepImport(tx, id, {
    state: "committed",
    counts: final,
    problems: problems.sorted(),
    committed: true,
  });
  await announce(tx, "imports", id);
  if (counts.addedPeople + counts.filledPeople + counts.addedExposures + counts.addedPairs > 0) {
    await announce(tx, "people", null);
    // Last of all, because it locks the investigation's row until the commit.
    await recordGraphChange(tx, actor, [{ kind: "bulk" }]);
  }
}

/** The person who asked for the commit no longer acts in this investigation. */
class AccessEndedError extends Error {}

function failureCode(error: unknown): FieldErrorCode {
  if (error instanceof AccessEndedError) return "commit_no_access";
  const state = sqlState(error);
  if (state === "23505") return "commit_clash";
  return state === "42501" ? "commit_no_access" : "commit_failed";
}

/** Says that nothing was stored: with a code while the person may still write, else the bare state. */
async function markFailed(services: CommitServices, actor: Actor, id: string, error: unknown) {
  const problem = { line: 0, column: "file", code: failureCode(error) };
  const context = { pool: services.pools[actor.role], nonce: actor.nonce };
  const said = await withTx(context, async (tx) => {
    const done = await tx.execute(
      sql`update core.import set state = 'failed', progress = 0,
            problems = ${JSON.stringify([problem])}::jsonb || problems
          where id = ${id} and state = 'committing'`,
    );
    if (done.rowCount === 1) await announce(tx, "imports", id);
    return done.rowCount === 1;
  }).catch(() => false);
  if (said) return;
  await services.pools.system
    .query(
      "update core.import set state = 'failed', progress = 0 where id = $1 and state = 'committing'",
      [id],
    )
    .catch(() => undefined);
}

/**
 * Commits a claimed import in one transaction, in the background of the process. Progress is
 * written through another connection. Never throws: a failure becomes the import's state, and
 * nothing of the file is stored.
 */
export async function runCommit(services: CommitServices, actor: Actor, id: string): Promise<void> {
  try {
    // Waits for the claim's own transaction; a claim that was rolled back leaves nothing to do.
    // (Found by id alone: a condition on the state would be judged before the wait.)
    const claimed = await services.pools.system.query<{ state: string }>(
      "select state from core.import where id = $1 for update",
      [id],
    );
    if (claimed.rows[0]?.state !== "committing") return;
    await withTx({ pool: services.pools[actor.role], nonce: actor.nonce }, (tx) =>
      commitInTx(services, actor, id, tx),
    );
    services.log.info({ event: "import committed", importId: id });
  } catch (error) {
    services.log.error({ event: "import failed", importId: id, error: safeError(error) });
    await markFailed(services, actor, id, error);
  }
}
