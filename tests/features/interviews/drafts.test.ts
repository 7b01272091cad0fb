import { afterAll, beforeAll, expect, test } from "vitest";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, eventsNamed, register, submit } from "../../support/field-work.ts";

let app: TestApp;
let investigationId: string;
let tracer: Member;
let supervisor: Member;

beforeAll(async () => {
  app = await startTestApp();
  investigationId = await buildInvestigation(app);
  tracer = await signInAs(app, "tracer", investigationId);
  supervisor = await signInAs(app, "supervisor", investigationId);
});

afterAll(async () => {
  await app?.close();
});

const pathOf = (member: Member, personId: string) =>
  `${member.base}/people/${personId}/interview-draft`;
const keep = (member: Member, personId: string, version: number, body: Record<string, unknown>) =>
  member.client.call("put", pathOf(member, personId), { body: { version, body } });

test("a draft is kept at every step, encrypted, for its interviewer alone", async () => {
  const caseId = await register(tracer);
  const none = await tracer.client.get(pathOf(tracer, caseId));
  expect(none.body).toEqual({ version: 0, body: null, updatedAt: null });
  expect(await eventsNamed(app, investigationId, "interview.draft_opened")).toEqual([]);

  const first = await keep(tracer, caseId, 0, {
    step: "contacts",
    contacts: [{ name: "Half Typ" }],
  });
  expect(first.status).toBe(200);
  expect(first.body.version).toBe(1);
  const body = { step: "contacts", contacts: [{ name: "Half Typed", phone: "\u0000odd" }] };
  expect((await keep(tracer, caseId, 1, body)).body.version).toBe(2);
  const opened = await tracer.client.get(pathOf(tracer, caseId.toUpperCase()));
  expect(opened.body).toEqual({ version: 2, body, updatedAt: expect.stringMatching(/Z$/) });

  const others = await supervisor.client.get(pathOf(supervisor, caseId));
  expect(others.body).toEqual({ version: 0, body: null, updatedAt: null });
  const stored = await asAdmin<{ body_cipher: Buffer }>(
    app,
    "select body_cipher from identity.interview_draft where person_id = $1",
    [caseId],
  );
  expect(stored).toHaveLength(1);
  expect(stored[0]?.body_cipher.toString("latin1")).not.toContain("Half");

  const drafted = await eventsNamed(app, investigationId, "interview.drafted");
  expect(drafted.map((event) => event.person_ids)).toEqual([[caseId], [caseId]]);
  const seen = await eventsNamed(app, investigationId, "interview.draft_opened");
  expect(seen).toMatchObject([{ person_ids: [caseId], account_id: tracer.accountId }]);
});

test("a page that typed upon an older draft is told so and overwrites nothing", async () => {
  const caseId = await register(tracer);
  await keep(tracer, caseId, 0, { step: 1 });
  await keep(tracer, caseId, 1, { step: 2 });
  for (const version of [0, 1, 7]) {
    const stale = await keep(tracer, caseId, version, { step: "lost", name: "Never Echoed" });
    expect(stale.status).toBe(409);
    expect(stale.body.code).toBe("stale_version");
    expect(JSON.stringify(stale.body)).not.toContain("Echoed");
  }
  expect((await tracer.client.get(pathOf(tracer, caseId))).body.body).toEqual({ step: 2 });
});

test("submitting ends the draft, and a page left open does not bring it back", async () => {
  const caseId = await register(tracer);
  await keep(tracer, caseId, 0, { step: 1 });
  expect((await submit(tracer, caseId, { contacts: [contactRow()] })).status).toBe(201);
  expect((await tracer.client.get(pathOf(tracer, caseId))).body.version).toBe(0);
  expect((await keep(tracer, caseId, 1, { step: 2 })).status).toBe(409);
  expect((await tracer.client.get(pathOf(tracer, caseId))).body.version).toBe(0);
});

test("a call that reached nobody leaves the draft for the next try", async () => {
  const caseId = await register(tracer);
  await keep(tracer, caseId, 0, { step: 1 });
  expect((await submit(tracer, caseId, { outcome: "unreachable" })).status).toBe(201);
  expect((await tracer.client.get(pathOf(tracer, caseId))).body.body).toEqual({ step: 1 });
  expect((await submit(tracer, caseId, { outcome: "refused" })).status).toBe(201);
  expect((await tracer.client.get(pathOf(tracer, caseId))).body.body).toBeNull();
});

test("what is too large or no form is refused", async () => {
  const caseId = await register(tracer);
  const large = await keep(tracer, caseId, 0, { notes: "n".repeat(300 * 1024) });
  expect(large.status).toBe(413);
  const wrong = await tracer.client.call("put", pathOf(tracer, caseId), { body: { body: [] } });
  expect(wrong.status).toBe(422);
  expect((await tracer.client.get(pathOf(tracer, caseId))).body.version).toBe(0);
});
