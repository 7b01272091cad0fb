import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { dayIn, now, shiftDay } from "../../../server/clock.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import {
  asAdmin,
  contactRow,
  countRows,
  eventsNamed,
  register,
  submit,
} from "../../support/field-work.ts";

let app: TestApp;
let investigationId: string;
let tracer: Member;
let supervisor: Member;
const today = dayIn("UTC", now());

beforeAll(async () => {
  app = await startTestApp();
  investigationId = await buildInvestigation(app);
  tracer = await signInAs(app, "tracer", investigationId);
  supervisor = await signInAs(app, "supervisor", investigationId);
});

afterAll(async () => {
  await app?.close();
});

test("an interview with twelve contacts is stored whole, with one event", async () => {
  const caseId = await register(tracer, { household: "Mill Lane 4", onsetDate: today });
  const before = (await supervisor.client.get(supervisor.base)).body.graphVersion as number;
  const contacts = Array.from({ length: 12 }, (_, row) =>
    contactRow({
      name: `Twelve Contact${"abcdefghijkl"[row]}`,
      phone: `020 7946 00${String(row).padStart(2, "0")}`,
      setting: row === 0 ? "household" : "workplace",
      place: row === 0 ? null : `Cannery ${row % 3}`,
      firstExposure: shiftDay(today, -5),
      lastExposure: row === 1 ? "unknown" : shiftDay(today, -(row % 4)),
      minutes: row === 2 ? "refused" : 15 + row,
      distanceM: row === 3 ? "unknown" : 1.5,
      physical: row % 2 === 0,
      indoors: row === 4 ? "unknown" : true,
      relation: "colleague",
    }),
  );
  const answer = await submit(tracer, caseId, { channel: "telephone", contacts });
  expect(answer.status).toBe(201);
  expect(answer.body).toEqual({ id: expect.any(String), graphVersion: before + 1 });

  const stored = await asAdmin<Record<string, unknown>>(
    app,
    `select i.outcome, i.channel, i.day, i.graph_version::int, i.recorded_by, p.interview_state,
        p.interviewed, p.interview_date
     from core.interview i join core.person p on p.id = i.person_id where i.id = $1`,
    [answer.body.id],
  );
  expect(stored).toEqual([
    {
      outcome: "complete",
      channel: "telephone",
      day: today,
      graph_version: before + 1,
      recorded_by: tracer.accountId,
      interview_state: "complete",
      interviewed: "yes",
      interview_date: today,
    },
  ]);

  const exposures = await asAdmin<Record<string, unknown>>(
    app,
    `select e.first_exposure, e.last_exposure, e.setting, e.minutes, e.minutes_missing, e.distance_m,
        e.distance_missing, e.physical, e.indoors, e.relation, e.named_by, pl.name as place,
        e.place_id = c.household_id as at_home, o.classification, o.source, o.assigned_account_id,
        n.phone_last2
     from core.exposure e
     join core.contact_pair cp on cp.id = e.pair_id
     join core.person c on c.id = $2
     join core.person o on o.id = case when cp.person_a = $2 then cp.person_b else cp.person_a end
     join identity.person n on n.person_id = o.id
     left join core.place pl on pl.id = e.place_id
     where e.interview_id = $1 order by n.phone_last2`,
    [answer.body.id, caseId],
  );
  expect(exposures).toHaveLength(12);
  expect(exposures[0]).toEqual({
    first_exposure: shiftDay(today, -5),
    last_exposure: today,
    setting: "household",
    minutes: 15,
    minutes_missing: null,
    distance_m: 1.5,
    distance_missing: null,
    physical: "yes",
    indoors: "yes",
    relation: "colleague",
    named_by: caseId,
    place: null,
    at_home: true,
    classification: "contact",
    source: "interview",
    assigned_account_id: null,
    phone_last2: "00",
  });
  expect(exposures[1]).toMatchObject({ last_exposure: "unknown", place: "Cannery 1" });
  expect(exposures[2]).toMatchObject({ minutes: null, minutes_missing: "refused" });
  expect(exposures[3]).toMatchObject({ distance_m: null, distance_missing: "unknown" });
  expect(exposures[4]).toMatchObject({ indoors: "unknown", place: "Cannery 1" });

  const changes = await asAdmin<{ kind: string; count: number }>(
    app,
    `select kind, count(*)::int as count from core.graph_change
     where investigation_id = $1 and graph_version = $2 group by kind order by kind`,
    [investigationId, before + 1],
  );
  expect(changes).toEqual([
    { kind: "exposure", count: 12 },
    { kind: "interview", count: 1 },
    { kind: "pair", count: 12 },
    { kind: "person", count: 12 },
  ]);

  const events = await eventsNamed(app, investigationId, "interview.submitted");
  expect(events).toHaveLength(1);
  expect(events[0]).toMatchObject({
    account_id: tracer.accountId,
    role: "tracer",
    counts: { contacts: 12, newPeople: 12, groupExposures: 0 },
  });
  expect(events[0]?.person_ids).toHaveLength(13);
  expect(events[0]?.fields).toEqual(expect.arrayContaining(["contacts.phone", "contacts.setting"]));
  expect(JSON.stringify(events)).not.toMatch(/Twelve|7946|Cannery/);
});

test("the interviewer and the supervisor find the contacts afterwards", async () => {
  const caseId = await register(tracer);
  await submit(tracer, caseId, {
    contacts: [contactRow({ name: "Findable Nowicka", phone: "020 7946 0999" })],
  });
  for (const member of [tracer, supervisor]) {
    const page = await member.client.get(`${member.base}/people/${caseId}`);
    expect(page.status).toBe(200);
    expect(page.body.pairs).toHaveLength(1);
    expect(page.body.pairs[0]).toMatchObject({ name: "Findable Nowicka" });
    expect(page.body.attempts).toMatchObject([{ outcome: "complete" }]);
  }
});

test("the same key stores one interview, another key a second", async () => {
  const caseId = await register(tracer);
  const body = { contacts: [contactRow({ name: "Replayed Contact" })] };
  const key = randomUUID();
  const people = await countRows(app, "person", investigationId);
  const first = await submit(tracer, caseId, body, key);
  const again = await submit(tracer, caseId, body, key);
  expect([first.status, again.status]).toEqual([201, 201]);
  expect(again.body).toEqual(first.body);
  expect(await countRows(app, "person", investigationId)).toBe(people + 1);

  const other = await submit(tracer, caseId, body);
  expect(other.status).toBe(201);
  expect(other.body.id).not.toBe(first.body.id);
  const reused = await submit(tracer, caseId, { outcome: "partial" }, key);
  expect(reused.status).toBe(422);
  expect(reused.body.code).toBe("key_reused");
  const missing = await tracer.client.call("post", `${tracer.base}/interviews`, {
    body: { personId: caseId, outcome: "complete" },
  });
  expect(missing.status).toBe(400);
  expect(missing.body.code).toBe("idempotency_key_required");
});

test("twenty at once with one key store one interview", async () => {
  const caseId = await register(tracer);
  const key = randomUUID();
  const body = { contacts: [contactRow({ name: "Only Once" })] };
  const answers = await Promise.all(
    Array.from({ length: 20 }, () => submit(tracer, caseId, body, key)),
  );
  const done = answers.filter((answer) => answer.status === 201);
  expect(done.length).toBeGreaterThan(0);
  expect(new Set(done.map((answer) => answer.body.id)).size).toBe(1);
  // Whoever did not get the receipt was told to come back, not refused for good.
  for (const answer of answers) {
    if (answer.status !== 201) expect([409, 503]).toContain(answer.status);
  }
  const stored = await asAdmin(app, "select 1 from core.interview where person_id = $1", [caseId]);
  expect(stored).toHaveLength(1);
});

test("interviews of one person at once all count, and their pairs are not doubled", async () => {
  const caseId = await register(tracer);
  const known = await register(tracer, { name: "Met Often", classification: "contact" });
  const answers = await Promise.all(
    ["partial", "complete", "attempted", "partial"].map((outcome) =>
      submit(tracer, caseId, { outcome, contacts: [contactRow({ personId: known })] }),
    ),
  );
  expect(answers.map((answer) => answer.status)).toEqual([201, 201, 201, 201]);
  expect(new Set(answers.map((answer) => answer.body.graphVersion)).size).toBe(4);
  const state = await asAdmin(
    app,
    `select p.interview_state, p.interviewed,
       (select count(*)::int from core.contact_pair where p.id in (person_a, person_b)) as pairs,
       (select count(*)::int from core.exposure where named_by = p.id) as tellings
     from core.person p where p.id = $1`,
    [caseId],
  );
  expect(state).toEqual([
    { interview_state: "complete", interviewed: "yes", pairs: 1, tellings: 4 },
  ]);
});

test("a person on record makes a pair, never a second person", async () => {
  const caseId = await register(tracer);
  const known = await register(tracer, { name: "Known Already", classification: null });
  const people = await countRows(app, "person", investigationId);
  const answer = await submit(tracer, caseId, {
    contacts: [
      contactRow({ personId: known.toUpperCase(), name: "Known Already", setting: "school" }),
      contactRow({ personId: known, name: null, setting: "transport" }),
      contactRow({ name: "Twice  TOLD", phone: "+44 20 7946 0321", setting: "school" }),
      contactRow({ name: "twice told", phone: "020 7946 0321", setting: "transport" }),
    ],
  });
  expect(answer.status).toBe(201);
  // One new person for the two rows that agree in name and number.
  expect(await countRows(app, "person", investigationId)).toBe(people + 1);
  const pairs = await asAdmin<{ tellings: number }>(
    app,
    `select count(*)::int as tellings from core.exposure where interview_id = $1 group by pair_id`,
    [answer.body.id],
  );
  expect(pairs).toEqual([{ tellings: 2 }, { tellings: 2 }]);
  const history = await asAdmin(
    app,
    `select p.classification, c.classification as told, p.version from core.person p
     join core.classification c on c.person_id = p.id where p.id = $1`,
    [known],
  );
  expect(history).toEqual([{ classification: "contact", told: "contact", version: 2 }]);
});

test("a contact who is a case already stays one", async () => {
  const first = await register(tracer, { classification: "probable" });
  const second = await register(tracer, { classification: "confirmed" });
  const answer = await submit(tracer, first, { contacts: [contactRow({ personId: second })] });
  expect(answer.status).toBe(201);
  const rows = await asAdmin(app, "select classification from core.person where id = $1", [second]);
  expect(rows).toEqual([{ classification: "confirmed" }]);
});

test("group exposures make no people and no pairs", async () => {
  const caseId = await register(tracer);
  const before = [
    await countRows(app, "person", investigationId),
    await countRows(app, "contact_pair", investigationId),
  ];
  const answer = await submit(tracer, caseId, {
    groupExposures: [
      {
        setting: "transport",
        place: "Bus 7",
        firstExposure: today,
        lastExposure: today,
        countMin: 10,
        countMax: 14,
      },
      { setting: "social", place: null, countMin: null, countMax: null },
    ],
  });
  expect(answer.status).toBe(201);
  expect([
    await countRows(app, "person", investigationId),
    await countRows(app, "contact_pair", investigationId),
  ]).toEqual(before);
  const rows = await asAdmin(
    app,
    `select g.count_min, g.count_max, pl.name as place from core.group_exposure g
     left join core.place pl on pl.id = g.place_id where g.interview_id = $1 order by g.count_min`,
    [answer.body.id],
  );
  expect(rows).toEqual([
    { count_min: 10, count_max: 14, place: "Bus 7" },
    { count_min: null, count_max: null, place: null },
  ]);
});

test("attempts show the latest until somebody is reached; the best interview then stands", async () => {
  const caseId = await register(tracer);
  const stateOf = async () =>
    (
      await asAdmin<{ interview_state: string; interviewed: string; interview_date: string }>(
        app,
        "select interview_state, interviewed, interview_date from core.person where id = $1",
        [caseId],
      )
    )[0];
  const ago = (minutes: number) => new Date(now().getTime() - minutes * 60_000).toISOString();
  await submit(tracer, caseId, { outcome: "attempted", heldAt: ago(60) });
  await submit(tracer, caseId, { outcome: "unreachable", heldAt: ago(50) });
  expect(await stateOf()).toEqual({
    interview_state: "unreachable",
    interviewed: null,
    interview_date: null,
  });
  // Told of late: an earlier attempt does not hide a later one.
  await submit(tracer, caseId, { outcome: "refused", heldAt: ago(90) });
  expect((await stateOf())?.interview_state).toBe("unreachable");
  await submit(tracer, caseId, { outcome: "partial", heldAt: ago(40) });
  await submit(tracer, caseId, { outcome: "attempted", heldAt: ago(30) });
  expect((await stateOf())?.interview_state).toBe("partial");
  await submit(tracer, caseId, { outcome: "complete", heldAt: `${shiftDay(today, -2)}T12:00:00Z` });
  await submit(tracer, caseId, { outcome: "complete" });
  expect(await stateOf()).toEqual({
    interview_state: "complete",
    interviewed: "yes",
    interview_date: shiftDay(today, -2),
  });
});

test("a failure late in the transaction leaves neither rows nor events", async () => {
  const caseId = await register(tracer);
  const counted = async () => [
    await countRows(app, "person", investigationId),
    await countRows(app, "interview", investigationId),
    await countRows(app, "contact_pair", investigationId),
    await countRows(app, "graph_change", investigationId),
    (await asAdmin(app, "select 1 from audit.event")).length,
    (await asAdmin(app, "select 1 from auth.idempotency")).length,
  ];
  const before = await counted();
  await asAdmin(
    app,
    "alter table audit.event add constraint refuse_for_test check (action <> 'interview.submitted') not valid",
  );
  const answer = await submit(tracer, caseId, { contacts: [contactRow({ name: "Never Stored" })] });
  await asAdmin(app, "alter table audit.event drop constraint refuse_for_test");
  expect(answer.status).toBeGreaterThanOrEqual(400);
  expect(await counted()).toEqual(before);
  expect(JSON.stringify(answer.body) + app.logs.join("")).not.toContain("Never Stored");
});
