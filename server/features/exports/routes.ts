import { z } from "zod";
import { listQuery, receipt } from "../../../shared/contracts/common.ts";
import { exportAnswer, exportInput, exportList } from "../../../shared/contracts/exports.ts";
import { mayIdentify } from "../../../shared/export-columns.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { peopleConditions } from "../../db/people-conditions.ts";
import { announce } from "../../events/record-graph-change.ts";
import { type FileAnswer, fileAnswer } from "../../http/file-answer.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { type Actor, type AnyRoute, defineRoute } from "../../http/route.ts";
import { queueExport } from "./commands/run-export.ts";
import { keysForFile, readParts } from "./parts.ts";
import { fileNameOf, mayDownload, presentExport } from "./present.ts";
import {
  countBuilding,
  countDownload,
  type ExportRow,
  endExport,
  insertExport,
  listExports,
  loadExport,
} from "./store.ts";

const params = z.object({ id: z.uuid() });
const exportParams = z.object({ id: z.uuid(), exportId: z.uuid() });
const EXPORTERS = ["supervisor", "epidemiologist", "officer"] as const;

/** Files of one person that may be waiting or being made at a time. */
const MOST_BUILDING = 5;

function found(row: ExportRow | undefined): ExportRow {
  if (!row) throw new HttpProblem("not_found");
  return row;
}

/** What every event of an export tells, without what was typed. */
const told = (actor: Actor, row: Pick<ExportRow, "id" | "kind" | "purpose" | "identified">) => ({
  accountId: actor.accountId,
  role: actor.role,
  investigationId: actor.investigationId,
  counts: {
    export: row.id,
    of: row.kind,
    identity: row.identified ? "with" : "without",
    purpose: row.purpose,
  },
});

/** Files taken out: asked for, made in the background, fetched by who asked, deleted after a day. */
export const exportRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/exports",
    summary: "Exports, newest first; a data officer sees everybody's, others their own",
    policy: EXPORTERS,
    params,
    query: listQuery,
    output: exportList,
    async run({ tx, actor, query }) {
      if (query.sort) throw invalid({ path: "sort", code: "not_sortable" });
      const { rows, total } = await listExports(tx, actor.role, query);
      const items = rows.map((row) => presentExport(row, actor));
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/exports",
    summary: "Ask for a file of the line list or the contact pairs; it is made in the background",
    policy: EXPORTERS,
    params,
    body: exportInput,
    output: receipt,
    creates: true,
    confirmed: true,
    async run({ tx, actor, body, services, afterCommit }) {
      if (body.identified && !mayIdentify(actor.role)) {
        throw invalid({ path: "identified", code: "not_for_role" });
      }
      // Refused now and beside the field, not when the file is being made.
      peopleConditions(body.filter ?? {}, actor, "filter.");
      if ((await countBuilding(tx, actor)) >= MOST_BUILDING) throw new HttpProblem("conflict");
      const id = await insertExport(tx, actor, body);
      await recordEvent(tx, { action: "export.requested", ...told(actor, { id, ...body }) });
      await announce(tx, "exports", id);
      afterCommit(() => queueExport(services, actor, id));
      return { id };
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/exports/:exportId",
    summary: "An export with its progress",
    policy: EXPORTERS,
    params: exportParams,
    output: exportAnswer,
    async run({ tx, actor, params: { exportId } }) {
      return presentExport(found(await loadExport(tx, actor.role, exportId)), actor);
    },
  }),
  defineRoute({
    method: "delete",
    path: "/api/investigations/:id/exports/:exportId",
    summary: "Cancel a file being made, or delete one that is ready; its entry stays",
    policy: EXPORTERS,
    params: exportParams,
    output: exportAnswer,
    async run({ tx, actor, params: { exportId } }) {
      const row = found(await loadExport(tx, actor.role, exportId));
      if (await endExport(tx, exportId)) {
        await recordEvent(tx, { action: "export.deleted", ...told(actor, row) });
        await announce(tx, "exports", exportId);
      }
      return presentExport(found(await loadExport(tx, actor.role, exportId)), actor);
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/exports/:exportId/file",
    summary: "The file itself, for who asked for it and in the role it was made in",
    policy: EXPORTERS,
    params: exportParams,
    output: fileAnswer,
    sendsFile: true,
    async run({ tx, actor, params: { exportId }, services }): Promise<FileAnswer> {
      const row = found(await loadExport(tx, actor.role, exportId));
      if (!mayDownload(row, actor)) throw new HttpProblem("not_found");
      const keys = await keysForFile(services, actor.investigationId);
      await countDownload(tx, exportId);
      await recordEvent(tx, {
        action: "export.downloaded",
        ...told(actor, row),
        fields: row.columns,
      });
      const context = { pool: services.pools[actor.role], nonce: actor.nonce };
      return {
        name: fileNameOf(row),
        type: "text/csv; charset=utf-8",
        bytes: row.bytes,
        read: () => readParts(context, keys, exportId, row.parts),
      };
    },
  }),
];
