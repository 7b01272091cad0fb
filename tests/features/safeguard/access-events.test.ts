import { randomUUID } from "node:crypto";
import pg from "pg";
import { afterAll, beforeAll, expect, test } from "vitest";
import type { AccessEvent } from "../../../shared/contracts/safeguard.ts";
import { ROLES } from "../../../shared/roles.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInEveryone } from "../../support/factories.ts";

let app: TestApp;
let everyone: Record<(typeof ROLES)[number], Member>;
let personId: string;
let otherPersonId: string;

beforeAll(async () => {
  app = await startTestApp();
  const investigationId = await buildInvestigation(app);
  everyone = await signInEveryone(app, investigationId);
  [personId, otherPersonId] = [randomUUID(), randomUUID()];
  const admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  try {
    for (const [id, number] of [
      [personId, "P-00071"],
      [otherPersonId, "P-00072"],
    ]) {
      await admin.query(
        "insert into core.person (id, investigation_id, study_number) values ($1, $2, $3)",
        [id, investigationId, number],
      );
    }
    for (let minute = 0; minute < 30; minute++) {
      await admin.query(
        `insert into audit.event (at, investigation_id, account_id, role, action, person_ids, fields)
         values (now() - make_interval(mins => $1), $2, $3, 'tracer', 'person.opened', $4, '{name,phone}')`,
        [
          minute + 1,
          investigationId,
          everyone.tracer.accountId,
          minute % 3 === 0 ? [otherPersonId, personId] : [personId],
        ],
      );
    }
  } finally {
    await admin.end();
  }
});

afterAll(async () => {
  await app?.close();
});

async function read(query: Record<string, string> = {}) {
  const answer = await everyone.officer.client.get(`${everyone.officer.base}/access-events`, query);
  expect(answer.status).toBe(200);
  return answer.body as { items: AccessEvent[]; total: number; page: number; pageSize: number };
}

test("newest first, page by page, each event once", async () => {
  const query = { action: "person.opened", pageSize: "12" };
  const pages = [
    await read({ ...query, page: "1" }),
    await read({ ...query, page: "2" }),
    await read({ ...query, page: "3" }),
  ];
  expect(pages.map((page) => page.items.length)).toEqual([12, 12, 6]);
  expect(pages.map((page) => page.total)).toEqual([30, 30, 30]);
  const items = pages.flatMap((page) => page.items);
  expect(new Set(items.map((item) => item.id)).size).toBe(30);
  const times = items.map((item) => item.at);
  expect(times).toEqual([...times].sort().reverse());
});

test("who by name, whom by study number, in the order of the ids", async () => {
  const { items } = await read({ action: "person.opened", personId: otherPersonId });
  expect(items).toHaveLength(10);
  expect(items[0]).toMatchObject({
    accountId: everyone.tracer.accountId,
    displayName: expect.stringMatching(/^Account \d+$/),
    role: "tracer",
    fields: ["name", "phone"],
    personIds: [otherPersonId, personId],
    studyNumbers: ["P-00072", "P-00071"],
  });
});

test("filters by person, action and account, and words find study numbers and names", async () => {
  expect((await read({ personId })).total).toBe(30);
  expect((await read({ personId: randomUUID() })).total).toBe(0);
  const { accountId } = everyone.tracer;
  // Thirty openings and the sign-in.
  expect((await read({ accountId, pageSize: "1" })).total).toBe(31);
  expect((await read({ q: "p-00072" })).total).toBe(10);
  const name = (await read({ accountId })).items[0]?.displayName ?? "nobody";
  expect((await read({ q: name, action: "person.opened" })).total).toBe(30);
});

test("reading the record is on record, after what it shows", async () => {
  const before = await read({ action: "access_events.read" });
  const after = await read({ action: "access_events.read" });
  expect(after.total).toBe(before.total + 1);
  expect(after.items[0]).toMatchObject({
    accountId: everyone.officer.accountId,
    counts: { events: before.items.length },
  });
});

test("sorting is refused and nobody but the officer may read", async () => {
  const officer = everyone.officer;
  const sorted = await officer.client.get(`${officer.base}/access-events`, { sort: "at" });
  expect(sorted.status).toBe(422);
  expect(sorted.body.errors).toEqual([{ path: "sort", code: "not_sortable" }]);
  for (const role of ROLES.filter((one) => one !== "officer")) {
    const answer = await everyone[role].client.get(`${everyone[role].base}/access-events`);
    expect(answer.status).toBe(403);
  }
});

test("events of another investigation and a stranger's name stay out", async () => {
  const elsewhere = await signInEveryone(app, await buildInvestigation(app));
  const list = await elsewhere.officer.client.get(`${elsewhere.officer.base}/access-events`, {
    pageSize: "200",
  });
  const ours = new Set(Object.values(everyone).map((member) => member.accountId));
  expect(list.body.items.filter((item: AccessEvent) => ours.has(item.accountId ?? ""))).toEqual([]);
  expect(list.body.total).toBe(4);
});

test("the name of somebody whose membership has ended is kept", async () => {
  const { officer, epidemiologist } = everyone;
  const ended = await officer.client.call(
    "delete",
    `${officer.base}/members/${epidemiologist.memberId}`,
  );
  expect(ended.status).toBe(204);
  const { items } = await read({ accountId: epidemiologist.accountId });
  expect(items[0]?.displayName).toMatch(/^Account \d+$/);
});
