import { z } from "zod";
import {
  assignAnswer,
  assigneesAnswer,
  assignInput,
  savedFilterAnswer,
  savedFilterInput,
  savedFilterList,
  savedFilterPatch,
} from "../../../shared/contracts/people-filters.ts";
import { ROLES } from "../../../shared/roles.ts";
import { type AnyRoute, defineRoute } from "../../http/route.ts";
import { loadInvestigation } from "../investigations/store.ts";
import { assignees, assignPeople } from "./commands/assign-people.ts";
import {
  changeSavedFilter,
  dropSavedFilter,
  listSavedFilters,
  saveFilter,
} from "./saved-filters.ts";

const params = z.object({ id: z.uuid() });
const filterParams = z.object({ id: z.uuid(), filterId: z.uuid() });

/** What belongs to working with the line list: assigning several, and filters kept under a name. */
export const peopleListRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/people/assignees",
    summary: "To whom people can be assigned",
    policy: ["supervisor", "officer"],
    params,
    output: assigneesAnswer,
    run: ({ tx, actor }) => assignees(tx, actor),
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/people/assign",
    summary: "Assign several people, named with their versions or by a filter",
    policy: ["tracer", "supervisor"],
    params,
    body: assignInput,
    output: assignAnswer,
    async run({ tx, actor, services, body }) {
      const settings = await loadInvestigation(tx, actor.investigationId);
      const keys = body.filter?.q ? await services.keys.of(tx, actor.investigationId) : null;
      return assignPeople(tx, keys, actor, body, settings.countryCode);
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/people/filters",
    summary: "The acting person's saved filters",
    policy: ROLES,
    params,
    output: savedFilterList,
    run: async ({ tx, actor }) => ({ items: await listSavedFilters(tx, actor) }),
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/people/filters",
    summary: "Keep a filter under a name",
    policy: ROLES,
    params,
    body: savedFilterInput,
    output: savedFilterAnswer,
    run: ({ tx, actor, body }) => saveFilter(tx, actor, body),
  }),
  defineRoute({
    method: "patch",
    path: "/api/investigations/:id/people/filters/:filterId",
    summary: "Rename a saved filter, or change what it asks",
    policy: ROLES,
    params: filterParams,
    body: savedFilterPatch,
    output: savedFilterAnswer,
    run: ({ tx, actor, params: { filterId }, body }) =>
      changeSavedFilter(tx, actor, filterId, body),
  }),
  defineRoute({
    method: "delete",
    path: "/api/investigations/:id/people/filters/:filterId",
    summary: "Delete a saved filter",
    policy: ROLES,
    params: filterParams,
    output: z.null(),
    status: 204,
    async run({ tx, params: { filterId } }) {
      await dropSavedFilter(tx, filterId);
      return null;
    },
  }),
];
