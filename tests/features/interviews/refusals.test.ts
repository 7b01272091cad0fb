import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { dayIn, now, shiftDay } from "../../../server/clock.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, countRows, register, submit } from "../../support/field-work.ts";

let app: TestApp;
let tracer: Member;
let caseId: string;
const today = dayIn("UTC", now());
const tomorrow = shiftDay(today, 1);

beforeAll(async () => {
  app = await startTestApp();
  tracer = await signInAs(app, "tracer", await buildInvestigation(app));
  caseId = await register(tracer);
});

afterAll(async () => {
  await app?.close();
});

const refused: [string, Record<string, unknown>, { path: string; code: string }[]][] = [
  [
    "a future interview",
    { heldAt: "2199-01-01T00:00:00Z" },
    [{ path: "heldAt", code: "in_future" }],
  ],
  ["no instant", { heldAt: "2024-01-01" }, [{ path: "heldAt", code: "not_an_instant" }]],
  ["an outcome of its own", { outcome: "fine" }, [{ path: "outcome", code: "not_in_list" }]],
  [
    "future exposure days, whole and partial",
    {
      contacts: [
        contactRow(),
        contactRow({ firstExposure: tomorrow, lastExposure: tomorrow }),
        contactRow({ lastExposure: "2099-01" }),
      ],
      groupExposures: [{ setting: "social", firstExposure: tomorrow }],
    },
    [
      { path: "contacts.1.firstExposure", code: "in_future" },
      { path: "contacts.1.lastExposure", code: "in_future" },
      { path: "contacts.2.lastExposure", code: "in_future" },
      { path: "groupExposures.0.firstExposure", code: "in_future" },
    ],
  ],
  [
    "a last day before the first",
    { contacts: [contactRow({ firstExposure: today, lastExposure: shiftDay(today, -1) })] },
    [{ path: "contacts.0.lastExposure", code: "last_before_first" }],
  ],
  [
    "a last month before the first day",
    { contacts: [contactRow({ firstExposure: "2024-03-05", lastExposure: "2024-02" })] },
    [{ path: "contacts.0.lastExposure", code: "last_before_first" }],
  ],
  [
    "a day the calendar does not have",
    { contacts: [contactRow({ firstExposure: "2025-02-29" })] },
    [{ path: "contacts.0.firstExposure", code: "not_a_day" }],
  ],
  [
    "something that is no telephone number",
    { contacts: [contactRow(), contactRow({ phone: "ask her sister" })] },
    [{ path: "contacts.1.phone", code: "not_a_phone" }],
  ],
  [
    "nobody at all",
    { contacts: [contactRow({ name: " " })] },
    [{ path: "contacts.0.name", code: "required" }],
  ],
  [
    "somebody neither named nor to be called",
    { contacts: [contactRow({ name: "unknown", phone: "refused" })] },
    [{ path: "contacts.0.name", code: "required" }],
  ],
  [
    "an unknown place",
    { contacts: [contactRow({ placeId: randomUUID() })] },
    [{ path: "contacts.0.placeId", code: "not_known" }],
  ],
  [
    "a character that cannot be kept",
    { contacts: [contactRow({ name: "Nul\u0000l" }), contactRow({ relation: "\ud800" })] },
    [
      { path: "contacts.0.name", code: "bad_character" },
      { path: "contacts.1.relation", code: "not_text" },
    ],
  ],
  [
    "text and numbers out of bounds",
    {
      contacts: [
        contactRow({ name: "x".repeat(121) }),
        contactRow({ minutes: -1, distanceM: 1e9 }),
        contactRow({ minutes: 1.5 }),
        contactRow({ place: "p".repeat(100_000) }),
      ],
    },
    [
      { path: "contacts.0.name", code: "too_long" },
      { path: "contacts.1.minutes", code: "too_small" },
      { path: "contacts.1.distanceM", code: "too_big" },
      { path: "contacts.2.minutes", code: "not_a_whole_number" },
      { path: "contacts.3.place", code: "too_long" },
    ],
  ],
  [
    "counts the wrong way round",
    { groupExposures: [{ setting: "social", countMin: 9, countMax: 3 }] },
    [{ path: "groupExposures.0.countMax", code: "max_below_min" }],
  ],
  [
    "a field that is not of this form",
    { contacts: [contactRow({ classification: "confirmed" })] },
    [{ path: "contacts.0", code: "unknown_key" }],
  ],
  [
    "contacts that are no list",
    { contacts: { 0: contactRow() } },
    [{ path: "contacts", code: "wrong_type" }],
  ],
  [
    "more contacts than a form holds",
    { contacts: Array.from({ length: 201 }, () => ({ name: "N" })) },
    [{ path: "contacts", code: "too_many" }],
  ],
];

test.each(refused)("refuses %s with its path and stores nothing", async (_what, fields, errors) => {
  const people = await countRows(app, "person", tracer.investigationId);
  const answer = await submit(tracer, caseId, fields);
  expect(answer.status).toBe(422);
  expect(answer.body.code).toBe("invalid");
  for (const error of errors) expect(answer.body.errors).toContainEqual(error);
  const paths = answer.body.errors.map((error: { path: string }) => error.path);
  expect([...new Set(paths)].sort()).toEqual([...new Set(errors.map((one) => one.path))].sort());
  expect(await countRows(app, "person", tracer.investigationId)).toBe(people);
  expect(await countRows(app, "interview", tracer.investigationId)).toBe(0);
});

test("refuses a person as their own contact, whatever the case of the id", async () => {
  for (const personId of [caseId, caseId.toUpperCase()]) {
    const answer = await submit(tracer, caseId, { contacts: [contactRow({ personId })] });
    expect([answer.status, answer.body.errors]).toEqual([
      422,
      [{ path: "contacts.0.personId", code: "self_contact" }],
    ]);
  }
});

test("all errors come at once, and none of them repeats a value", async () => {
  const answer = await submit(tracer, caseId, {
    contacts: [
      contactRow({ name: "Private Personname", phone: "not a number" }),
      contactRow({ personId: randomUUID(), lastExposure: tomorrow }),
    ],
  });
  expect(answer.body.errors).toEqual([
    { path: "contacts.0.phone", code: "not_a_phone" },
    { path: "contacts.1.personId", code: "not_known" },
    { path: "contacts.1.lastExposure", code: "in_future" },
  ]);
  expect(JSON.stringify(answer.body)).not.toContain("Personname");
  expect(app.logs.join("")).not.toContain("Personname");
});

test("a refused form may be sent again with the same key once it is put right", async () => {
  const key = randomUUID();
  const bad = await submit(tracer, caseId, { contacts: [contactRow({ phone: "abc" })] }, key);
  expect(bad.status).toBe(422);
  const good = await submit(tracer, caseId, { contacts: [contactRow({ phone: null })] }, key);
  expect(good.status).toBe(201);
});

test("names are kept in one normal form, in any script", async () => {
  const names = [
    "Zoe\u0308 Nai\u0308ve",
    "田中 花子",
    "Ольга Ларина",
    "نور الهدى",
    "O’Brien-Ní Dhómhnaill",
    "😀 Smile",
  ];
  const answer = await submit(tracer, caseId, {
    contacts: names.map((name) => contactRow({ name })),
  });
  expect(answer.status).toBe(201);
  const page = await tracer.client.get(`${tracer.base}/people/${caseId}`);
  const shown = page.body.pairs.map((pair: { name: string }) => pair.name);
  for (const name of names) expect(shown).toContain(name.normalize("NFC"));
  const plain = await asAdmin(
    app,
    "select 1 from identity.person where name_masked ilike '%花子%' or name_masked ilike '%ларина%'",
  );
  expect(plain).toEqual([]);
});
