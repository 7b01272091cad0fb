import { afterAll, beforeAll, expect, test } from "vitest";
import { dayIn, now, shiftDay } from "../../../server/clock.ts";
import { followUpList } from "../../../shared/contracts/follow-up.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, eventsNamed, register, submit } from "../../support/field-work.ts";

const MONITORED = 10;
const today = dayIn("UTC", now());
const ago = (days: number) => shiftDay(today, -days);

let app: TestApp;
let investigationId: string;
let tracer: Member;
let stranger: Member;
let supervisor: Member;
let caseId: string;

/** Contacts of the tracer's case by name and last exposure day. */
const CONTACTS: [name: string, lastExposure: string | null][] = [
  ["Met Today", ago(0)],
  ["First Day", ago(1)],
  ["Last Day", ago(MONITORED)],
  ["Day After", ago(MONITORED + 1)],
  ["Long Over", ago(60)],
  ["Month Only", ago(3).slice(0, 7)],
  ["Not Known", "unknown"],
  ["Not Asked", null],
];

beforeAll(async () => {
  app = await startTestApp();
  investigationId = await buildInvestigation(app, { monitoringDays: MONITORED });
  tracer = await signInAs(app, "tracer", investigationId);
  stranger = await signInAs(app, "tracer", investigationId);
  supervisor = await signInAs(app, "supervisor", investigationId);
  caseId = await register(tracer);
  const told = await submit(tracer, caseId, {
    contacts: CONTACTS.map(([name, lastExposure], row) =>
      contactRow({ name, lastExposure, phone: `020 7946 01${String(row).padStart(2, "0")}` }),
    ),
  });
  if (told.status !== 201) throw new Error(`submitting answered ${told.status}`);
});

afterAll(async () => {
  await app?.close();
});

async function read(member: Member, query: Record<string, string> = {}) {
  const answer = await member.client.get(`${member.base}/follow-up`, query);
  expect(answer.status).toBe(200);
  return followUpList.parse(answer.body);
}
const names = (list: Awaited<ReturnType<typeof read>>) => list.items.map((item) => item.name);

test("due today are days 1 to M, those ending first at the top", async () => {
  const list = await read(tracer);
  expect(names(list)).toEqual(["Last Day", "First Day"]);
  expect(list).toMatchObject({ total: 2, page: 1, pageSize: 50, today, withoutDayZero: 3 });
  expect(list.items[1]).toMatchObject({
    phone: "020 7946 0101",
    classification: "contact",
    dayZero: ago(1),
    dayNumber: 1,
    lastDueDay: shiftDay(today, MONITORED - 1),
    monitoringDays: MONITORED,
  });
  expect(list.items[0]).toMatchObject({ dayNumber: MONITORED, lastDueDay: today });
});

test("ended and all take the rest; no whole last day, no day 0", async () => {
  expect(names(await read(tracer, { show: "ended" }))).toEqual(["Long Over", "Day After"]);
  const all = await read(tracer, { show: "all" });
  expect(names(all)).toEqual(["Long Over", "Day After", "Last Day", "First Day", "Met Today"]);
  expect(all.items.at(-1)).toMatchObject({ dayNumber: 0 });
  expect(all.withoutDayZero).toBe(3);
});

test("pages, sorting and search are the server's", async () => {
  const first = await read(tracer, { show: "all", sort: "-lastDueDay", pageSize: "2" });
  const second = await read(tracer, { show: "all", sort: "-lastDueDay", pageSize: "2", page: "2" });
  expect([...names(first), ...names(second)]).toEqual([
    "Met Today",
    "First Day",
    "Last Day",
    "Day After",
  ]);
  expect([first.total, second.total]).toEqual([5, 5]);
  expect(await read(tracer, { page: "9" })).toMatchObject({ items: [], total: 2 });
  expect(names(await read(tracer, { show: "all", q: "LONG óver" }))).toEqual(["Long Over"]);
  expect(names(await read(tracer, { show: "all", q: "02079460101" }))).toEqual(["First Day"]);
  const number = first.items[0]?.studyNumber ?? "";
  expect(names(await read(tracer, { show: "all", q: number.toLowerCase() }))).toEqual([
    "Met Today",
  ]);
  for (const query of [{ sort: "name" }, { sort: "phone" }, { sort: "toString" }]) {
    const refused = await tracer.client.get(`${tracer.base}/follow-up`, query);
    expect([refused.status, refused.body.errors]).toEqual([
      422,
      [{ path: "sort", code: "not_sortable" }],
    ]);
  }
  const show = await tracer.client.get(`${tracer.base}/follow-up`, { show: "everyone" });
  expect([show.status, show.body.errors]).toEqual([422, [{ path: "show", code: "not_in_list" }]]);
});

test("a tracer follows their own; another sees nothing", async () => {
  expect(await read(stranger, { show: "all" })).toMatchObject({
    items: [],
    total: 0,
    withoutDayZero: 0,
  });
  expect((await read(supervisor, { show: "all" })).total).toBe(5);
});

test("day 0 is the latest over all cases, also those out of the tracer's sight", async () => {
  const shared = await register(stranger, { name: "Shared Person", classification: "contact" });
  const second = await register(stranger, { name: "Second Case" });
  await submit(stranger, second, {
    contacts: [contactRow({ personId: shared, lastExposure: ago(2) })],
  });
  await submit(supervisor, caseId, {
    contacts: [contactRow({ personId: shared, lastExposure: ago(8) })],
  });
  const dayOf = async (member: Member) =>
    (await read(member, { show: "all" })).items.find((item) => item.id === shared)?.dayZero;
  expect(await dayOf(tracer)).toBe(ago(2));
  expect(await dayOf(supervisor)).toBe(ago(2));
  // A telling that is withdrawn no longer counts.
  await asAdmin(app, `update core.exposure set withdrawn_at = now() where named_by = $1`, [second]);
  expect(await dayOf(supervisor)).toBe(ago(8));
});

test("cases, withdrawn people and contacts of contacts are not under follow-up", async () => {
  const contact = await register(supervisor, { name: "Plain Contact", classification: "contact" });
  await submit(supervisor, contact, {
    contacts: [contactRow({ name: "Third Hand", lastExposure: ago(2) })],
  });
  const list = await read(supervisor, { show: "all", pageSize: "200" });
  expect(names(list)).not.toContain("Third Hand");
  expect(names(list)).not.toContain("Case Person");

  const [gone] = (await read(supervisor, { q: "First Day" })).items;
  await asAdmin(app, "update core.person set withdrawn_at = now() where id = $1", [gone?.id]);
  expect(names(await read(supervisor))).not.toContain("First Day");
  await asAdmin(app, "update core.person set withdrawn_at = null where id = $1", [gone?.id]);

  await asAdmin(app, "update core.person set classification = 'confirmed' where id = $1", [
    gone?.id,
  ]);
  expect(names(await read(supervisor))).not.toContain("First Day");
  await asAdmin(app, "update core.person set classification = 'contact' where id = $1", [gone?.id]);
});

test("a person not yet classified is a contact once a case has named them", async () => {
  const unclassified = await register(supervisor, { name: "Un Classified", classification: null });
  const third = await register(supervisor, { name: "Third Case" });
  await submit(supervisor, third, {
    contacts: [contactRow({ personId: unclassified, lastExposure: ago(4) })],
  });
  await asAdmin(app, "update core.person set classification = null where id = $1", [unclassified]);
  const listed = async () =>
    (await read(supervisor, { pageSize: "200" })).items.find((item) => item.id === unclassified);
  expect(await listed()).toMatchObject({ classification: null, dayNumber: 4 });
  await asAdmin(app, "update core.exposure set named_by = null where named_by = $1", [third]);
  expect(await listed()).toBeUndefined();
});

test("reading the list is one event that names people and fields, not values", async () => {
  const before = await eventsNamed(app, investigationId, "follow_up.listed");
  const list = await read(tracer, { show: "all" });
  const after = await eventsNamed(app, investigationId, "follow_up.listed");
  expect(after).toHaveLength(before.length + 1);
  const event = after.at(-1);
  expect(event?.account_id).toBe(tracer.accountId);
  expect([...(event?.person_ids ?? [])].sort()).toEqual(list.items.map((item) => item.id).sort());
  expect([...(event?.fields ?? [])].sort()).toEqual(["name", "phone"]);
});
