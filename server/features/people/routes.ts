import { z } from "zod";
import { listQuery, uuid } from "../../../shared/contracts/common.ts";
import {
  matchAnswer,
  matchInput,
  matchReviewList,
  type PeopleQuery,
  type PersonPatch,
  peopleList,
  peopleQuery,
  peopleSearch,
  personPage,
  personPatch,
  personRegistration,
} from "../../../shared/contracts/people.ts";
import { openableKeys } from "../../../shared/fields.ts";
import { ROLES } from "../../../shared/roles.ts";
import { recordEvent } from "../../audit/record-event.ts";
import { HttpProblem } from "../../http/problem.ts";
import { type AnyRoute, defineRoute, type RunContext } from "../../http/route.ts";
import { loadInvestigation } from "../investigations/store.ts";
import { changePerson } from "./commands/change-person.ts";
import { registerPerson } from "./commands/register-person.ts";
import { listPeople } from "./list.ts";
import { matchPeople } from "./match.ts";
import { listMatchReviews } from "./match-reviews.ts";
import { personPageParts } from "./page.ts";
import { LIST_FIELDS, PAGE_FIELDS, presentPeople } from "./present.ts";
import { peopleById } from "./queries.ts";

const params = z.object({ id: z.uuid() });
const personParams = z.object({ id: z.uuid(), personId: z.uuid() });

type Context<P, Q, B> = Pick<RunContext<P, Q, B>, "tx" | "actor" | "services">;

async function list(
  { tx, actor, services }: Context<unknown, unknown, unknown>,
  query: PeopleQuery,
) {
  const settings = await loadInvestigation(tx, actor.investigationId);
  const names = openableKeys(actor.role).length > 0;
  const keys = names ? await services.keys.of(tx, actor.investigationId) : null;
  const { rows, total } = await listPeople(tx, keys, actor, query, settings.countryCode);
  const action = query.q ? "people.searched" : "people.listed";
  if (query.q && names && !rows.some((row) => row.mine)) {
    // Nobody's identity is opened, and still somebody was looked for.
    await recordEvent(tx, {
      action,
      accountId: actor.accountId,
      role: actor.role,
      investigationId: actor.investigationId,
      counts: { found: total },
    });
  }
  return {
    items: await presentPeople(tx, services.keys, actor, rows, LIST_FIELDS, action),
    total,
    page: query.page,
    pageSize: query.pageSize,
  };
}

async function page({ tx, actor, services }: Context<unknown, unknown, unknown>, personId: string) {
  const settings = await loadInvestigation(tx, actor.investigationId);
  const [person] = await peopleById(tx, actor.role, [personId]);
  if (!person) throw new HttpProblem("not_found");
  const [shown] = await presentPeople(
    tx,
    services.keys,
    actor,
    [person],
    PAGE_FIELDS,
    "person.opened",
  );
  return { ...shown, ...(await personPageParts(tx, services.keys, actor, person, settings)) };
}

/** People: line list, search, registering, the person's page and its changes. */
export const peopleRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/people",
    summary: "The line list",
    policy: ROLES,
    params,
    query: peopleQuery,
    output: peopleList,
    run: (context) => list(context, context.query),
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/people/search",
    summary: "The line list, asked with a body so that a typed name stands in no address",
    policy: ROLES,
    params,
    body: peopleSearch,
    output: peopleList,
    run: (context) => list(context, context.body),
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/people",
    summary: "Register a person",
    policy: ["tracer", "supervisor"],
    params,
    body: personRegistration,
    output: z.strictObject({ id: uuid, studyNumber: z.string(), version: z.int() }),
    creates: true,
    async run({ tx, actor, services, body }) {
      const settings = await loadInvestigation(tx, actor.investigationId);
      return registerPerson(tx, services.keys, actor, settings, body);
    },
  }),
  defineRoute({
    method: "post",
    path: "/api/investigations/:id/people/matches",
    summary: "People already on record that the acting person may see, while typing",
    policy: ["tracer", "supervisor"],
    params,
    body: matchInput,
    output: matchAnswer,
    async run({ tx, actor, services, body }) {
      const settings = await loadInvestigation(tx, actor.investigationId);
      return { items: await matchPeople(tx, services.keys, actor, body, settings.countryCode) };
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/people/:personId",
    summary: "A person's page",
    policy: ROLES,
    params: personParams,
    output: personPage,
    run: (context) => page(context, context.params.personId),
  }),
  defineRoute({
    method: "patch",
    path: "/api/investigations/:id/people/:personId",
    summary: "Change a person",
    policy: ["tracer", "supervisor"],
    params: personParams,
    body: personPatch,
    output: personPage,
    async run(context) {
      const { tx, actor, services, body } = context;
      const settings = await loadInvestigation(tx, actor.investigationId);
      const [person] = await peopleById(tx, actor.role, [context.params.personId]);
      if (!person?.mine) throw new HttpProblem("not_found");
      await changePerson(
        tx,
        services.keys,
        actor,
        settings,
        person,
        body as unknown as PersonPatch,
      );
      return page(context, person.id);
    },
  }),
  defineRoute({
    method: "get",
    path: "/api/investigations/:id/match-reviews",
    summary: "New people who may be on record already, for a supervisor to look at",
    policy: ["supervisor"],
    params,
    query: listQuery,
    output: matchReviewList,
    async run({ tx, actor, query }) {
      const { rows, total } = await listMatchReviews(tx, actor, query);
      await recordEvent(tx, {
        action: "match_reviews.listed",
        accountId: actor.accountId,
        role: actor.role,
        investigationId: actor.investigationId,
        personIds: [...new Set(rows.flatMap((row) => [row.personId, row.otherId]))],
      });
      return {
        items: rows,
        total,
        page: query.page,
        pageSize: query.pageSize,
      };
    },
  }),
];
