import { z } from "zod";
import { listQuery, receipt } from "../../../shared/contracts/common.ts";
import { placeInput, placeList } from "../../../shared/contracts/places.ts";
import { openableKeys } from "../../../shared/fields.ts";
import { ROLES } from "../../../shared/roles.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { invalid } from "../../http/problem.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { openPlaces } from "../../identity/records.ts";
import { insertPlace, listPlaces } from "./store.ts";

const params = z.object({ id: z.uuid() });

/** Places: facilities by name, households by number (their names only to who may open them). */
export const placeRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/places",
    summary: "Places on record",
    policy: ROLES,
    params,
    query: listQuery,
    output: placeList,
    async run({ tx, actor, query, services }) {
      if (query.sort) throw invalid({ path: "sort", code: "not_sortable" });
      const { rows, total } = await listPlaces(tx, actor, query);
      const households = rows.filter((row) => row.setting === "household").map((row) => row.id);
      const named = openableKeys(actor.role).includes("address");
      const names =
        named && households.length > 0
          ? await openPlaces(tx, await services.keys.of(tx, actor.investigationId), households)
          : new Map<string, string>();
      return {
        items: rows.map((row) => ({
          id: row.id,
          number: row.number,
          name: row.name ?? names.get(row.id) ?? null,
          setting: row.setting,
          area: row.area,
          recordedAt: row.recordedAt,
          version: row.version,
        })),
        total,
        page: query.page,
        pageSize: query.pageSize,
      };
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/places",
    summary: "Record a place",
    policy: ["tracer", "supervisor"],
    params,
    body: placeInput,
    output: receipt,
    creates: true,
    async run({ tx, actor, body, services }) {
      const keys = await services.keys.of(tx, actor.investigationId);
      const id = await insertPlace(tx, keys, actor, body);
      await recordEvent(tx, {
        action: "place.registered",
        accountId: actor.accountId,
        role: actor.role,
        investigationId: actor.investigationId,
        fields: Object.keys(body),
        counts: { places: 1 },
      });
      return { id, version: 1 };
    },
  }),
];
