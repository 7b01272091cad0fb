import { z } from "zod";
import { listQuery, receipt } from "../../../shared/contracts/common.ts";
import {
  followCheckInput,
  followCheckList,
  followEndInput,
  followEndList,
  followUpList,
  followUpQuery,
} from "../../../shared/contracts/follow-up.ts";
import { dayIn, now } from "../../clock.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { findPeople, openPeople } from "../../identity/records.ts";
import { loadInvestigation } from "../investigations/store.ts";
import { listChecks } from "./checks.ts";
import { endFollowUp } from "./commands/end-follow-up.ts";
import { recordCheck } from "./commands/record-check.ts";
import { reopenFollowUp } from "./commands/reopen-follow-up.ts";
import { withdrawCheck } from "./commands/withdraw-check.ts";
import { listEnds } from "./ends.ts";
import { presentFollowUp } from "./present.ts";
import { listFollowUp } from "./queries.ts";
import { checksOf, dayZeroGapsOf, endsOf } from "./store.ts";

const personParams = z.object({ id: z.uuid(), personId: z.uuid() });

/** Contacts to be followed up, and the checks made of them. */
export const followUpRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/follow-up",
    summary: "Contacts with their due days: symptomatic ones on top, then those ending first",
    policy: ["tracer", "supervisor"],
    params: z.object({ id: z.uuid() }),
    query: followUpQuery,
    output: followUpList,
    async run({ tx, actor, services, query }) {
      const settings = await loadInvestigation(tx, actor.investigationId);
      const today = dayIn(settings.timeZone, now());
      const keys = await services.keys.of(tx, actor.investigationId);
      const found = query.q
        ? (await findPeople(tx, keys, query.q, settings.countryCode)).map((one) => one.personId)
        : null;
      const { rows, total, withoutDayZero } = await listFollowUp(
        tx,
        actor,
        query,
        found,
        today,
        settings.monitoringDays,
      );
      const mine = rows.filter((row) => row.mine).map((row) => row.id);
      const opened = await openPeople(tx, keys, mine, ["name", "phone"], "follow_up.listed");
      const ids = rows.map((row) => row.id);
      const checks = await checksOf(tx, ids);
      const ends = await endsOf(tx, ids, settings.timeZone);
      const gaps = await dayZeroGapsOf(
        tx,
        rows.filter((row) => row.dayZero === null).map((row) => row.id),
      );
      return {
        items: rows.map((row) => {
          const kept = {
            checks: checks.get(row.id) ?? [],
            ends: ends.get(row.id),
            gap: gaps.get(row.id),
          };
          return presentFollowUp(row, opened, kept, today, settings);
        }),
        total,
        page: query.page,
        pageSize: query.pageSize,
        today,
        withoutDayZero,
        lostAfterDays: settings.lostAfterDays,
      };
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/follow-up/:personId/checks",
    summary: "Checks of a contact, the latest first",
    policy: ["tracer", "supervisor"],
    params: personParams,
    query: listQuery,
    output: followCheckList,
    async run({ tx, actor, services, params: { personId }, query }) {
      const { items, total } = await listChecks(tx, services.keys, actor, personId, query);
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/follow-up/:personId/checks",
    summary: "Record a check of a contact",
    policy: ["tracer", "supervisor"],
    params: personParams,
    body: followCheckInput,
    output: receipt,
    creates: true,
    async run({ tx, actor, services, params: { personId }, body }) {
      const settings = await loadInvestigation(tx, actor.investigationId);
      return { id: await recordCheck(tx, services.keys, actor, settings, personId, body) };
    },
  }),
  defineRoute({
    method: "delete",
    path: "/api/investigations/:id/follow-up/:personId/checks/:checkId",
    summary: "Take back a check that was entered by mistake",
    policy: ["tracer", "supervisor"],
    params: personParams.extend({ checkId: z.uuid() }),
    output: z.null(),
    status: 204,
    run: ({ tx, actor, params: { personId, checkId } }) =>
      withdrawCheck(tx, actor, personId, checkId),
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/follow-up/:personId/ends",
    summary: "Recorded ends of a contact's follow-up, the latest first, also those taken back",
    policy: ["tracer", "supervisor"],
    params: personParams,
    query: listQuery,
    output: followEndList,
    async run({ tx, actor, params: { personId }, query }) {
      const { items, total } = await listEnds(tx, actor, personId, query);
      return { items, total, page: query.page, pageSize: query.pageSize };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/follow-up/:personId/end",
    summary: "End a contact's follow-up: refused, moved, died, or entered in error",
    policy: ["tracer", "supervisor"],
    params: personParams,
    body: followEndInput,
    output: receipt,
    creates: true,
    async run({ tx, actor, params: { personId }, body }) {
      const settings = await loadInvestigation(tx, actor.investigationId);
      return { id: await endFollowUp(tx, actor, settings, personId, body) };
    },
  }),
  defineRoute({
    method: "delete",
    path: "/api/investigations/:id/follow-up/:personId/end/:endId",
    summary: "Reopen a follow-up: take back its recorded end",
    policy: ["tracer", "supervisor"],
    params: personParams.extend({ endId: z.uuid() }),
    output: z.null(),
    status: 204,
    run: ({ tx, actor, params: { personId, endId } }) => reopenFollowUp(tx, actor, personId, endId),
  }),
];
