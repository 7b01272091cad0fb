import { z } from "zod";
import { listOf, listQuery } from "../../../shared/contracts/common.ts";
import {
  headingsAnswer,
  headingsInput,
  importAnswer,
  importCommitInput,
  importInput,
  importMatchList,
  importMatchQuery,
  matchDecisionAnswer,
  matchDecisionInput,
} from "../../../shared/contracts/imports.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { decideMatches } from "./commands/decide-matches.ts";
import { runCommit } from "./commands/run-commit.ts";
import { stageFile } from "./commands/stage-file.ts";
import { listMatches } from "./list-matches.ts";
import { presentHeadings, presentImport } from "./present.ts";
import { readHeadings } from "./read-headings.ts";
import { claimCommit, type ImportRow, listImports, loadImport } from "./store.ts";

const params = z.object({ id: z.uuid() });
const importParams = z.object({ id: z.uuid(), importId: z.uuid() });
const LEADERS = ["supervisor", "officer"] as const;

/** Problems in the answer to an upload: it is kept as a receipt, so it stays small. */
const RECEIPT_PROBLEMS = 100;

function found(row: ImportRow | undefined): ImportRow {
  if (!row) throw new HttpProblem("not_found");
  return row;
}

/** Files brought in: staged with their problems and counts, then committed. */
export const importRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/imports",
    summary: "Imports, newest first, with their counts and without their problems",
    policy: LEADERS,
    params,
    query: listQuery,
    output: listOf(importAnswer),
    async run({ tx, query }) {
      if (query.sort) throw invalid({ path: "sort", code: "not_sortable" });
      const { rows, total } = await listImports(tx, query);
      const items = rows.map((row) => presentImport(row, 0));
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/imports",
    summary: "Check a file and stage its good rows; lists the first hundred problems",
    policy: LEADERS,
    params,
    upload: true,
    body: importInput,
    output: importAnswer,
    creates: true,
    async run({ tx, actor, body, file, services }) {
      if (!file) throw invalid({ path: "file", code: "required" });
      const id = await stageFile(tx, services, actor, body.kind, file.buffer, body.columns ?? null);
      return presentImport(found(await loadImport(tx, id)), RECEIPT_PROBLEMS);
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/imports/headings",
    summary: "What the first line of a file says: encoding, separator, columns; keeps nothing",
    policy: LEADERS,
    params,
    upload: true,
    body: headingsInput,
    output: headingsAnswer,
    async run({ body, file }) {
      if (!file) throw invalid({ path: "file", code: "required" });
      return presentHeadings(body.kind, await readHeadings(file.buffer));
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/imports/:importId",
    summary: "An import with its problems (the first ten thousand) and progress",
    policy: LEADERS,
    params: importParams,
    output: importAnswer,
    async run({ tx, params: { importId } }) {
      return presentImport(found(await loadImport(tx, importId)));
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/imports/:importId/commit",
    summary: "Put the good rows on record; goes on in the background",
    policy: LEADERS,
    params: importParams,
    body: importCommitInput.prefault({}),
    output: importAnswer,
    status: 202,
    async run({ tx, actor, params: { importId }, body, services }) {
      const claimed = await claimCommit(tx, importId, body.createMissing);
      const row = found(await loadImport(tx, importId));
      if (claimed) void runCommit(services, actor, importId);
      // Asked again while it runs or when it is done: the answer says so and nothing is added.
      else if (row.state !== "committing" && row.state !== "committed") {
        throw new HttpProblem("conflict");
      }
      return presentImport(row, RECEIPT_PROBLEMS);
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/imports/:importId/matches",
    summary: "Rows set aside because they may be somebody else; the reading is recorded",
    policy: LEADERS,
    params: importParams,
    query: importMatchQuery,
    output: importMatchList,
    async run({ tx, actor, params: { importId }, query, services }) {
      found(await loadImport(tx, importId));
      const keys = await services.keys.of(tx, actor.investigationId);
      return listMatches(tx, actor, keys, importId, query);
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/imports/:importId/matches",
    summary: "Decide about rows set aside: some, or the next two hundred of a kind",
    policy: LEADERS,
    params: importParams,
    body: matchDecisionInput,
    output: matchDecisionAnswer,
    async run({ tx, actor, params: { importId }, body, services }) {
      return decideMatches(tx, services, actor, importId, body);
    },
  }),
];
