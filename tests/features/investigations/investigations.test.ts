import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";
import {
  buildAccount,
  buildInvestigation,
  buildMember,
  PASSWORD,
  signInAs,
} from "../../support/factories.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

test("only one's own investigations are listed, with the roles held in each", async () => {
  const [mine, other] = [
    await buildInvestigation(app, { name: "Mine" }),
    await buildInvestigation(app, { name: "Theirs" }),
  ];
  const tracer = await signInAs(app, "tracer", mine);
  await buildMember(app, mine, tracer.accountId, "supervisor");
  const list = await tracer.client.get("/api/investigations");
  expect(list.body).toMatchObject({ total: 1, page: 1 });
  expect(list.body.items[0]).toMatchObject({ id: mine, name: "Mine" });
  expect([...list.body.items[0].roles].sort()).toEqual(["supervisor", "tracer"]);
  expect((await tracer.client.get(`/api/investigations/${other}`)).status).toBe(404);
});

test("who opens an investigation holds in it the role they act in; the same key opens it once", async () => {
  const officer = await signInAs(app, "officer", await buildInvestigation(app));
  const key = randomUUID();
  const body = { name: "Second", invented: true, timeZone: "Pacific/Auckland" };
  const made = await officer.client.post("/api/investigations", body, key);
  const again = await officer.client.post("/api/investigations", body, key);
  expect(made.status).toBe(201);
  expect(again.body).toEqual(made.body);
  const reused = await officer.client.post("/api/investigations", { ...body, name: "X" }, key);
  expect(reused.status).toBe(422);
  expect(reused.body.code).toBe("key_reused");

  const acting = { actingRole: "officer", investigationId: made.body.id };
  const moved = await officer.client.call("patch", "/api/session", { body: acting });
  expect(moved.status).toBe(200);
  const found = await officer.client.get(`/api/investigations/${made.body.id}`);
  expect(found.body).toMatchObject({ name: "Second", timeZone: "Pacific/Auckland", version: 1 });
});

test("a tracer opens none, and a demo account only an invented one", async () => {
  const id = await buildInvestigation(app);
  const tracer = await signInAs(app, "tracer", id);
  expect((await tracer.client.post("/api/investigations", { name: "X" })).status).toBe(403);

  const account = await buildAccount(app, { demo: true });
  await buildMember(app, id, account.id, "officer");
  const client = new TestClient(app);
  await client.signIn(account.email, PASSWORD);
  const refused = await client.post("/api/investigations", { name: "Real", invented: false });
  expect(refused.status).toBe(422);
  expect(refused.body.errors).toEqual([{ path: "invented", code: "demo_only" }]);
  const made = await client.post("/api/investigations", { name: "Play" });
  expect(made.status).toBe(201);
  const listed = await client.get("/api/investigations");
  expect(listed.body.items).toContainEqual(
    expect.objectContaining({ id: made.body.id, invented: true }),
  );
});

test("settings change under their version only, by supervisor and officer", async () => {
  const id = await buildInvestigation(app);
  const supervisor = await signInAs(app, "supervisor", id);
  const tracer = await signInAs(app, "tracer", id);
  const body = { version: 1, populationAtRisk: 4000, infectiousBefore: 3 };
  expect((await tracer.client.call("patch", tracer.base, { body })).status).toBe(403);
  const changed = await supervisor.client.call("patch", supervisor.base, { body });
  expect(changed.status).toBe(200);
  expect(changed.body).toMatchObject({ populationAtRisk: 4000, infectiousBefore: 3, version: 2 });
  const stale = await supervisor.client.call("patch", supervisor.base, { body });
  expect(stale.status).toBe(409);
  expect(stale.body.code).toBe("stale_version");
});

test.each([
  ["a name that is blank", { name: "  " }, "name", "required"],
  ["a zone that is none", { name: "A", timeZone: "Mars/Olympus" }, "timeZone", "not_a_zone"],
  ["a population of nobody", { name: "A", populationAtRisk: 0 }, "populationAtRisk", "too_small"],
  ["a fraction of a day", { name: "A", incubationMax: 1.5 }, "incubationMax", "not_a_whole_number"],
  ["a key of somebody else's", { name: "A", graphVersion: 9 }, "", "unknown_key"],
])("%s is refused by field", async (_title, body, path, code) => {
  const officer = await signInAs(app, "officer", await buildInvestigation(app));
  const answer = await officer.client.post("/api/investigations", body);
  expect(answer.status).toBe(422);
  expect(answer.body.errors).toContainEqual({ path, code });
});
