import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startTestApp, type TestApp } from "../../support/app.ts";
import {
  buildAccount,
  buildInvestigation,
  buildMember,
  type Member,
  signInAs,
} from "../../support/factories.ts";

let app: TestApp;
let supervisor: Member;
let officer: Member;
let investigationId: string;

beforeAll(async () => {
  app = await startTestApp();
  investigationId = await buildInvestigation(app);
  supervisor = await signInAs(app, "supervisor", investigationId);
  officer = await signInAs(app, "officer", investigationId);
});

afterAll(async () => {
  await app?.close();
});

/** Events as the officer reads them. */
async function eventsOf(action: string): Promise<{ fields: string[]; accountId: string }[]> {
  const found = await officer.client.get(`${officer.base}/access-events`, { action });
  return found.body.items.map((item: { fields: string[]; accountId: string }) => ({
    fields: item.fields,
    accountId: item.accountId,
  }));
}

test("a member is added by e-mail, whatever its case, with a team made by name", async () => {
  const account = await buildAccount(app, { displayName: "Ada Field" });
  const added = await supervisor.client.post(`${supervisor.base}/members`, {
    email: account.email.toUpperCase(),
    role: "tracer",
    team: "North",
  });
  expect(added.status).toBe(201);
  const list = await officer.client.get(`${officer.base}/members`, { q: "ada fi" });
  expect(list.status).toBe(200);
  expect(list.body).toMatchObject({ total: 1, page: 1 });
  expect(list.body.items[0]).toMatchObject({
    id: added.body.id,
    accountId: account.id,
    displayName: "Ada Field",
    role: "tracer",
    team: "North",
  });
  expect(list.body.items[0].since).toMatch(/^\d{4}-\d\d-\d\dT.*Z$/);
  expect(await eventsOf("member.added")).toContainEqual({
    fields: ["role:tracer"],
    accountId: supervisor.accountId,
  });
});

test("teams of one name are one team", async () => {
  const [one, two] = [await buildAccount(app), await buildAccount(app)];
  for (const [account, team] of [
    [one, "South"],
    [two, "south"],
  ] as const) {
    const body = { email: account.email, role: "tracer", team };
    expect((await officer.client.post(`${officer.base}/members`, body)).status).toBe(201);
  }
  const teams = (await officer.client.get(`${officer.base}/members`, { pageSize: "200" })).body
    .items as { accountId: string; team: string | null }[];
  const of = (id: string) => teams.find((member) => member.accountId === id)?.team;
  expect([of(one.id), of(two.id)]).toEqual(["South", "South"]);
});

test("an unknown e-mail, a role already held and a demo account are named by field", async () => {
  const unknown = await supervisor.client.post(`${supervisor.base}/members`, {
    email: "nobody@test.example",
    role: "tracer",
  });
  expect(unknown.status).toBe(422);
  expect(unknown.body.errors).toEqual([{ path: "email", code: "account_unknown" }]);

  const held = await supervisor.client.post(`${supervisor.base}/members`, {
    email: supervisor.email,
    role: "supervisor",
  });
  expect(held.status).toBe(422);
  expect(held.body.errors).toEqual([{ path: "role", code: "already_member" }]);

  const demo = await buildAccount(app, { demo: true });
  const real = await buildInvestigation(app, { invented: false });
  const leader = await signInAs(app, "supervisor", real);
  const refused = await leader.client.post(`${leader.base}/members`, {
    email: demo.email,
    role: "tracer",
  });
  expect(refused.status).toBe(422);
  expect(refused.body.errors).toEqual([{ path: "email", code: "demo_only" }]);
  const allowed = await supervisor.client.post(`${supervisor.base}/members`, {
    email: demo.email,
    role: "tracer",
  });
  expect(allowed.status).toBe(201);
});

test("a disabled account cannot be added", async () => {
  const account = await buildAccount(app);
  await app.pools.auth.query("update auth.account set disabled_at = now() where id = $1", [
    account.id,
  ]);
  const refused = await supervisor.client.post(`${supervisor.base}/members`, {
    email: account.email,
    role: "tracer",
  });
  expect(refused.body.errors).toEqual([{ path: "email", code: "account_unknown" }]);
});

test("the same key adds once; two at once add one membership", async () => {
  const account = await buildAccount(app);
  const key = randomUUID();
  const body = { email: account.email, role: "epidemiologist" };
  const first = await supervisor.client.post(`${supervisor.base}/members`, body, key);
  const again = await supervisor.client.post(`${supervisor.base}/members`, body, key);
  expect(first.status).toBe(201);
  expect(again.body).toEqual(first.body);

  const other = await buildAccount(app);
  const both = await Promise.all(
    [1, 2].map(() =>
      supervisor.client.post(`${supervisor.base}/members`, { email: other.email, role: "tracer" }),
    ),
  );
  expect(both.map((answer) => answer.status).sort()).toEqual([201, 422]);
});

test("an ended membership loses everything at the next request", async () => {
  const tracer = await signInAs(app, "tracer", investigationId);
  expect((await tracer.client.get(tracer.base)).status).toBe(200);
  const ended = await officer.client.call("delete", `${officer.base}/members/${tracer.memberId}`);
  expect(ended.status).toBe(204);
  expect((await tracer.client.get(tracer.base)).status).toBe(403);
  const session = await tracer.client.get("/api/session");
  expect(session.body).toMatchObject({ actingRole: null, memberships: [], rooms: [] });
  const again = await officer.client.call("delete", `${officer.base}/members/${tracer.memberId}`);
  expect(again.status).toBe(404);
  expect(await eventsOf("member.ended")).toContainEqual({
    fields: ["role:tracer"],
    accountId: officer.accountId,
  });
});

test("the last supervisor or officer stays; leaving while others remain works", async () => {
  const lone = await buildInvestigation(app);
  const first = await signInAs(app, "officer", lone);
  const kept = await first.client.call("delete", `${first.base}/members/${first.memberId}`);
  expect(kept.status).toBe(409);
  expect(kept.body.errors).toEqual([{ path: "memberId", code: "last_leader" }]);

  const second = await signInAs(app, "supervisor", lone);
  const left = await first.client.call("delete", `${first.base}/members/${first.memberId}`);
  expect(left.status).toBe(204);
  expect((await first.client.get(first.base)).status).toBe(403);
  expect((await second.client.get(second.base)).status).toBe(200);
});

test("two leaders who end each other at once leave one", async () => {
  const lone = await buildInvestigation(app);
  const one = await signInAs(app, "officer", lone);
  const two = await signInAs(app, "supervisor", lone);
  const answers = await Promise.all([
    one.client.call("delete", `${one.base}/members/${two.memberId}`),
    two.client.call("delete", `${two.base}/members/${one.memberId}`),
  ]);
  expect(answers.filter((answer) => answer.status === 204)).toHaveLength(1);
});

test("a member of another investigation is not found and sorting is refused", async () => {
  const elsewhere = await buildInvestigation(app);
  const account = await buildAccount(app);
  const foreign = await buildMember(app, elsewhere, account.id, "tracer");
  const refused = await officer.client.call("delete", `${officer.base}/members/${foreign}`);
  expect(refused.status).toBe(404);
  const sorted = await officer.client.get(`${officer.base}/members`, { sort: "email" });
  expect(sorted.status).toBe(422);
  expect(sorted.body.errors).toEqual([{ path: "sort", code: "not_sortable" }]);
});

test("a membership also ends by the address of the list, named by id or by e-mail and role", async () => {
  const account = await buildAccount(app);
  const end = (body: unknown) =>
    supervisor.client.call("delete", `${supervisor.base}/members`, { body });
  for (const by of ["id", "e-mail"]) {
    const added = await supervisor.client.post(`${supervisor.base}/members`, {
      email: account.email,
      role: "tracer",
    });
    const body =
      by === "id" ? { id: added.body.id } : { email: account.email.toUpperCase(), role: "tracer" };
    expect((await end(body)).status, by).toBe(204);
    expect((await end(body)).status, by).toBe(404);
  }
  expect((await end({ email: "nobody@team.example", role: "tracer" })).status).toBe(422);
  expect((await end({})).status).toBe(422);
});
