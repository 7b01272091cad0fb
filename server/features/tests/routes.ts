import { sql } from "drizzle-orm";
import { z } from "zod";
import { listQuery, receipt } from "../../../shared/contracts/common.ts";
import { testInput, testList } from "../../../shared/contracts/tests.ts";
import { ROLES } from "../../../shared/roles.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { dayIn, now } from "../../clock.ts";
import type { Tx } from "../../db/with-tx.ts";
import { announce } from "../../events/record-graph-change.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { loadInvestigation } from "../investigations/store.ts";
import { insertTests } from "../people/store.ts";

const params = z.object({ id: z.uuid(), personId: z.uuid() });

async function requirePerson(tx: Tx, personId: string): Promise<void> {
  const found = await tx.execute(
    sql`select 1 from core.person where id = ${personId} and withdrawn_at is null`,
  );
  if (found.rows.length === 0) throw new HttpProblem("not_found");
}

/** Tests of a person: specimen day, kind, result and its day; several per person. */
export const testRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/people/:personId/tests",
    summary: "Tests of a person",
    policy: ROLES,
    params,
    query: listQuery,
    output: testList,
    async run({ tx, params: { personId }, query }) {
      await requirePerson(tx, personId);
      const found = await tx.execute(
        sql`select id, specimen_date as "specimenDate", kind, result, result_date as "resultDate",
              result_at as "resultAt", recorded_at as "recordedAt", version, count(*) over ()::int as total
            from core.test_result where person_id = ${personId} and withdrawn_at is null
            order by specimen_date desc nulls last, recorded_at desc
            limit ${query.pageSize} offset ${(query.page - 1) * query.pageSize}`,
      );
      return {
        items: found.rows.map(({ total: _total, ...row }) => row),
        total: (found.rows[0]?.total as number | undefined) ?? 0,
        page: query.page,
        pageSize: query.pageSize,
      };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/people/:personId/tests",
    summary: "Record a test",
    policy: ["tracer", "supervisor"],
    params,
    body: testInput,
    output: receipt,
    creates: true,
    async run({ tx, actor, params: { personId }, body }) {
      await requirePerson(tx, personId);
      const settings = await loadInvestigation(tx, actor.investigationId);
      const today = dayIn(settings.timeZone, now());
      for (const key of ["specimenDate", "resultDate"] as const) {
        const value = body[key];
        if (value && /^\d/.test(value) && value > today.slice(0, value.length)) {
          throw invalid({ path: key, code: "in_future" });
        }
      }
      const [id] = await insertTests(tx, actor, [{ personId, ...body }]);
      await announce(tx, "people", personId);
      await recordEvent(tx, {
        action: "test.recorded",
        accountId: actor.accountId,
        role: actor.role,
        investigationId: actor.investigationId,
        personIds: [personId],
        fields: Object.entries(body).flatMap(([key, value]) => (value === null ? [] : [key])),
      });
      return { id, version: 1 };
    },
  }),
];
