import { z } from "zod";
import { listQuery, receipt } from "../../../shared/contracts/common.ts";
import { testInput, testList } from "../../../shared/contracts/tests.ts";
import { ROLES } from "../../../shared/roles.ts";
import { isCase } from "../../../shared/vocabulary.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { dayIn, now } from "../../clock.ts";
import { announce, recordGraphChange } from "../../events/record-graph-change.ts";
import { invalid } from "../../http/problem.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { loadInvestigation } from "../investigations/store.ts";
import { insertTests } from "../people/store.ts";
import { listTests, requirePerson } from "./queries.ts";

const params = z.object({ id: z.uuid(), personId: z.uuid() });

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
      const { rows, total } = await listTests(tx, personId, query);
      return {
        items: rows,
        total,
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
      const { classification } = await requirePerson(tx, personId);
      const settings = await loadInvestigation(tx, actor.investigationId);
      const today = dayIn(settings.timeZone, now());
      for (const key of ["specimenDate", "resultDate"] as const) {
        const value = body[key];
        if (value && /^\d/.test(value) && value > today.slice(0, value.length)) {
          throw invalid({ path: key, code: "in_future" });
        }
      }
      const [id] = await insertTests(tx, actor, [{ personId, ...body }]);
      // The specimen day of a case without an onset is what its clusters stand on.
      if (isCase(classification)) {
        const change = { kind: "classification", personA: personId } as const;
        await recordGraphChange(tx, actor, [change], personId);
      }
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
