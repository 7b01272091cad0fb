import { z } from "zod";
import { receipt } from "../../../shared/contracts/common.ts";
import {
  type CompareRun,
  compareRunAnswer,
  compareRunInput,
  compareRunList,
  compareRunPatch,
  compareRunQuery,
} from "../../../shared/contracts/compare.ts";
import { unpackInput } from "../../analysis/compare/compare-input.ts";
import { runFile } from "../../analysis/compare/run-file.ts";
import { reportQuestion } from "../../analysis/report-question.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { now } from "../../clock.ts";
import type { Tx } from "../../db/with-tx.ts";
import { announce } from "../../events/record-graph-change.ts";
import { type FileAnswer, fileAnswer } from "../../http/file-answer.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { type Actor, type AnyRoute, defineRoute } from "../../http/route.ts";
import { loadInvestigation } from "../investigations/store.ts";
import { queueRun, stopRun } from "./commands/run-comparison.ts";
import { mayChange, presentRun } from "./present.ts";
import {
  cancelRun,
  countRunning,
  deleteRun,
  insertAgain,
  insertRun,
  listRuns,
  loadInput,
  loadResult,
  loadRun,
  type RunRow,
  renameRun,
} from "./store.ts";

const params = z.object({ id: z.uuid() });
const runParams = z.object({ id: z.uuid(), runId: z.uuid() });
const COMPARERS = ["supervisor", "epidemiologist"] as const;

/** Runs of one person that may be waiting or under way at a time. */
const MOST_RUNNING = 5;

async function found(tx: Tx, actor: Actor, id: string): Promise<RunRow> {
  const row = await loadRun(tx, actor.role, id);
  if (!row) throw new HttpProblem("not_found");
  return row;
}

/** A run that the acting person may change; another's is out of reach of an epidemiologist. */
async function ownToChange(tx: Tx, actor: Actor, id: string): Promise<RunRow> {
  const row = await found(tx, actor, id);
  if (!mayChange(row, actor)) throw new HttpProblem("role_refused");
  return row;
}

async function answerOf(tx: Tx, actor: Actor, id: string): Promise<CompareRun> {
  const row = await found(tx, actor, id);
  return { ...presentRun(row, actor), failure: row.failure, result: await loadResult(tx, id) };
}

type CompareEvent = "requested" | "renamed" | "cancelled" | "deleted" | "downloaded";

/** Puts on record who did what to which run; never its name, which was typed. */
async function told(tx: Tx, actor: Actor, event: CompareEvent, id: string, more = {}) {
  await recordEvent(tx, {
    action: `compare.${event}`,
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    counts: { run: id, ...more },
  });
  if (event !== "downloaded") await announce(tx, "compare", id);
}

async function checkRoom(tx: Tx, actor: Actor): Promise<void> {
  if ((await countRunning(tx, actor)) >= MOST_RUNNING) throw new HttpProblem("conflict");
}

/** Comparisons with random mixing: asked for, made in the background, kept, made again, taken out. */
export const compareRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/compare/runs",
    summary: "Comparisons with random mixing, newest first",
    policy: COMPARERS,
    params,
    query: compareRunQuery,
    output: compareRunList,
    async run({ tx, actor, query }) {
      if (query.sort) throw invalid({ path: "sort", code: "not_sortable" });
      const { rows, total } = await listRuns(tx, actor.role, query);
      const items = rows.map((row) => presentRun(row, actor));
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/compare/runs",
    summary: "Ask for a comparison with random mixing; it is made in the background",
    policy: COMPARERS,
    params,
    body: compareRunInput,
    output: receipt,
    creates: true,
    async run({ tx, actor, body, services, afterCommit }) {
      if (body.from && body.to && body.from > body.to) {
        throw invalid({ path: "to", code: "last_before_first" });
      }
      await checkRoom(tx, actor);
      const settings = await loadInvestigation(tx, actor.investigationId);
      const asked = reportQuestion(body, settings, now());
      const id = await insertRun(tx, actor, body, asked, settings.graphVersion);
      await told(tx, actor, "requested", id, { replicates: body.replicates });
      afterCommit(() => queueRun(services, id));
      return { id };
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/compare/runs/:runId",
    summary: "A comparison with its progress and, once it is ready, its result",
    policy: COMPARERS,
    params: runParams,
    output: compareRunAnswer,
    run: ({ tx, actor, params: { runId } }) => answerOf(tx, actor, runId),
  }),
  defineRoute({
    method: "patch",
    path: "/api/investigations/:id/compare/runs/:runId",
    summary: "Give a comparison another name: who asked for it, or a supervisor",
    policy: COMPARERS,
    params: runParams,
    body: compareRunPatch,
    output: compareRunAnswer,
    async run({ tx, actor, params: { runId }, body }) {
      await ownToChange(tx, actor, runId);
      if (!(await renameRun(tx, runId, body.name))) throw new HttpProblem("not_found");
      await told(tx, actor, "renamed", runId);
      return await answerOf(tx, actor, runId);
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/compare/runs/:runId/again",
    summary: "Run a comparison again on the same input, seed and cut-off: the same result",
    policy: COMPARERS,
    params: runParams,
    output: receipt,
    creates: true,
    async run({ tx, actor, params: { runId }, services, afterCommit }) {
      const { replicates } = await found(tx, actor, runId);
      await checkRoom(tx, actor);
      const id = await insertAgain(tx, actor, runId);
      await told(tx, actor, "requested", id, { replicates, again: runId });
      afterCommit(() => queueRun(services, id));
      return { id };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/compare/runs/:runId/cancel",
    summary: "Stop a comparison under way; its entry stays. One that has ended is left as it is",
    policy: COMPARERS,
    params: runParams,
    output: compareRunAnswer,
    status: 200,
    async run({ tx, actor, params: { runId }, afterCommit }) {
      await ownToChange(tx, actor, runId);
      if (await cancelRun(tx, runId)) {
        await told(tx, actor, "cancelled", runId);
        afterCommit(() => stopRun(runId));
      }
      return await answerOf(tx, actor, runId);
    },
  }),
  defineRoute({
    method: "delete",
    path: "/api/investigations/:id/compare/runs/:runId",
    summary: "Delete a comparison that has ended; one under way is stopped and its entry stays",
    policy: COMPARERS,
    params: runParams,
    output: z.null(),
    status: 204,
    async run({ tx, actor, params: { runId }, afterCommit }) {
      await ownToChange(tx, actor, runId);
      if (await cancelRun(tx, runId)) {
        await told(tx, actor, "cancelled", runId);
        afterCommit(() => stopRun(runId));
      } else if (await deleteRun(tx, runId)) {
        await told(tx, actor, "deleted", runId);
      }
      return null;
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/compare/runs/:runId/file",
    summary: "A finished comparison as JSON: everything needed to work it out elsewhere",
    policy: COMPARERS,
    params: runParams,
    output: fileAnswer,
    sendsFile: true,
    async run({ tx, actor, params: { runId } }): Promise<FileAnswer> {
      const row = await found(tx, actor, runId);
      const result = await loadResult(tx, runId);
      const input = await loadInput(tx, runId);
      if (row.state !== "ready" || !result || !input) throw new HttpProblem("not_found");
      await told(tx, actor, "downloaded", runId, { people: row.people, pairs: row.pairs });
      const file = runFile(presentRun(row, actor), result, await unpackInput(input));
      const body = Buffer.from(`${JSON.stringify(file)}\n`, "utf8");
      return {
        name: `strandline-comparison-${runId.slice(0, 8)}.json`,
        type: "application/json; charset=utf-8",
        bytes: body.length,
        async *read() {
          yield body;
        },
      };
    },
  }),
];
