import { afterAll, beforeAll, expect, it } from "vitest";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, signInAs } from "../../support/factories.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.close());

it("a tracer who finds that a contact is a case goes on holding them by name", async () => {
  const investigation = await buildInvestigation(app);
  const tracer = await signInAs(app, "tracer", investigation);
  const made = await tracer.client.post(`${tracer.base}/people`, {
    name: "Index Person",
    classification: "confirmed",
  });
  const contact = { name: "Named Contact", phone: "020 7946 0321", setting: "social" };
  await tracer.client.post(`${tracer.base}/interviews`, {
    personId: made.body.id,
    outcome: "complete",
    contacts: [contact],
    groupExposures: [],
  });
  const page = await tracer.client.get(`${tracer.base}/people/${made.body.id}`);
  const id = page.body.pairs[0].personId as string;
  const before = await tracer.client.get(`${tracer.base}/people/${id}`);
  expect(before.body.assignedTo).toBeNull();
  const changed = await tracer.client.call("patch", `${tracer.base}/people/${id}`, {
    body: { version: before.body.version, classification: "probable" },
  });
  expect(changed.status, JSON.stringify(changed.body)).toBe(200);
  expect(changed.body).toMatchObject({
    name: "Named Contact",
    becameCase: true,
    assignedTo: tracer.accountId,
  });
});
