import { afterAll, beforeAll, expect, test } from "vitest";
import { dayIn, endOfDayIn, now, shiftDay } from "../../../server/clock.ts";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";
import {
  buildAccount,
  buildInvestigation,
  buildMember,
  type Member,
  PASSWORD,
  signInAs,
} from "../../support/factories.ts";
import { asAdmin, register } from "../../support/field-work.ts";

let app: TestApp;
let officer: Member;
let supervisor: Member;
let investigationId: string;
const today = dayIn("UTC", now());

beforeAll(async () => {
  app = await startTestApp();
  investigationId = await buildInvestigation(app);
  officer = await signInAs(app, "officer", investigationId);
  supervisor = await signInAs(app, "supervisor", investigationId);
});

afterAll(async () => {
  await app?.close();
});

/** Moves a role's last day past the routes, which refuse days gone by. */
const setEnd = (memberId: string, endsOn: string | null) =>
  asAdmin(app, "update core.member set ends_on = $2 where id = $1", [memberId, endsOn]);
const patch = (memberId: string, body: object, by = officer) =>
  by.client.call("patch", `${by.base}/members/${memberId}`, { body });
const list = async (query: Record<string, string> = {}) =>
  (await officer.client.get(`${officer.base}/members`, { pageSize: "200", ...query })).body;

test("a role ends by itself with its last day: for routes, database, session and lists", async () => {
  const tracer = await signInAs(app, "tracer", investigationId);
  const personId = await register(tracer);
  await setEnd(tracer.memberId, today);
  expect((await tracer.client.get(tracer.base)).status).toBe(200);
  expect((await list({ q: tracer.email })).items[0]).toMatchObject({
    endsOn: today,
    endedAt: null,
  });

  const yesterday = shiftDay(today, -1);
  await setEnd(tracer.memberId, yesterday);
  expect((await tracer.client.get(tracer.base)).status).toBe(403);
  expect((await tracer.client.get("/api/session")).body).toMatchObject({
    actingRole: null,
    memberships: [],
  });
  const again = await new TestClient(app).signIn(tracer.email, PASSWORD);
  expect(again.body).toMatchObject({ actingRole: null, memberships: [] });
  expect((await list({ q: tracer.email })).total).toBe(0);
  const past = (await list({ q: tracer.email, show: "past" })).items;
  expect(past).toMatchObject([
    { endsOn: yesterday, endedAt: endOfDayIn("UTC", yesterday).toISOString() },
  ]);
  // Work cannot be handed to a role that is over.
  const handed = await supervisor.client.call("patch", `${supervisor.base}/people/${personId}`, {
    body: { version: 1, assignedTo: tracer.accountId },
  });
  expect(handed.body.errors).toEqual([{ path: "assignedTo", code: "not_known" }]);
});

test("the context in the database ends with the day, whatever the API would say", async () => {
  const tracer = await signInAs(app, "tracer", investigationId);
  const nonces = () =>
    asAdmin<{ live: boolean }>(
      app,
      `select exists (select 1 from auth.ctx_live c join core.member m on m.account_id = c.account_id
         and m.investigation_id = c.investigation_id and m.role = c.role and m.ended_at is null
         join core.investigation v on v.id = m.investigation_id
         where c.account_id = $1 and core.day_lasts(m.ends_on, v.time_zone)) as live`,
      [tracer.accountId],
    );
  expect((await nonces())[0]?.live).toBe(true);
  await setEnd(tracer.memberId, shiftDay(today, -1));
  const [stored] = await asAdmin<{ nonce: string }>(
    app,
    "select nonce from auth.ctx_live where account_id = $1",
    [tracer.accountId],
  );
  const client = await app.pools.tracer.connect();
  try {
    await client.query("begin");
    await client.query("select set_config('app.ctx', $1, true)", [stored?.nonce]);
    const seen = await client.query("select * from core.ctx()");
    expect(seen.rows[0]).toMatchObject({ account_id: null, role: null });
    const rows = await client.query("select id from core.investigation");
    expect(rows.rows).toEqual([]);
  } finally {
    await client.query("rollback");
    client.release();
  }
});

test("the day is the investigation's own: it lasts longest where the date line is last", async () => {
  // 26 hours lie between these two, so that their dates always differ.
  const [east, west] = await Promise.all(
    ["Pacific/Kiritimati", "Etc/GMT+12"].map(async (timeZone) => {
      const id = await buildInvestigation(app, { timeZone });
      return { timeZone, member: await signInAs(app, "tracer", id) };
    }),
  );
  const day = dayIn("Etc/GMT+12", now());
  for (const one of [east, west]) await setEnd(one?.member.memberId ?? "", day);
  expect((await west?.member.client.get(west.member.base))?.status).toBe(200);
  expect((await east?.member.client.get(east.member.base))?.status).toBe(403);
});

test("a last day is set when a role is given, moved later and taken away", async () => {
  const account = await buildAccount(app);
  const body = { email: account.email, role: "tracer", endsOn: shiftDay(today, 7) };
  const past = await officer.client.post(`${officer.base}/members`, {
    ...body,
    endsOn: shiftDay(today, -1),
  });
  expect(past.body.errors).toEqual([{ path: "endsOn", code: "in_past" }]);
  const wrong = await officer.client.post(`${officer.base}/members`, { ...body, endsOn: "soon" });
  expect(wrong.body.errors).toEqual([{ path: "endsOn", code: "not_a_day" }]);
  const added = await officer.client.post(`${officer.base}/members`, body);
  expect(added.status).toBe(201);
  const { id } = added.body;
  expect((await list({ q: account.email })).items[0]).toMatchObject({
    endsOn: body.endsOn,
    version: 1,
  });

  const moved = await patch(id, { version: 1, endsOn: today });
  expect([moved.status, moved.body]).toEqual([200, { id, version: 2 }]);
  expect((await patch(id, { version: 1, endsOn: null })).body.code).toBe("stale_version");
  expect((await patch(id, { version: 2, endsOn: shiftDay(today, -1) })).body.errors).toEqual([
    { path: "endsOn", code: "in_past" },
  ]);
  expect((await patch(id, { version: 2, endsOn: null })).status).toBe(200);
  expect((await list({ q: account.email })).items[0]).toMatchObject({ endsOn: null, version: 3 });
  const events = await officer.client.get(`${officer.base}/access-events`, {
    action: "member.changed",
  });
  expect(events.body.items[0].fields).toEqual(["role:tracer", "endsOn"]);
});

test("somebody whose role ran out can be added again, and the first stays on record", async () => {
  const account = await buildAccount(app);
  const first = await buildMember(app, investigationId, account.id, "tracer");
  await setEnd(first, shiftDay(today, -3));
  const body = { email: account.email, role: "tracer" };
  const again = await officer.client.post(`${officer.base}/members`, body);
  expect(again.status).toBe(201);
  expect((await list({ q: account.email })).items).toMatchObject([{ id: again.body.id }]);
  const past = (await list({ q: account.email, show: "past" })).items;
  expect(past).toMatchObject([
    { id: first, endedAt: endOfDayIn("UTC", shiftDay(today, -3)).toISOString() },
  ]);
  expect((await officer.client.post(`${officer.base}/members`, body)).body.errors).toEqual([
    { path: "role", code: "already_member" },
  ]);
  expect((await patch(first, { version: 1, endsOn: null })).status).toBe(404);
});

test("one supervisor or officer stays without an end date", async () => {
  const id = await buildInvestigation(app);
  const first = await signInAs(app, "officer", id);
  const refused = await patch(first.memberId, { version: 1, endsOn: "2099-01-01" }, first);
  expect([refused.status, refused.body.errors]).toEqual([
    409,
    [{ path: "endsOn", code: "last_leader" }],
  ]);
  const second = await signInAs(app, "supervisor", id);
  await setEnd(second.memberId, "2099-01-01");
  // A colleague with an end date does not count as who is left.
  expect((await patch(first.memberId, { version: 1, endsOn: "2099-01-01" }, first)).status).toBe(
    409,
  );
  const ended = await first.client.call("delete", `${first.base}/members/${first.memberId}`);
  expect(ended.body.errors).toEqual([{ path: "memberId", code: "last_leader" }]);
  expect((await patch(second.memberId, { version: 1, endsOn: null }, first)).status).toBe(200);
  expect((await patch(first.memberId, { version: 1, endsOn: "2099-01-01" }, first)).status).toBe(
    200,
  );
  // Who has an end date may go at any time: somebody without one is left.
  expect(
    (await second.client.call("delete", `${second.base}/members/${first.memberId}`)).status,
  ).toBe(204);
});

test("two leaders who date each other at once leave one without an end", async () => {
  const id = await buildInvestigation(app);
  const one = await signInAs(app, "officer", id);
  const two = await signInAs(app, "supervisor", id);
  const answers = await Promise.all([
    patch(two.memberId, { version: 1, endsOn: today }, one),
    patch(one.memberId, { version: 1, endsOn: today }, two),
  ]);
  expect(answers.map((answer) => answer.status).sort()).toEqual([200, 409]);
});

test("the team of a member is changed and taken away, by name", async () => {
  const account = await buildAccount(app);
  const id = await buildMember(app, investigationId, account.id, "tracer");
  const team = async () => (await list({ q: account.email })).items[0].team;
  expect((await patch(id, { version: 1, team: "Harbour" })).status).toBe(200);
  expect(await team()).toBe("Harbour");
  expect((await patch(id, { version: 2, team: "harbour" })).status).toBe(200);
  expect(await team()).toBe("Harbour");
  expect((await patch(id, { version: 3, endsOn: today })).status).toBe(200);
  expect(await team()).toBe("Harbour");
  expect((await patch(id, { version: 4, team: null })).status).toBe(200);
  expect(await team()).toBeNull();
  expect((await patch(id, { version: 5, role: "officer" })).status).toBe(422);
});
