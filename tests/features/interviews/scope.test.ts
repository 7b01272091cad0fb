import { randomUUID } from "node:crypto";
import type request from "supertest";
import { afterAll, beforeAll, expect, test } from "vitest";
import type { Role } from "../../../shared/roles.ts";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";
import {
  buildInvestigation,
  type Member,
  signInAs,
  signInEveryone,
} from "../../support/factories.ts";
import { asAdmin, contactRow, eventsNamed, register, submit } from "../../support/field-work.ts";

let app: TestApp;
let investigationId: string;
let everyone: Record<Role, Member>;
let stranger: Member;

beforeAll(async () => {
  app = await startTestApp();
  investigationId = await buildInvestigation(app);
  everyone = await signInEveryone(app, investigationId);
  stranger = await signInAs(app, "tracer", investigationId);
});

afterAll(async () => {
  await app?.close();
});

/** A problem without what differs from request to request. */
function bare(answer: request.Response) {
  const { instance: _instance, ...rest } = answer.body;
  return { status: answer.status, ...rest };
}

test("a person of another tracer answers like one who does not exist", async () => {
  const caseId = await register(everyone.tracer);
  const nobody = randomUUID();
  const drafts = (id: string) => `${stranger.base}/people/${id}/interview-draft`;
  for (const ask of [
    (id: string) => submit(stranger, id),
    (id: string) => stranger.client.get(drafts(id)),
    (id: string) =>
      stranger.client.call("put", drafts(id), { body: { version: 0, body: { step: 1 } } }),
  ]) {
    const [theirs, absent] = [await ask(caseId), await ask(nobody)];
    expect(theirs.status).toBe(404);
    expect(bare(theirs)).toEqual(bare(absent));
  }
  const own = await register(stranger);
  for (const personId of [caseId, nobody]) {
    const named = await submit(stranger, own, { contacts: [contactRow({ personId })] });
    expect(named.status).toBe(422);
    expect(named.body.errors).toEqual([{ path: "contacts.0.personId", code: "not_known" }]);
  }
  expect(await asAdmin(app, "select 1 from core.interview where person_id = $1", [own])).toEqual(
    [],
  );
});

test("a case seen from a held contact is not the contact's tracer's to interview", async () => {
  const caseId = await register(everyone.tracer);
  const held = await register(stranger, { name: "Held Contact", classification: "contact" });
  const told = await submit(everyone.supervisor, caseId, {
    contacts: [contactRow({ personId: held })],
  });
  expect(told.status).toBe(201);
  // In sight by study number, yet not by name.
  const page = await stranger.client.get(`${stranger.base}/people/${caseId}`);
  expect(page.status).toBe(200);
  expect(page.body).not.toHaveProperty("name");
  expect((await submit(stranger, caseId)).status).toBe(404);
  const drafts = `${stranger.base}/people/${caseId}/interview-draft`;
  expect((await stranger.client.get(drafts)).status).toBe(404);
});

test("a team's case is its tracers' to interview, an out-of-team tracer's not", async () => {
  const caseId = await register(everyone.supervisor);
  const teamId = randomUUID();
  await asAdmin(app, "insert into core.team (id, investigation_id, name) values ($1, $2, 'East')", [
    teamId,
    investigationId,
  ]);
  await asAdmin(app, "update core.member set team_id = $1 where id = $2", [
    teamId,
    stranger.memberId,
  ]);
  await asAdmin(app, "update core.person set assigned_team_id = $1 where id = $2", [
    teamId,
    caseId,
  ]);
  expect((await submit(everyone.tracer, caseId)).status).toBe(404);
  const contacts = [contactRow({ name: "Of The Team" })];
  expect((await submit(stranger, caseId, { contacts })).status).toBe(201);
  await asAdmin(app, "update core.member set team_id = null where id = $1", [stranger.memberId]);
  expect((await submit(stranger, caseId)).status).toBe(404);
});

test("a contact already paired out of sight gets no second pair", async () => {
  // The supervisor pairs two people; neither pair nor case is the stranger's, the contact becomes so.
  const caseId = await register(everyone.supervisor);
  const contact = await register(everyone.supervisor, {
    name: "Shared Contact",
    classification: "suspected",
  });
  await submit(everyone.supervisor, caseId, { contacts: [contactRow({ personId: contact })] });
  await asAdmin(
    app,
    "update core.contact_pair set withdrawn_at = now() where $1 in (person_a, person_b)",
    [contact],
  );
  await asAdmin(app, "update core.person set assigned_account_id = $1 where id = any ($2)", [
    stranger.accountId,
    [caseId, contact],
  ]);
  const again = await submit(stranger, contact, { contacts: [contactRow({ personId: caseId })] });
  expect(again.status).toBe(201);
  const pairs = await asAdmin(
    app,
    `select withdrawn_at, (select count(*)::int from core.exposure e where e.pair_id = cp.id) as tellings
     from core.contact_pair cp where $1 in (person_a, person_b)`,
    [contact],
  );
  expect(pairs).toEqual([{ withdrawn_at: null, tellings: 2 }]);
});

test("epidemiologist and officer never have these routes", async () => {
  const caseId = await register(everyone.tracer);
  for (const role of ["epidemiologist", "officer"] as const) {
    const { client, base } = everyone[role];
    const draft = `${base}/people/${caseId}/interview-draft`;
    const answers = [
      await submit(everyone[role], caseId),
      await client.get(`${base}/interviews`),
      await client.get(draft),
      await client.call("put", draft, { body: { version: 0, body: {} } }),
      await client.get(`${base}/follow-up`),
    ];
    for (const answer of answers) {
      expect(answer.status).toBe(403);
      expect(answer.body.code).toBe("role_refused");
    }
  }
  const nobody = new TestClient(app);
  expect((await nobody.get(`${everyone.tracer.base}/interviews`)).status).toBe(401);
  const gone = await everyone.tracer.client.call("delete", `${everyone.tracer.base}/interviews`);
  expect(gone.status).toBe(405);
});

test("a match out of sight goes to the supervisor's list and is not hinted at", async () => {
  const theirs = await register(stranger, {
    name: "Ottoline Hiddenname",
    phone: "+44 20 7946 0555",
    classification: "contact",
  });
  const caseId = await register(everyone.tracer);
  const answers = [];
  for (const contact of [
    contactRow({ name: "Someone Else Entirely", phone: "020 7946 0777" }),
    contactRow({ name: "Ottoline Hiddenname", phone: "020 7946 0555" }),
  ]) {
    answers.push(await submit(everyone.tracer, caseId, { contacts: [contact] }));
  }
  const [plain, met] = answers;
  expect(plain?.status).toBe(201);
  expect(met?.status).toBe(201);
  expect(Object.keys(met?.body)).toEqual(Object.keys(plain?.body));
  expect(Object.keys(met?.headers ?? {}).sort()).toEqual(Object.keys(plain?.headers ?? {}).sort());

  const review = await asAdmin<{ person_id: string; matched_on: string[] }>(
    app,
    `select person_id, matched_on from core.match_review
     where investigation_id = $1 and other_id = $2`,
    [investigationId, theirs],
  );
  expect(review).toMatchObject([{ matched_on: ["phone", "name"] }]);
  expect(review[0]?.person_id).not.toBe(theirs);
  const pair = await asAdmin(
    app,
    "select 1 from core.contact_pair where $1 in (person_a, person_b) and $2 in (person_a, person_b)",
    [caseId, theirs],
  );
  expect(pair).toEqual([]);
  const reviews = await asAdmin(
    app,
    `select 1 from core.match_review r join identity.person i on i.person_id = r.person_id
     where r.investigation_id = $1 and i.phone_last2 in ('55', '77')`,
    [investigationId],
  );
  expect(reviews).toHaveLength(1);
});

test("the list of interviews is as wide as the scope, and its reading is on record", async () => {
  const mine = await register(everyone.tracer);
  const contacts = [contactRow({ name: "Listed One" }), contactRow({ name: "Listed Two" })];
  const groupExposures = [{ setting: "social", countMin: 4, countMax: null }];
  const made = await submit(everyone.tracer, mine, { channel: "visit", contacts, groupExposures });
  const read = async (member: Member, query: Record<string, string> = {}) =>
    (await member.client.get(`${member.base}/interviews`, query)).body;
  const own = await read(everyone.tracer, { personId: mine });
  expect(own).toMatchObject({ total: 1, page: 1, pageSize: 50 });
  expect(own.items[0]).toMatchObject({
    id: made.body.id,
    personId: mine,
    outcome: "complete",
    channel: "visit",
    contacts: 2,
    groupExposures: 1,
  });
  expect((await read(stranger, { personId: mine })).items).toEqual([]);
  const all = await read(everyone.supervisor);
  expect(all.total).toBeGreaterThan(own.total);
  const paged = [
    ...(await read(everyone.supervisor, { page: "1", pageSize: "2", sort: "recordedAt" })).items,
    ...(await read(everyone.supervisor, { page: "2", pageSize: "2", sort: "recordedAt" })).items,
  ];
  expect(new Set(paged.map((one: { id: string }) => one.id)).size).toBe(4);
  const times = paged.map((one: { recordedAt: string }) => one.recordedAt);
  expect(times).toEqual([...times].sort());
  const beyond = await read(everyone.supervisor, { page: "400" });
  expect(beyond).toMatchObject({ items: [], total: all.total });
  const number = own.items[0].studyNumber as string;
  expect((await read(everyone.supervisor, { q: number.toLowerCase() })).items).toHaveLength(1);
  expect((await read(everyone.supervisor, { q: "%" })).total).toBe(0);
  const bad = await everyone.tracer.client.get(`${everyone.tracer.base}/interviews`, {
    sort: "constructor",
  });
  expect([bad.status, bad.body.errors]).toEqual([422, [{ path: "sort", code: "not_sortable" }]]);
  const events = await eventsNamed(app, investigationId, "interviews.listed");
  expect(events).toContainEqual(
    expect.objectContaining({
      account_id: everyone.tracer.accountId,
      person_ids: [mine],
      counts: { interviews: 1 },
    }),
  );
});
