import { afterAll, beforeAll, expect, test } from "vitest";
import type { Team } from "../../../shared/contracts/investigations.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import {
  buildAccount,
  buildInvestigation,
  type Member,
  signInAs,
} from "../../support/factories.ts";
import { asAdmin, register } from "../../support/field-work.ts";

let app: TestApp;
let officer: Member;

beforeAll(async () => {
  app = await startTestApp();
  officer = await signInAs(app, "officer", await buildInvestigation(app));
});

afterAll(async () => {
  await app?.close();
});

const make = (name: string, by = officer) => by.client.post(`${by.base}/teams`, { name });
const rename = (id: string, version: number, name: string, by = officer) =>
  by.client.call("patch", `${by.base}/teams/${id}`, { body: { version, name } });
const remove = (id: string, by = officer) => by.client.call("delete", `${by.base}/teams/${id}`);
const teams = async (q = ""): Promise<Team[]> =>
  (await officer.client.get(`${officer.base}/teams`, q ? { q } : {})).body.items;

test("teams are made, listed by name and renamed; a name is taken once, case aside", async () => {
  const south = await make("South");
  expect(south.status).toBe(201);
  const north = await make(" North ");
  expect((await teams()).map((team) => team.name)).toEqual(["North", "South"]);
  expect((await make("north")).body.errors).toEqual([{ path: "name", code: "team_taken" }]);
  expect((await make("  ")).body.errors).toEqual([{ path: "name", code: "required" }]);
  expect((await rename(north.body.id, 1, "SOUTH")).body.errors).toEqual([
    { path: "name", code: "team_taken" },
  ]);
  expect((await rename(north.body.id, 1, "NORTH")).body).toEqual({ id: north.body.id, version: 2 });
  expect((await rename(north.body.id, 1, "West")).body.code).toBe("stale_version");
  expect((await teams("nor")).map((team) => team.name)).toEqual(["NORTH"]);
  const both = await Promise.all([make("Twice"), make("twice")]);
  expect(both.map((answer) => answer.status).sort()).toEqual([201, 422]);
});

test("a team is removed when nothing hangs on it: no member, no invitation, nobody assigned", async () => {
  const { id } = (await make("Quay")).body;
  const account = await buildAccount(app);
  const added = await officer.client.post(`${officer.base}/members`, {
    email: account.email,
    role: "tracer",
    team: "quay",
  });
  const invited = await officer.client.post(`${officer.base}/invitations`, {
    email: "quay@test.example",
    role: "tracer",
    team: "Quay",
  });
  const supervisor = await signInAs(app, "supervisor", officer.investigationId);
  const personId = await register(supervisor);
  await asAdmin(app, "update core.person set assigned_team_id = $2 where id = $1", [personId, id]);
  expect(await teams("quay")).toEqual([
    { id, name: "Quay", members: 1, invitations: 1, people: 1, version: 1 },
  ]);
  const steps = [
    () => officer.client.call("delete", `${officer.base}/members/${added.body.id}`),
    () => officer.client.call("delete", `${officer.base}/invitations/${invited.body.id}`),
    () => asAdmin(app, "update core.person set assigned_team_id = null where id = $1", [personId]),
  ];
  for (const step of steps) {
    const refused = await remove(id);
    expect([refused.status, refused.body.errors]).toEqual([
      409,
      [{ path: "teamId", code: "team_in_use" }],
    ]);
    await step();
  }
  expect((await remove(id)).status).toBe(204);
  expect((await remove(id)).status).toBe(404);
  expect(await teams("quay")).toEqual([]);
  // The membership of the past keeps the name; a new team may have it again.
  const past = await officer.client.get(`${officer.base}/members`, {
    show: "past",
    q: account.email,
  });
  expect(past.body.items).toMatchObject([{ team: "Quay" }]);
  expect((await make("Quay")).status).toBe(201);
});

test("teams of another investigation are not found, and tracers have none to list", async () => {
  const { id } = (await make("Own")).body;
  const elsewhere = await signInAs(app, "supervisor", await buildInvestigation(app));
  expect((await rename(id, 1, "Theirs", elsewhere)).status).toBe(404);
  expect((await remove(id, elsewhere)).status).toBe(404);
  const listed = await elsewhere.client.get(`${elsewhere.base}/teams`);
  expect(listed.body.items).toEqual([]);
  const tracer = await signInAs(app, "tracer", officer.investigationId);
  expect((await tracer.client.get(`${tracer.base}/teams`)).status).toBe(403);
  const actions = await officer.client.get(`${officer.base}/access-events`, {
    action: "team.renamed",
  });
  expect(actions.body.total).toBe(1);
});
