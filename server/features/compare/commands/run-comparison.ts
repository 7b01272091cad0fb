import { availableParallelism } from "node:os";
import type { MixingAttribute } from "../../../../shared/contracts/compare.ts";
import type { SummaryQuery } from "../../../../shared/contracts/network.ts";
import { dayString } from "../../../../shared/core/index.ts";
import {
  type CompareInput,
  packInput,
  unpackInput,
} from "../../../analysis/compare/compare-input.ts";
import type { CompareAnswer, CompareJob } from "../../../analysis/compare/compare-jobs.ts";
import { drawBaseline } from "../../../analysis/compare/draw-baseline.ts";
import type { PlannedBaseline } from "../../../analysis/compare/plan-baselines.ts";
import { readRecord } from "../../../analysis/compare/read-record.ts";
import type { DrawnBaseline } from "../../../analysis/compare/summarise.ts";
import { safeError } from "../../../http/translate-error.ts";
import type { Services } from "../../../services.ts";
import { WorkerLane } from "../../../worker-lane.ts";

type RunServices = Pick<Services, "pools" | "hub" | "log">;

const WORKER = new URL("../../../analysis/compare/compare-worker.mjs", import.meta.url);
const PROGRESS_MS = 300;

/** Most time that one baseline may take; what was drawn by then is used, and said to be fewer. */
export const BASELINE_CAP_MS = 120_000;

/** One processor is left to the people who work. */
const workers = () => Math.max(1, availableParallelism() - 1);

/** The thread of comparisons: it starts with the first one and waits for the next. */
const lane = new WorkerLane<CompareJob, CompareAnswer>(WORKER, "compare");

type AskedRun = {
  investigationId: string;
  question: SummaryQuery;
  attribute: MixingAttribute | null;
  replicates: number;
  seed: number;
  input: Buffer | null;
};

/** The run was cancelled or deleted while it was being made. */
class CancelledError extends Error {}

type Run = {
  readonly id: string;
  readonly services: RunServices;
  readonly asked: AskedRun;
  readonly stop: AbortController;
};

/** Says that a run changed. Others ask again by themselves and get what their role may have. */
function publish({ hub }: RunServices, investigationId: string, id: string): void {
  hub.publish(investigationId, { topic: "compare", id, version: null });
}

/** Changes a run that is still wanted. @throws CancelledError when it is not */
async function change(run: Run, set: string, values: readonly unknown[]): Promise<void> {
  const done = await run.services.pools.system.query(
    `update core.compare_run set ${set} where id = $1 and state = 'running'`,
    [run.id, ...values],
  );
  if (done.rowCount !== 1) throw new CancelledError();
}

async function readAsked(services: RunServices, id: string): Promise<AskedRun | undefined> {
  const found = await services.pools.system.query<AskedRun>(
    `select investigation_id as "investigationId", question, attribute, replicates,
       seed::float8 as seed, input
     from core.compare_run where id = $1 and state = 'running'`,
    [id],
  );
  return found.rows[0];
}

/** The input of a run: the stored one, or else read from the record and stored. */
async function inputOf(run: Run): Promise<CompareInput> {
  const { asked, services } = run;
  if (asked.input) return await unpackInput(asked.input);
  const { investigationId, question, attribute } = asked;
  const record = await readRecord(services.pools.system, investigationId, question, attribute);
  if (!record) throw new CancelledError();
  const input = await lane.run({ kind: "gather", record, attribute });
  const { from, to } = record.asked.question;
  await change(
    run,
    `input = $2, people = $3, pairs = $4, graph_version = $5, as_of = $6, cut_off = $7,
     from_day = $8, to_day = $9`,
    [
      await packInput(input),
      input.studyNumbers.length,
      input.pairs.a.length,
      record.snapshot.version,
      record.asked.asOf,
      record.asked.cutOff,
      from === null ? null : dayString(from),
      to === null ? null : dayString(to),
    ],
  );
  publish(services, investigationId, run.id);
  return input;
}

/**
 * Writes progress where others can see it before the run is done, and so learns of a cancel that
 * another process or a reset of the investigation brought about.
 */
function progressWriter(run: Run) {
  let written = 0;
  return (share: number, reached: number) => {
    if (performance.now() - written < PROGRESS_MS) return;
    written = performance.now();
    change(run, "progress = $2, reached = $3", [Math.min(share, 0.99), reached])
      .then(() => publish(run.services, run.asked.investigationId, run.id))
      .catch((error: unknown) => {
        if (error instanceof CancelledError) run.stop.abort();
      });
  };
}

/** Draws one baseline after another. @throws CancelledError */
async function draw(run: Run, planned: readonly PlannedBaseline[]): Promise<DrawnBaseline[]> {
  const { replicates } = run.asked;
  const total = planned.filter(({ plan }) => plan !== null).length;
  const progress = progressWriter(run);
  const drawn: DrawnBaseline[] = [];
  let ready = 0;
  let least = replicates;
  for (const { plan, ...one } of planned) {
    if (plan === null) {
      drawn.push({ ...one, table: null, reached: 0 });
      continue;
    }
    const before = ready;
    const made = await drawBaseline(lane, plan, {
      replicates,
      workers: workers(),
      capMs: BASELINE_CAP_MS,
      signal: run.stop.signal,
      onProgress: (done) => {
        // Told as reached is what every baseline has: the first one leads until it is done.
        const reached = before === 0 ? done : least;
        progress((before + done / replicates) / total, Math.min(reached, least));
      },
    });
    if (made.stopped === "cancel") throw new CancelledError();
    ready += 1;
    least = Math.min(least, made.reached);
    drawn.push({ ...one, table: made.table, reached: made.reached });
  }
  return drawn;
}

function reachedOf(drawn: readonly DrawnBaseline[]): number {
  const all = drawn.filter(({ table }) => table !== null).map(({ reached }) => reached);
  return all.length === 0 ? 0 : Math.min(...all);
}

async function make(run: Run): Promise<void> {
  const { asked } = run;
  const input = await inputOf(run);
  const planned = await lane.run({ kind: "plan", input, seed: asked.seed });
  const drawn = await draw(run, planned);
  const result = await lane.run({ kind: "summarise", input, drawn });
  await change(
    run,
    "state = 'ready', progress = 1, reached = $2, result = $3::jsonb, finished_at = now()",
    [reachedOf(drawn), JSON.stringify(result)],
  );
}

/** Runs that wait or are under way in this process, to be stopped at once. */
const stops = new Map<string, AbortController>();

/**
 * Makes a comparison that was asked for, in the background of the process, as the system login: it
 * reads pseudonymous data only, and goes on when whoever asked has left. Never throws: a failure
 * becomes the run's state.
 */
async function runComparison(services: RunServices, id: string, stop: AbortController) {
  let investigationId: string | null = null;
  try {
    const asked = stop.signal.aborted ? undefined : await readAsked(services, id);
    if (!asked) return;
    investigationId = asked.investigationId;
    await make({ id, services, asked, stop });
    services.log.info({ event: "comparison made", runId: id });
  } catch (error) {
    if (error instanceof CancelledError) {
      services.log.info({ event: "comparison cancelled", runId: id });
      return;
    }
    services.log.error({ event: "comparison failed", runId: id, error: safeError(error) });
    await services.pools.system
      .query(
        `update core.compare_run set state = 'failed', failure = 'compare_failed',
           finished_at = now() where id = $1 and state = 'running'`,
        [id],
      )
      .catch(() => undefined);
  } finally {
    stops.delete(id);
    if (investigationId) publish(services, investigationId, id);
  }
}

/** Comparisons are made one after the other: each takes all processors but one. */
let queue: Promise<void> = Promise.resolve();

/** Has a comparison made as soon as those asked for before it are done. */
export function queueRun(services: RunServices, id: string): void {
  const stop = new AbortController();
  stops.set(id, stop);
  queue = queue.then(() => runComparison(services, id, stop)).catch(() => undefined);
}

/** Stops a comparison of this process at once; the database says already that it is cancelled. */
export function stopRun(id: string): void {
  stops.get(id)?.abort();
}

/** Stops all comparisons and waits for the one under way: the process ends. */
export async function stopRuns(): Promise<void> {
  for (const stop of stops.values()) stop.abort();
  await queue;
  await lane.stop();
}
