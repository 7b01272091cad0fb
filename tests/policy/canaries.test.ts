import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import type { AnyRoute } from "../../server/http/route.ts";
import { plainRoutes, ROUTES } from "../../server/routes.ts";
import { accessTo, openableKeys } from "../../shared/fields.ts";
import { ROLES, type Role } from "../../shared/roles.ts";
import { hitsAtRest, postgresLogSize } from "./support/at-rest.ts";
import { stageImport } from "./support/bodies.ts";
import { forcedErrors } from "./support/forced-errors.ts";
import type { Hit, MarkedKey } from "./support/markers.ts";
import { type Answer, cookiesOf, knock, type VisitorName } from "./support/visitors.ts";
import { makeWorld, NAMED, type PersonName, type World } from "./support/world.ts";

let world: World;
let cookies: Record<VisitorName, string>;
let importId: string;
let logFrom: number;

beforeAll(async () => {
  logFrom = await postgresLogSize();
  world = await makeWorld();
  cookies = await cookiesOf(world);
  importId = await stageImport(world.everyone.supervisor);
});

afterAll(async () => {
  await world?.close();
});

/** May a role be told this field of this person? The registry, and for a tracer the scope, say so. */
function allowed(role: Role, { person, key }: Hit): boolean {
  if (person === "foreign") return false;
  if (role === "tracer" && person === "stranger") return false;
  if (key === "occupation") return accessTo("occupation", role) === "full";
  const opens = openableKeys(role).includes(key === "household" ? "name" : key);
  return opens && (role !== "tracer" || NAMED.includes(person as PersonName));
}

const whole = (answer: Answer) =>
  `${answer.status}\n${[...answer.headers].map((one) => one.join(": ")).join("\n")}\n${answer.text}`;

function forbidden(role: Role, answer: Answer): Hit[] {
  return world.scan.hits(whole(answer)).filter((hit) => !allowed(role, hit));
}

const get = (role: Role, path: string) =>
  knock(world.app, { method: "get", path, cookie: cookies[role] });
const post = (role: Role, path: string, body: unknown) =>
  knock(world.app, {
    method: "post",
    path: `${world.everyone.officer.base}${path}`,
    body,
    cookie: cookies[role],
  });

/** Every address a GET route has for people and objects of this world, plainly and as wide as it goes. */
function addressesOf(route: Pick<AnyRoute, "path" | "query">): string[] {
  const people = [...Object.values(world.people), world.foreign];
  let paths = [route.path.replace(":id", world.here)];
  if (route.path.includes(":personId")) {
    paths = paths.flatMap((path) => people.map((id) => path.replace(":personId", id)));
  }
  paths = paths.map((path) => path.replace(":importId", importId));
  const wide = paths.map((path) => `${path}?pageSize=200`);
  return route.query && "pageSize" in ((route.query as { shape?: object }).shape ?? {})
    ? [...paths, ...wide]
    : paths;
}

test("the scan sees what it is meant to see: a supervisor's page shows every marker", async () => {
  const page = await get(
    "supervisor",
    `${world.everyone.supervisor.base}/people/${world.people.held}`,
  );
  const keys = new Set(
    world.scan
      .hits(page.text)
      .filter((hit) => hit.person === "held")
      .map((hit) => hit.key),
  );
  expect([...keys].sort()).toEqual([
    "address",
    "birthDate",
    "email",
    "household",
    "name",
    "note",
    "occupation",
    "phone",
    "ref",
  ]);
  expect(page.text).toContain("Zqlrelation");
});

test.each(ROLES)(
  "%s: no answer of any GET route holds more than the registry allows",
  async (role) => {
    const seen = new Set<MarkedKey>();
    const routes = [
      ...ROUTES.filter((route) => route.method === "get"),
      ...plainRoutes(world.app.services).filter((route) => route.method === "get"),
    ];
    for (const route of routes) {
      for (const path of addressesOf(route)) {
        const answer = await get(role, path);
        expect(answer.status, path).toBeLessThan(500);
        expect(forbidden(role, answer), `${role} ${route.path}`).toEqual([]);
        for (const hit of world.scan.hits(answer.text)) seen.add(hit.key);
        if (role === "epidemiologist" || role === "officer") {
          expect(answer.text, path).not.toContain("Zqlrelation");
        }
      }
    }
    // The emptiness above is not for want of data.
    if (role === "tracer" || role === "supervisor") expect(seen.size).toBe(9);
    if (role === "officer") expect([...seen]).toEqual(["ref"]);
    if (role === "epidemiologist") expect([...seen]).toEqual(["occupation"]);
  },
);

test.each(ROLES)(
  "%s: searching by what a person is called or called at gives only who may be named",
  async (role) => {
    for (const person of Object.values(world.marked)) {
      for (const q of [person.name, person.phone, person.email, person.ref]) {
        for (const answer of [
          await post(role, "/people/search", { q, pageSize: 200 }),
          await get(role, `${world.everyone.officer.base}/people?q=${encodeURIComponent(q)}`),
          await post(role, "/people/matches", { name: q, phone: q.slice(0, 40) }),
        ]) {
          expect(answer.status).toBeLessThan(500);
          expect(forbidden(role, answer), q).toEqual([]);
        }
      }
    }
  },
);

const hiddenFrom: Record<Role, readonly (PersonName | "foreign")[]> = {
  tracer: ["hiddenCase", "stranger", "foreign"],
  supervisor: ["foreign"],
  epidemiologist: ["held", "stranger", "foreign"],
  officer: ["held", "stranger", "foreign"],
};

test.each(ROLES)(
  "%s: a hidden value is met no more often than a value of nobody's",
  async (role) => {
    const nobody = {
      name: "Qwmpf Vbrtk",
      phone: "+44 7700 900999",
      email: "nobody@canary.example",
      ref: "ZQR-NOBODY-7",
      birthDate: "1899-01-01",
      address: "99 Nowhere",
      note: "nothing of the kind",
      household: "Nohouse",
    };
    for (const person of hiddenFrom[role]) {
      for (const key of Object.keys(nobody) as (keyof typeof nobody)[]) {
        // An officer reads references in full, and so may find by them.
        if (key === "ref" && person !== "foreign" && role === "officer") continue;
        const value = world.marked[person][key];
        const ask = (q: string) => post(role, "/people/search", { q });
        const [hidden, random] = [await ask(value), await ask(nobody[key])];
        expect([person, key, hidden.status, hidden.text]).toEqual([
          person,
          key,
          random.status,
          random.text,
        ]);
        if (role !== "tracer") continue;
        const match = (typed: string) =>
          post(role, "/people/matches", key === "phone" ? { phone: typed } : { name: typed });
        expect((await match(value)).text).toBe((await match(nobody[key])).text);
      }
    }
  },
);

test.each(ROLES)("%s: no list sorts by what is not plainly readable", async (role) => {
  const keys = [
    "name",
    "nameMasked",
    "phone",
    "phoneLast2",
    "email",
    "emailMasked",
    "birthDate",
    "birthYear",
    "address",
    "note",
    "ref",
    "household",
    "name_cipher",
    "recorded_by",
    "assigned_account_id",
    "constructor",
    "__proto__",
    "toString",
    "hasOwnProperty",
    "id;drop table core.person",
  ];
  for (const key of keys) {
    for (const sort of [key, `-${key}`]) {
      const path = `${world.everyone.officer.base}/people?sort=${encodeURIComponent(sort)}`;
      for (const answer of [await get(role, path), await post(role, "/people/search", { sort })]) {
        expect([sort, answer.status]).toEqual([sort, 422]);
        expect(JSON.parse(answer.text).errors).toEqual([{ path: "sort", code: "not_sortable" }]);
      }
    }
  }
});

test("registering somebody a tracer may not see answers as for anybody, and tells the supervisor alone", async () => {
  const { stranger } = world.marked;
  const register = (body: object) => post("tracer", "/people", body);
  const known = await register({ name: stranger.name, phone: stranger.phone });
  const fresh = await register({ name: "Rqst Lmnop", phone: "+44 7700 900888" });
  const shape = (answer: Answer) => {
    const { id: _id, studyNumber: _number, ...rest } = JSON.parse(answer.text);
    return { status: answer.status, rest };
  };
  expect(shape(known)).toEqual(shape(fresh));
  const reviews = await get("supervisor", `${world.everyone.supervisor.base}/match-reviews`);
  expect(JSON.parse(reviews.text).items).toContainEqual(
    expect.objectContaining({
      personId: JSON.parse(known.text).id,
      otherId: world.people.stranger,
    }),
  );
  // The new record is the tracer's own; it must not stay among the marked ones.
  await world.admin.query("update core.person set withdrawn_at = now() where id = any ($1)", [
    [known, fresh].map((answer) => JSON.parse(answer.text).id),
  ]);
});

test("answers to what goes wrong repeat nothing of what was sent", async () => {
  for (const { what, request, status } of forcedErrors(world)) {
    for (const role of ROLES) {
      const answer = await knock(world.app, { ...request, cookie: cookies[role] });
      const say = `${what} as ${role}: ${answer.status} ${answer.text.slice(0, 300)}`;
      expect([...status, 403], say).toContain(answer.status);
      expect(world.scan.hits(whole(answer)), say).toEqual([]);
    }
  }
});

test("the live stream tells of ids and versions only, and a tracer of no ids", async () => {
  const stop = new AbortController();
  const path = `${world.app.origin}${world.everyone.officer.base}/live`;
  const heard = await Promise.all(
    ROLES.map(async (role) => {
      const answer = await fetch(path, { headers: { Cookie: cookies[role] }, signal: stop.signal });
      expect(answer.status).toBe(200);
      const reader = answer.body?.pipeThrough(new TextDecoderStream()).getReader();
      return { role, reader };
    }),
  );
  const { supervisor } = world.everyone;
  const test = { specimenDate: "2026-03-01", kind: "PCR", result: "positive" };
  const tested = await supervisor.client.post(
    `${supervisor.base}/people/${world.people.held}/tests`,
    test,
  );
  expect(tested.status).toBe(201);
  try {
    for (const { role, reader } of heard) {
      let text = "";
      for (let chunk = 0; chunk < 20 && !text.includes("data:"); chunk++) {
        text += (await reader?.read())?.value ?? "";
      }
      expect(world.scan.hits(text), role).toEqual([]);
      const message = JSON.parse(/data: (.*)/.exec(text)?.[1] ?? "null");
      expect(Object.keys(message).sort(), role).toEqual(["id", "topic", "version"]);
      if (role === "tracer") expect(message.id).toBeNull();
    }
  } finally {
    stop.abort();
  }
});

test("a failing database tells nothing either, to the caller or to the log", async () => {
  const body = { ...world.marked.held, ref: "ZQR-BIMO-9" };
  await world.admin.query("alter table core.person rename column area to area_gone");
  try {
    const broken = await post("supervisor", "/people", { ...body, area: "North" });
    expect(broken.status).toBe(500);
    expect(world.scan.hits(whole(broken))).toEqual([]);
  } finally {
    await world.admin.query("alter table core.person rename column area_gone to area");
  }
  const right = "execute on function identity.put_people(jsonb, jsonb, smallint[])";
  await world.admin.query(`revoke ${right} from strandline_supervisor`);
  try {
    const refused = await post("supervisor", "/people", body);
    expect(refused.status).toBe(404);
    expect(world.scan.hits(whole(refused))).toEqual([]);
  } finally {
    await world.admin.query(`grant ${right} to strandline_supervisor`);
  }
  expect(world.app.logs.filter((line) => line.includes('"alarm"')).length).toBeGreaterThanOrEqual(
    2,
  );
});

test("nothing is left in logs, sessions, receipts, the access record or any table in plain", async () => {
  const { client, base } = world.everyone.tracer;
  const draft = await client.call("put", `${base}/people/${world.people.held}/interview-draft`, {
    body: { version: 0, body: { contacts: [world.marked.named] } },
  });
  expect(draft.status).toBe(200);
  const checked = await client.post(`${base}/follow-up/${world.people.named}/checks`, {
    outcome: "spoken",
    note: `${world.marked.named.name}, ${world.marked.named.phone}`,
  });
  expect(checked.status).toBe(201);
  const csv = `ref,name,phone,address\n${randomUUID()},${world.marked.named.name},${world.marked.named.phone},${world.marked.named.address}\n`;
  const { supervisor } = world.everyone;
  const staged = await supervisor.client.upload(
    `${supervisor.base}/imports`,
    { kind: "people" },
    csv,
  );
  expect(staged.status).toBe(201);
  expect(world.app.logs.length).toBeGreaterThan(100);
  expect(world.scan.hits(world.app.logs.join("\n"))).toEqual([]);
  const found = await hitsAtRest(world, logFrom);
  // An occupation is a plain column of the person: it narrows down, it does not name.
  expect(found).toEqual([{ where: "core.person", keys: ["occupation"] }]);
});
