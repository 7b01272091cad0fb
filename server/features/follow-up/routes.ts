import { z } from "zod";
import { followUpList, followUpQuery } from "../../../shared/contracts/follow-up.ts";
import { dayIn, now } from "../../clock.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { findPeople, openPeople } from "../../identity/records.ts";
import { loadInvestigation } from "../investigations/store.ts";
import { presentFollowUp } from "./present.ts";
import { listFollowUp } from "./queries.ts";

/** The list of contacts to be followed up. */
export const followUpRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/follow-up",
    summary: "Contacts with their due days, those ending first at the top",
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
      const { monitoringDays } = settings;
      const { rows, total, withoutDayZero } = await listFollowUp(
        tx,
        query,
        found,
        today,
        monitoringDays,
      );
      const mine = rows.filter((row) => row.mine).map((row) => row.id);
      const opened = await openPeople(tx, keys, mine, ["name", "phone"], "follow_up.listed");
      return {
        items: rows.map((row) => presentFollowUp(row, opened, today, monitoringDays)),
        total,
        page: query.page,
        pageSize: query.pageSize,
        today,
        withoutDayZero,
      };
    },
  }),
];
