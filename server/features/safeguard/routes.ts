import { z } from "zod";
import {
  accessEventList,
  accessEventsQuery,
  fieldPolicyAnswer,
} from "../../../shared/contracts/safeguard.ts";
import { FIELDS } from "../../../shared/fields.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { invalid } from "../../http/problem.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { listAccessEvents } from "./access-events-store.ts";
import { readCatalogue } from "./catalogue-store.ts";
import { comparePolicy } from "./compare-policy.ts";

const params = z.object({ id: z.uuid() });

/** What a data officer watches: who looked at what, and who may see which field. */
export const safeguardRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/access-events",
    summary: "Who looked at or changed what, newest first",
    policy: ["officer"],
    params,
    query: accessEventsQuery,
    output: accessEventList,
    async run({ tx, actor, query }) {
      if (query.sort) throw invalid({ path: "sort", code: "not_sortable" });
      const { items, total } = await listAccessEvents(tx, query);
      // Reading the record is itself on record; after the read, so that a page shows no shadow.
      await recordEvent(tx, {
        action: "access_events.read",
        accountId: actor.accountId,
        role: actor.role,
        investigationId: actor.investigationId,
        counts: { events: items.length },
      });
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/field-policy",
    summary: "Fields by role, as the registry and as PostgreSQL's catalogue say",
    policy: ["officer"],
    params,
    output: fieldPolicyAnswer,
    async run({ tx, actor }) {
      const policy = comparePolicy(FIELDS, await readCatalogue(tx));
      await recordEvent(tx, {
        action: "field_policy.read",
        accountId: actor.accountId,
        role: actor.role,
        investigationId: actor.investigationId,
        counts: { disagreements: policy.disagreements },
      });
      return policy;
    },
  }),
];
