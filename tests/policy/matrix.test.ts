import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import type { AnyRoute } from "../../server/http/route.ts";
import { plainRoutes, ROUTES } from "../../server/routes.ts";
import { ROLES, type Role } from "../../shared/roles.ts";
import { buildAccount, buildMember } from "../support/factories.ts";
import { bodyFor, exportOf, madeRun, stageImport } from "./support/bodies.ts";
import {
  type Answer,
  cookiesOf,
  inBatches,
  knock,
  OUTSIDERS,
  VISITORS,
  type VisitorName,
} from "./support/visitors.ts";
import { makeWorld, type World } from "./support/world.ts";

let world: World;
let cookies: Record<VisitorName, string>;
let absent: Answer;
/** Ids of objects in the own and in the other investigation, by name of the path parameter. */
let objects: Record<string, { own: string; other: string }>;

beforeAll(async () => {
  world = await makeWorld();
  cookies = await cookiesOf(world);
  objects = {
    personId: { own: world.people.held, other: world.foreign },
    checkId: { own: await checkOf(world.people.held), other: await checkOf(world.foreign) },
    endId: { own: await endOf(world.people.held), other: await endOf(world.foreign) },
    memberId: {
      own: world.everyone.epidemiologist.memberId,
      other: world.others.epidemiologist.memberId,
    },
    invitationId: {
      own: await openInvitation(world.here),
      other: await openInvitation(world.elsewhere),
    },
    teamId: { own: await teamIn(world.here), other: await teamIn(world.elsewhere) },
    // Saved filters are each account's own: addressOf makes one for whoever knocks.
    filterId: {
      own: randomUUID(),
      other: await savedFilterOf(world.elsewhere, world.others.supervisor.accountId),
    },
    exportId: {
      own: await exportOf(world, "officer"),
      other: await exportOf(world, "officer", world.others.officer),
    },
    runId: {
      own: await madeRun(world, "supervisor"),
      other: await madeRun(world, "supervisor", world.others.supervisor),
    },
    importId: {
      own: await stageImport(world.everyone.supervisor),
      other: await stageImport(world.others.supervisor),
    },
  };
  absent = await knock(world.app, {
    method: "get",
    path: `/api/investigations/${randomUUID()}`,
    cookie: cookies.officer,
  });
});

afterAll(async () => {
  await world?.close();
});

/** A check of a person, whoever may see it. */
async function checkOf(personId: string): Promise<string> {
  const made = await world.admin.query(
    `insert into core.follow_check (id, investigation_id, person_id, day, outcome)
     select gen_random_uuid(), investigation_id, id, '2026-03-04', 'seen' from core.person
     where id = $1 returning id`,
    [personId],
  );
  return made.rows[0].id;
}

/** A team without members, past the routes. */
async function teamIn(investigationId: string): Promise<string> {
  const id = randomUUID();
  await world.admin.query(
    "insert into core.team (id, investigation_id, name) values ($1, $2, $3)",
    [id, investigationId, `Team ${id.slice(0, 8)}`],
  );
  return id;
}

/** Another person held by whoever holds the held one. */
async function likeHeld(): Promise<string> {
  const made = await world.admin.query(
    `insert into core.person (id, investigation_id, study_number, classification,
       assigned_account_id, recorded_by)
     select gen_random_uuid(), investigation_id, left(gen_random_uuid()::text, 8), 'contact',
       assigned_account_id, recorded_by from core.person where id = $1 returning id`,
    [world.people.held],
  );
  return made.rows[0].id;
}

/** An end of a person's follow-up. */
async function endOf(personId: string): Promise<string> {
  const made = await world.admin.query(
    `insert into core.follow_end (id, investigation_id, person_id, reason, day)
     select gen_random_uuid(), investigation_id, id, 'moved', '2099-03-04' from core.person
     where id = $1 returning id`,
    [personId],
  );
  return made.rows[0].id;
}

/** An invitation that nobody took up, past the routes. */
async function openInvitation(investigationId: string): Promise<string> {
  const id = randomUUID();
  await world.admin.query(
    `insert into auth.invitation (id, token_hash, kind, email, investigation_id, role, expires_at)
     values ($1, $2, 'invitation', 'open@body.example', $3, 'tracer', now() + interval '1 hour')`,
    [id, randomUUID(), investigationId],
  );
  return id;
}

/** A saved filter of an account, past the routes. */
async function savedFilterOf(investigationId: string, accountId: string): Promise<string> {
  const id = randomUUID();
  await world.admin.query(
    `insert into core.saved_filter (id, investigation_id, account_id, name, filter)
     values ($1, $2, $3, $4, '{}')`,
    [id, investigationId, accountId, randomUUID()],
  );
  return id;
}

type Where = "own" | "other" | "random" | "malformed";
const WHERE: readonly Where[] = ["own", "other", "random", "malformed"];
const paramsOf = (path: string) => [...path.matchAll(/:(\w+)/g)].map((match) => match[1] as string);

/** An address of a route: in which investigation, and which object there. */
async function addressOf(
  route: AnyRoute,
  where: Where,
  object: Where,
  visitor?: VisitorName,
): Promise<string> {
  const pick = (at: Where, own: string, other: string) =>
    ({ own, other, random: randomUUID(), malformed: "not-an-id" })[at];
  let path = route.path;
  for (const name of paramsOf(route.path)) {
    if (name === "id") {
      path = path.replace(":id", pick(where, world.here, world.elsewhere));
      continue;
    }
    const known = objects[name];
    if (!known) throw new Error(`the matrix has no object for :${name}; add one`);
    let { own } = known;
    if (route.method === "delete" && object === "own" && name === "memberId") {
      // What a deletion may end is made for it.
      const account = await buildAccount(world.app);
      own = await buildMember(world.app, world.here, account.id, "tracer");
    }
    if (route.method === "delete" && object === "own" && name === "checkId") {
      own = await checkOf(world.people.held);
    }
    if (route.method === "delete" && object === "own" && name === "teamId") {
      own = await teamIn(world.here);
    }
    if (route.method === "delete" && object === "own" && name === "endId") {
      // One follow-up has one end, so each deletion gets a contact of its own.
      const person = await likeHeld();
      own = await endOf(person);
      path = path.replace(world.people.held, person);
    }
    if (route.method === "delete" && object === "own" && name === "invitationId") {
      own = await openInvitation(world.here);
    }
    if (object === "own" && name === "filterId") {
      const role = ROLES.find((one) => one === visitor) ?? "tracer";
      own = await savedFilterOf(world.here, world.everyone[role].accountId);
    }
    const make = { exportId: exportOf, runId: madeRun }[name];
    if (make && object === "own" && holds(route, visitor ?? "anonymous")) {
      // A file or a comparison is its maker's: each has one of their own.
      own = await make(world, visitor as Role);
    }
    path = path.replace(`:${name}`, pick(object, own, known.other));
  }
  return path;
}

function send(route: AnyRoute, path: string, visitor: VisitorName, extra: object = {}) {
  const { body, form } = bodyFor(route, world);
  return knock(world.app, {
    method: route.method,
    path,
    cookie: cookies[visitor],
    body,
    ...(form ? { form } : {}),
    ...extra,
  });
}

const holds = (route: AnyRoute, visitor: VisitorName) =>
  (route.policy as readonly string[]).includes(visitor);

/** What the policy alone says of a knock; "served" is anything but a refusal of access. */
function expected(route: AnyRoute, visitor: VisitorName, where: Where, object: Where) {
  if ((OUTSIDERS as readonly string[]).includes(visitor)) return 401;
  if (!holds(route, visitor)) return 403;
  if (where !== "own") return 404;
  const inner = paramsOf(route.path).length > 1;
  return inner && object !== "own" ? 404 : "served";
}

const SERVED = [200, 201, 202, 204, 409, 422];

function headersOf(answer: Answer): Record<string, string> {
  const kept = [...answer.headers].filter(
    ([name]) => !["date", "set-cookie", "etag", "keep-alive", "x-request-id"].includes(name),
  );
  return Object.fromEntries(kept);
}

const bodyOf = (answer: Answer) => ({ ...JSON.parse(answer.text), instance: "" });
const title = (route: AnyRoute) => `${route.method.toUpperCase()} ${route.path}`;

describe.each(ROUTES.map((route) => [title(route), route] as const))("%s", (_title, route) => {
  beforeAll(async () => {
    if (!route.confirmed) return;
    // A slow run takes longer than a password stays fresh.
    await world.admin.query(
      `update auth.session set sess = jsonb_set(sess::jsonb, '{startedAt}', to_jsonb(now()))::json`,
    );
  });

  test("visitors × investigations × objects", async () => {
    const inner = paramsOf(route.path).length > 1;
    const cases = VISITORS.flatMap((visitor) =>
      WHERE.flatMap((where) =>
        (inner ? WHERE : (["own"] as const)).map((object) => ({ visitor, where, object })),
      ),
    );
    await inBatches(cases, async ({ visitor, where, object }) => {
      const path = await addressOf(route, where, object, visitor);
      const answer = await send(route, path, visitor);
      const say = `${visitor}, investigation ${where}, object ${object}: ${answer.text.slice(0, 200)}`;
      const wanted = expected(route, visitor, where, object);
      if (wanted === "served") expect(SERVED, say).toContain(answer.status);
      else expect(answer.status, say).toBe(wanted);
      if (wanted === 404) {
        expect(answer.text, say).toBe(absent.text);
        expect(headersOf(answer), say).toEqual(headersOf(absent));
      }
      if (answer.status >= 400) {
        expect(answer.headers.get("content-type")).toBe("application/problem+json; charset=utf-8");
        const known = ["code", "errors", "instance", "status", "title", "type"];
        const more = Object.keys(bodyOf(answer)).filter((key) => !known.includes(key));
        expect(more, say).toEqual([]);
      }
      expect(answer.headers.get("cache-control"), say).toBe("no-store");
    });
  });

  test("HEAD follows GET, other methods are not taken", async () => {
    const path = await addressOf(route, "own", "own");
    const methods = ROUTES.filter((one) => one.path === route.path).map((one) => one.method);
    for (const visitor of ["anonymous", "tracer", "officer"] as const) {
      if (route.method === "get") {
        const get = await send(route, path, visitor);
        const head = await send(route, path, visitor, { method: "head" });
        expect([visitor, head.status, head.text]).toEqual([visitor, get.status, ""]);
      }
      for (const method of ["get", "post", "put", "patch", "delete", "options"] as const) {
        if ((methods as string[]).includes(method)) continue;
        const answer = await knock(world.app, { method, path, cookie: cookies[visitor] });
        expect([visitor, method, answer.status]).toEqual([visitor, method, 405]);
        const allowed = answer.headers.get("allow")?.toLowerCase().split(", ") ?? [];
        expect(allowed.filter((one) => one !== "head").sort()).toEqual([...methods].sort());
      }
    }
  });

  if (route.method === "get") return;
  test("only from this site, and creates only with a key", async () => {
    const path = await addressOf(route, "own", "own");
    const role = route.policy[0] as Role;
    for (const headers of [
      { Origin: null },
      { Origin: "https://elsewhere.example" },
      { "Sec-Fetch-Site": "cross-site" },
    ]) {
      for (const visitor of ["anonymous", role] as const) {
        const answer = await send(route, path, visitor, { headers });
        expect(answer.status).toBe(403);
        expect(bodyOf(answer).code).toBe("origin_refused");
      }
    }
    if (!route.creates) return;
    for (const visitor of VISITORS) {
      const answer = await send(route, path, visitor, { key: false });
      const wanted = expected(route, visitor, "own", "own");
      expect([visitor, answer.status]).toEqual([visitor, wanted === "served" ? 400 : wanted]);
      if (wanted === "served") expect(bodyOf(answer).code).toBe("idempotency_key_required");
    }
  });
});

test("routes outside an investigation: outsiders 401, roles by the access rule", async () => {
  for (const route of plainRoutes(world.app.services)) {
    const inner = route.path.includes(":id");
    const cases = VISITORS.flatMap((visitor) =>
      (inner ? WHERE : (["own"] as const)).map((where) => ({ visitor, where })),
    );
    for (const { visitor, where } of cases) {
      const outside = (OUTSIDERS as readonly string[]).includes(visitor);
      const roles = Array.isArray(route.access) ? (route.access as readonly string[]) : null;
      let wanted: number | "served" = "served";
      if (route.access !== "public" && outside) wanted = 401;
      else if (roles && !roles.includes(visitor)) wanted = 403;
      else if (where !== "own") wanted = 404;
      // Signing out for good would end the visitor's session; its own tests do it.
      if (route.method === "delete" && wanted === "served") continue;
      const ids = { own: world.here, other: world.elsewhere, random: randomUUID(), malformed: "x" };
      const answer = await knock(world.app, {
        method: route.method,
        path: route.path.replace(":id", ids[where]),
        cookie: cookies[visitor],
        body: route.method === "get" || route.method === "delete" ? undefined : {},
      });
      const say = `${route.method} ${route.path}, ${visitor}, ${where}: ${answer.text.slice(0, 200)}`;
      if (wanted === "served") expect(SERVED, say).toContain(answer.status);
      else expect(answer.status, say).toBe(wanted);
    }
  }
});

test("a person of one's own investigation but out of a tracer's scope is as absent as none", async () => {
  const about = ROUTES.filter((route) => route.path.includes(":personId"));
  expect(about.length).toBeGreaterThan(3);
  for (const route of about.filter((one) => holds(one, "tracer"))) {
    const path = route.path.replace(":id", world.here).replace(":personId", world.people.stranger);
    const answer = await send(route, path, "tracer");
    expect([title(route), answer.status]).toEqual([title(route), 404]);
    expect(answer.text).toBe(absent.text);
  }
});

test("ids inside a body or a query tell nothing of people out of scope", async () => {
  const ids = [world.people.stranger, world.foreign, randomUUID()];
  const contact = { name: null, phone: null, setting: "social" };
  const requests = (id: string) => [
    {
      method: "post",
      path: "interviews",
      body: { personId: id, outcome: "complete", channel: "visit" },
    },
    {
      method: "post",
      path: "interviews",
      body: {
        personId: world.people.held,
        outcome: "complete",
        channel: "visit",
        contacts: [{ ...contact, personId: id }],
      },
    },
    {
      method: "post",
      path: "interviews",
      body: {
        personId: world.people.held,
        outcome: "complete",
        channel: "visit",
        contacts: [{ ...contact, name: "Some Body", placeId: id }],
      },
    },
    { method: "get", path: `interviews?personId=${id}`, body: undefined },
  ];
  for (let at = 0; at < requests("").length; at++) {
    const answers = [];
    for (const id of ids) {
      const one = requests(id)[at];
      if (!one) continue;
      const path = `/api/investigations/${world.here}/${one.path}`;
      answers.push(await knock(world.app, { ...one, path, cookie: cookies.tracer }));
    }
    const [first, ...rest] = answers.map((answer) => ({
      status: answer.status,
      body: bodyOf(answer),
    }));
    if (requests("")[at]?.method === "post") expect([404, 422]).toContain(first?.status);
    for (const answer of rest) expect(answer).toEqual(first);
  }
});

test("addresses nobody declared are not found, with or without a session", async () => {
  for (const visitor of ["anonymous", "officer"] as const) {
    for (const path of ["/api/nothing", "/api/investigations/", "/api/../healthz", "/api/%2e%2e"]) {
      const answer = await knock(world.app, { method: "get", path, cookie: cookies[visitor] });
      expect([path, answer.status < 500]).toEqual([path, true]);
    }
    const answer = await knock(world.app, {
      method: "delete",
      path: "/api/nothing",
      cookie: cookies[visitor],
    });
    expect(answer.status).toBe(404);
  }
});

test("a role is held in one investigation only, whatever the session says elsewhere", async () => {
  for (const role of ROLES) {
    const path = `/api/investigations/${world.elsewhere}`;
    const answer = await knock(world.app, { method: "get", path, cookie: cookies[role] });
    expect([role, answer.status]).toEqual([role, 404]);
  }
});
