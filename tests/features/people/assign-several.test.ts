import { randomUUID } from "node:crypto";
import pg from "pg";
import { afterAll, beforeAll, expect, it } from "vitest";
import type { Role } from "../../../shared/roles.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInEveryone } from "../../support/factories.ts";

let app: TestApp;
let admin: pg.Client;
let investigation: string;
let team: Record<Role, Member>;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  investigation = await buildInvestigation(app);
  team = await signInEveryone(app, investigation);
});
afterAll(async () => {
  await admin.end();
  await app.close();
});

interface Made {
  id: string;
  version: number;
}

async function register(area: string, count: number): Promise<Made[]> {
  const { client, base } = team.supervisor;
  const made: Made[] = [];
  for (let at = 0; at < count; at++) {
    const { body } = await client.post(`${base}/people`, { name: `Some Body ${at}`, area });
    made.push({ id: body.id, version: body.version });
  }
  return made;
}

const assign = (who: Role, body: unknown) =>
  team[who].client.post(`${team[who].base}/people/assign`, body);
const toTracer = () => ({ kind: "member", accountId: team.tracer.accountId });

async function holdersOf(people: readonly Made[]) {
  const found = await admin.query(
    `select assigned_account_id as account, assigned_team_id as team, version from core.person
     where id = any ($1) order by array_position($1, id)`,
    [people.map((one) => one.id)],
  );
  return found.rows;
}

it("assigns those named, and lists who was changed meanwhile or is not there", async () => {
  const people = await register("One", 3);
  const [first, second] = people as [Made, Made, Made];
  const { client, base } = team.supervisor;
  await client.call("patch", `${base}/people/${second.id}`, {
    body: { version: second.version, area: "Else" },
  });
  const gone = randomUUID();
  const asked = [...people, { id: gone, version: 1 }];
  const done = await assign("supervisor", { to: toTracer(), people: asked });
  expect(done.status).toBe(200);
  expect(done.body).toEqual({ changed: 2, unchanged: 0, skipped: [second.id, gone] });
  expect((await holdersOf(people)).map((row) => row.account)).toEqual([
    team.tracer.accountId,
    null,
    team.tracer.accountId,
  ]);
  const event = await admin.query(
    "select person_ids, counts, fields from audit.event where action = 'people.assigned'",
  );
  expect(event.rows).toHaveLength(1);
  expect(event.rows[0].counts).toEqual({ changed: 2, unchanged: 0, skipped: 2 });
  expect(event.rows[0].person_ids).toHaveLength(2);
  // Once more: the versions are old now, and nothing is changed twice.
  const again = await assign("supervisor", { to: toTracer(), people: [first] });
  expect(again.body).toEqual({ changed: 0, unchanged: 0, skipped: [first.id] });
  const [now] = await holdersOf([first]);
  const same = await assign("supervisor", {
    to: toTracer(),
    people: [{ id: first.id, version: now.version }],
  });
  expect(same.body).toEqual({ changed: 0, unchanged: 1, skipped: [] });
});

it("assigns everybody a filter finds, only while it finds as many as were seen", async () => {
  const people = await register("Two", 4);
  const request = { to: toTracer(), filter: { area: "Two" }, expected: 3 };
  const stale = await assign("supervisor", request);
  expect([stale.status, stale.body.code]).toEqual([409, "stale_version"]);
  expect((await holdersOf(people)).every((row) => row.account === null)).toBe(true);
  const done = await assign("supervisor", { ...request, expected: 4 });
  expect(done.body).toEqual({ changed: 4, unchanged: 0, skipped: [] });
  const back = await assign("supervisor", {
    to: { kind: "nobody" },
    filter: { area: "Two", q: "some body" },
    expected: 4,
  });
  expect(back.body).toEqual({ changed: 4, unchanged: 0, skipped: [] });
});

it("assigns a team, whose tracers then hold them", async () => {
  const people = await register("Three", 2);
  const teamId = randomUUID();
  await admin.query(
    "insert into core.team (id, investigation_id, name) values ($1, $2, 'Harbour')",
    [teamId, investigation],
  );
  const { client, base } = team.supervisor;
  const known = await client.get(`${base}/people/assignees`);
  expect(known.body.teams).toEqual([{ id: teamId, name: "Harbour" }]);
  expect(known.body.members.map((one: { accountId: string }) => one.accountId)).toContain(
    team.tracer.accountId,
  );
  const done = await assign("supervisor", { to: { kind: "team", teamId }, people });
  expect(done.body.changed).toBe(2);
  await admin.query("update core.member set team_id = $1 where account_id = $2", [
    teamId,
    team.tracer.accountId,
  ]);
  const mine = await team.tracer.client.get(`${team.tracer.base}/people`, { assigned: "team" });
  expect(mine.body.total).toBe(2);
  expect(mine.body.items[0].assignedTeam).toBe(teamId);
});

it("lets a tracer take what they may name, and neither give away nor reach further", async () => {
  const [hidden] = await register("Four", 1);
  const seen = await team.tracer.client.get(`${team.tracer.base}/people`, { assigned: "team" });
  const people = (seen.body.items as Made[]).map(({ id, version }) => ({ id, version }));
  const taken = await assign("tracer", { to: toTracer(), people: [...people, hidden as Made] });
  expect(taken.body).toEqual({ changed: 2, unchanged: 0, skipped: [hidden?.id] });
  const given = await assign("tracer", { to: { kind: "nobody" }, people: [hidden] });
  expect(given.body.errors).toEqual([{ path: "to.kind", code: "not_in_list" }]);
  const other = await assign("tracer", {
    to: { kind: "member", accountId: team.supervisor.accountId },
    people: [hidden],
  });
  expect(other.body.errors).toEqual([{ path: "to.accountId", code: "not_known" }]);
});

it("says what is wrong with a request, and changes nothing", async () => {
  const many = Array.from({ length: 501 }, () => ({ id: randomUUID(), version: 1 }));
  const wrong: [unknown, { path: string; code: string }[]][] = [
    [{ to: toTracer(), people: many }, [{ path: "people", code: "too_many" }]],
    [{ to: toTracer(), people: [] }, [{ path: "people", code: "required" }]],
    [{ to: toTracer() }, [{ path: "people", code: "required" }]],
    [{ to: toTracer(), filter: {} }, [{ path: "expected", code: "required" }]],
    [
      { to: { kind: "member", accountId: randomUUID() }, filter: {}, expected: 1 },
      [{ path: "to.accountId", code: "not_known" }],
    ],
    [
      { to: { kind: "team", teamId: randomUUID() }, filter: {}, expected: 1 },
      [{ path: "to.teamId", code: "not_known" }],
    ],
  ];
  for (const [body, errors] of wrong) {
    const answer = await assign("supervisor", body);
    expect([answer.status, answer.body.errors]).toEqual([422, errors]);
  }
  expect((await assign("epidemiologist", { to: toTracer(), filter: {}, expected: 0 })).status).toBe(
    403,
  );
});
