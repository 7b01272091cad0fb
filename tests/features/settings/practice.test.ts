import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { investigationAnswer } from "../../../shared/contracts/investigations.ts";
import { settingsAnswer } from "../../../shared/contracts/settings.ts";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";
import {
  buildAccount,
  buildInvestigation,
  buildMember,
  type Member,
  PASSWORD,
  signInAs,
} from "../../support/factories.ts";
import { asAdmin, eventsNamed, register, submit } from "../../support/field-work.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

/** Opens a practice investigation as a supervisor and acts in it. */
async function openPractice(fields: Record<string, unknown> = {}): Promise<Member> {
  const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
  const made = await supervisor.client.post("/api/investigations", {
    name: "Learning",
    practice: true,
    ...fields,
  });
  expect(made.status, JSON.stringify(made.body)).toBe(201);
  const acting = { actingRole: "supervisor", investigationId: made.body.id };
  expect((await supervisor.client.call("patch", "/api/session", { body: acting })).status).toBe(
    200,
  );
  return {
    ...supervisor,
    investigationId: made.body.id,
    base: `/api/investigations/${made.body.id}`,
  };
}

async function settingsOf(member: Member) {
  return settingsAnswer.parse((await member.client.get(`${member.base}/settings`)).body);
}

function reset(member: Member, body: Record<string, unknown>) {
  return member.client.call("post", `${member.base}/settings/practice-reset`, { body });
}

const people = async (member: Member) =>
  (await member.client.get(`${member.base}/people`, { pageSize: "200" })).body;

test("it is opened by a supervisor, invented, and filled with an outbreak to practise on", async () => {
  const supervisor = await openPractice({ timeZone: "Pacific/Auckland", countryCode: "NZ" });
  const seen = investigationAnswer.parse((await supervisor.client.get(supervisor.base)).body);
  expect(seen).toMatchObject({ practice: true, invented: true });
  const listed = await supervisor.client.get("/api/investigations");
  expect(listed.body.items.find((one: { id: string }) => one.id === seen.id).practice).toBe(true);
  const { total, items } = await people(supervisor);
  expect(total).toBe(60);
  const person = items.find(
    (one: { classification: string }) => one.classification === "confirmed",
  );
  const page = await supervisor.client.get(`${supervisor.base}/people/${person.id}`);
  expect(page.body.name).toEqual(expect.any(String));
  const followed = await supervisor.client.get(`${supervisor.base}/follow-up`, { show: "all" });
  expect(followed.body.total).toBeGreaterThan(5);
  const network = await supervisor.client.get(`${supervisor.base}/network/summary`);
  expect(network.body.people).toBe(60);
  const found = await supervisor.client.post(`${supervisor.base}/people/search`, {
    q: page.body.name,
  });
  expect(found.body.items.map((one: { id: string }) => one.id)).toContain(person.id);
  // Nothing lies ahead, and places go on being numbered.
  const [ahead] = await asAdmin<{ count: number }>(
    app,
    `select (select count(*) from core.person where investigation_id = $1 and recorded_at > now())
       + (select count(*) from core.exposure where investigation_id = $1 and recorded_at > now())
       as count`,
    [supervisor.investigationId],
  );
  expect(Number(ahead?.count)).toBe(0);
  const place = await supervisor.client.post(`${supervisor.base}/places`, {
    name: "New hall",
    setting: "social",
  });
  expect(place.status).toBe(201);
  // The context that filled it is gone.
  const contexts = await asAdmin(app, "select 1 from auth.ctx_live where investigation_id = $1", [
    supervisor.investigationId,
  ]);
  expect(contexts).toHaveLength(1);
});

test("the same request opens and fills it once", async () => {
  const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
  const key = randomUUID();
  const body = { name: "Once", practice: true };
  const send = () => supervisor.client.post("/api/investigations", body, key);
  const answers = await Promise.all([send(), send()]);
  const ids = new Set(answers.map((answer) => answer.body.id));
  expect([ids.size, answers.map((answer) => answer.status)]).toEqual([1, [201, 201]]);
  const rows = await asAdmin(app, "select 1 from core.person where investigation_id = $1", [
    answers[0]?.body.id,
  ]);
  expect(rows).toHaveLength(60);
});

test("it cannot be real, and an officer opens none", async () => {
  const id = await buildInvestigation(app);
  const supervisor = await signInAs(app, "supervisor", id);
  const real = await supervisor.client.post("/api/investigations", {
    name: "No",
    practice: true,
    invented: false,
  });
  expect(real.body.errors).toEqual([{ path: "invented", code: "practice_is_invented" }]);
  const officer = await signInAs(app, "officer", id);
  const refused = await officer.client.post("/api/investigations", { name: "No", practice: true });
  expect([refused.status, refused.body.code]).toEqual([403, "role_refused"]);
  const practice = await openPractice();
  const changed = await practice.client.call("patch", `${practice.base}/settings`, {
    body: { version: 1, invented: false },
  });
  expect(changed.body.errors).toEqual([{ path: "invented", code: "practice_is_invented" }]);
});

test("a reset empties what was done, keeps the settings, and fills it again for its tracers", async () => {
  const supervisor = await openPractice();
  const tracer = await signInAs(app, "tracer", supervisor.investigationId);
  const change = { version: 1, caseDefinition: "Learned.", lostAfterDays: 5 };
  const changed = await supervisor.client.call("patch", `${supervisor.base}/settings`, {
    body: change,
  });
  expect(changed.body).toMatchObject({ version: 2, caseDefinitionVersion: 2 });
  const own = await register(supervisor, { name: "Zqpractised Person", household: "Zqhome" });
  await submit(supervisor, own, {
    contacts: [{ name: "Zqmet", phone: null, setting: "social", place: "Zqplace" }],
  });
  const draft = await supervisor.client.call(
    "put",
    `${supervisor.base}/people/${own}/interview-draft`,
    {
      body: { version: 0, body: {} },
    },
  );
  expect(draft.status).toBe(200);
  await supervisor.client.upload(
    `${supervisor.base}/imports`,
    { kind: "people" },
    "ref,name\nz,Zq\n",
  );
  const graph = async () =>
    (await supervisor.client.get(`${supervisor.base}/network/summary`)).body.graphVersion as number;
  const was = await graph();

  const answer = await reset(supervisor, { version: 2, name: "Learning" });
  expect(answer.status, answer.text).toBe(200);
  expect(settingsAnswer.parse(answer.body)).toMatchObject({ version: 2, lostAfterDays: 5 });
  expect((await people(supervisor)).total).toBe(60);
  expect((await supervisor.client.get(`${supervisor.base}/people/${own}`)).status).toBe(404);
  const places = await supervisor.client.get(`${supervisor.base}/places`, { pageSize: "200" });
  expect(places.text).not.toContain("Zq");
  expect(places.body.items[0].number).toBe(1);
  expect((await supervisor.client.get(`${supervisor.base}/imports`)).body.total).toBe(0);
  await expect.poll(graph).toBeGreaterThan(was);
  const groups = await supervisor.client.get(`${supervisor.base}/network/summary`);
  expect(groups.body.people).toBe(60);

  const definitions = await asAdmin<{ v: number }>(
    app,
    `select distinct case_definition_version as v from core.classification
     where investigation_id = $1`,
    [supervisor.investigationId],
  );
  expect(definitions).toEqual([{ v: 2 }]);
  expect((await people(tracer)).total).toBeGreaterThan(0);
  const history = await supervisor.client.get(`${supervisor.base}/settings/changes`);
  expect(history.body.total).toBe(1);
  const events = await eventsNamed(app, supervisor.investigationId, "investigation.practice_reset");
  expect(events).toHaveLength(1);
});

test("what a reset deletes is all that is recorded in an investigation", async () => {
  const tables = await asAdmin<{ name: string }>(
    app,
    `select table_schema || '.' || table_name as name from information_schema.columns
     where table_schema in ('core', 'identity') and column_name = 'investigation_id' order by 1`,
  );
  const [source] = await asAdmin<{ text: string }>(
    app,
    "select pg_get_functiondef('core.empty_practice()'::regprocedure) as text",
  );
  const kept = tables
    .map(({ name }) => name)
    .filter((name) => !source?.text.includes(`delete from ${name} `));
  // Settings, who works here and how they look at lists, the key, and what tells pages and graphs of changes.
  expect(kept).toEqual([
    "core.case_definition",
    "core.graph_change",
    "core.member",
    "core.outbox",
    "core.saved_filter",
    "core.setting_change",
    "core.team",
    "identity.data_key",
  ]);
});

test("a reset wants the name, the version, a supervisor, and an investigation for practice", async () => {
  const supervisor = await openPractice();
  const { version } = await settingsOf(supervisor);
  const misnamed = await reset(supervisor, { version, name: "Something else" });
  expect(misnamed.body.errors).toEqual([{ path: "name", code: "name_differs" }]);
  expect((await reset(supervisor, { version: version + 1, name: "Learning" })).body.code).toBe(
    "stale_version",
  );
  for (const role of ["tracer", "epidemiologist", "officer"] as const) {
    const other = await signInAs(app, role, supervisor.investigationId);
    expect((await reset(other, { version, name: "Learning" })).status).toBe(403);
  }
  const real = await signInAs(app, "supervisor", await buildInvestigation(app));
  await register(real);
  const refused = await reset(real, { version: 1, name: "Test investigation" });
  expect([refused.status, refused.body.code]).toEqual([409, "not_practice"]);
  expect((await people(real)).total).toBe(1);
});

test("the database empties nothing else, whoever calls the function", async () => {
  const real = await signInAs(app, "supervisor", await buildInvestigation(app));
  const practice = await openPractice();
  const officer = await signInAs(app, "officer", practice.investigationId);
  const call = async (role: "supervisor" | "officer", member: Member) => {
    const nonce = randomUUID();
    await app.pools.auth.query(
      `insert into auth.ctx_live (nonce, account_id, investigation_id, role, expires_at)
       values ($1, $2, $3, $4, now() + interval '1 minute')`,
      [nonce, member.accountId, member.investigationId, role],
    );
    const client = await app.pools[role].connect();
    try {
      await client.query("begin");
      await client.query("select set_config('app.ctx', $1, true)", [nonce]);
      return await client.query("select core.empty_practice()").then(
        () => "emptied",
        (error: { code: string }) => error.code,
      );
    } finally {
      await client.query("rollback");
      client.release();
    }
  };
  expect(await call("supervisor", real)).toBe("42501");
  expect(await call("officer", officer)).toBe("42501");
  expect(await call("supervisor", practice)).toBe("emptied");
  // Practice is a mark from the start: no login may set it or take it away.
  for (const role of ["supervisor", "officer"] as const) {
    const refused = await app.pools[role]
      .query("update core.investigation set practice = true")
      .catch((error: { code: string }) => error.code);
    expect(refused).toBe("42501");
  }
});

test("it sends nothing: no invitation, but accounts that exist may join", async () => {
  const supervisor = await openPractice();
  const letters = async () =>
    (await asAdmin<{ count: number }>(app, "select count(*)::int as count from auth.mail"))[0]
      ?.count;
  const before = [await letters(), app.services.mail.letters().length];
  const invited = await supervisor.client.post(`${supervisor.base}/invitations`, {
    email: "somebody@test.example",
    role: "tracer",
  });
  expect([invited.status, invited.body.code]).toEqual([409, "practice_sends_nothing"]);
  expect([await letters(), app.services.mail.letters().length]).toEqual(before);
  const colleague = await buildAccount(app);
  const added = await supervisor.client.post(`${supervisor.base}/members`, {
    email: colleague.email,
    role: "tracer",
  });
  expect(added.status).toBe(201);
  // Nor past the application.
  const [row] = await asAdmin<{ nonce: string }>(
    app,
    "select nonce from auth.ctx_live where investigation_id = $1 and role = 'supervisor' limit 1",
    [supervisor.investigationId],
  );
  const client = await app.pools.supervisor.connect();
  try {
    await client.query("begin");
    await client.query("select set_config('app.ctx', $1, true)", [row?.nonce]);
    const refused = await client
      .query(
        "select auth.invite($1::uuid, 'a@b.example', 'tracer', null, null, 'hash', $1::uuid, '\\x00'::bytea)",
        [randomUUID()],
      )
      .catch((error: { code: string }) => error.code);
    expect(refused).toBe("42501");
  } finally {
    await client.query("rollback");
    client.release();
  }
});

test("a supervisor of the demo may open one", async () => {
  const id = await buildInvestigation(app);
  const account = await buildAccount(app, { demo: true });
  await buildMember(app, id, account.id, "supervisor");
  const client = new TestClient(app);
  await client.signIn(account.email, PASSWORD);
  const made = await client.post("/api/investigations", { name: "Demo practice", practice: true });
  expect(made.status).toBe(201);
});
