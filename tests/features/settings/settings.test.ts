import { afterAll, beforeAll, describe, expect, it, test } from "vitest";
import {
  DEFAULT_CASE_RULES,
  DEFAULT_EXPOSURE_GRADING,
  DEFAULT_SYMPTOMS,
  settingsAnswer,
} from "../../../shared/contracts/settings.ts";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";
import {
  buildAccount,
  buildInvestigation,
  buildMember,
  type Member,
  PASSWORD,
  signInAs,
  signInEveryone,
} from "../../support/factories.ts";
import { asAdmin, contactRow, eventsNamed, register, submit } from "../../support/field-work.ts";
import { ago } from "../../support/follow-desk.ts";
import { bringIn } from "../../support/imports.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

async function read(member: Member) {
  const answer = await member.client.get(`${member.base}/settings`);
  expect(answer.status).toBe(200);
  return settingsAnswer.parse(answer.body);
}

function patch(member: Member, body: Record<string, unknown>) {
  return member.client.call("patch", `${member.base}/settings`, { body });
}

async function changed(member: Member, body: Record<string, unknown>) {
  const { version } = await read(member);
  const answer = await patch(member, { version, ...body });
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return settingsAnswer.parse(answer.body);
}

const lister = (member: Member, list: string) =>
  member.client.get(`${member.base}/settings/${list}`);

test("what was never set has the defaults, and every role reads it", async () => {
  const id = await buildInvestigation(app, { caseDefinition: "Fever and rash." });
  for (const member of Object.values(await signInEveryone(app, id))) {
    expect(await read(member)).toMatchObject({
      caseDefinition: "Fever and rash.",
      caseRules: DEFAULT_CASE_RULES,
      exposureGrading: DEFAULT_EXPOSURE_GRADING,
      symptoms: DEFAULT_SYMPTOMS,
      texts: [],
      closureDays: null,
      closureDaysInForce: 28,
      lostAfterDays: 3,
      smallCellThreshold: 5,
      practice: false,
      caseDefinitionVersion: 1,
      version: 1,
    });
  }
});

describe("each setting", () => {
  const values: [string, unknown][] = [
    ["name", "Another name"],
    ["invented", false],
    ["timeZone", "Pacific/Auckland"],
    ["countryCode", "NZ"],
    ["populationAtRisk", 4000],
    ["caseDefinition", "Fever."],
    [
      "caseRules",
      { ...DEFAULT_CASE_RULES, suspected: { laboratory: false, clinical: false, link: true } },
    ],
    ["incubationMin", 3],
    ["incubationMax", 12],
    ["infectiousBefore", 4],
    ["infectiousAfter", 9],
    ["monitoringDays", 21],
    ["clusterWindowDays", 7],
    ["clusterMinimumCases", 3],
    ["closureDays", 30],
    ["lostAfterDays", 5],
    ["smallCellThreshold", 11],
    [
      "exposureGrading",
      { ...DEFAULT_EXPOSURE_GRADING, highSettings: ["household", "school"], highMinutes: 10 },
    ],
    [
      "symptoms",
      [
        { code: "fever", label: "Hot" },
        { code: "shivers", label: "Shivers" },
      ],
    ],
    [
      "texts",
      [
        { kind: "advice", language: "en", text: "Rest." },
        { kind: "consent", language: "pt-BR", text: "De acordo?" },
      ],
    ],
  ];

  it.each(values)("%s is changed, kept, and in the history", async (setting, value) => {
    const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
    const before = await read(supervisor);
    const after = await changed(supervisor, { [setting]: value });
    expect(after).toMatchObject({ [setting]: value, version: 2 });
    expect(await read(supervisor)).toEqual(after);
    const { body } = await lister(supervisor, "changes");
    expect(body.items).toHaveLength(1);
    expect(body.items[0]).toMatchObject({
      version: 2,
      changes: [{ setting, from: before[setting as keyof typeof before], to: value }],
    });
    expect(body.items[0].by).toMatch(/^Account/);
    const events = await eventsNamed(app, supervisor.investigationId, "investigation.changed");
    expect(events.map((one) => one.fields)).toEqual([[setting]]);
  });

  it("covers every one there is", async () => {
    const { practice, caseDefinitionVersion, closureDaysInForce, today, version, ...rest } =
      settingsAnswer.shape;
    expect(values.map(([key]) => key).sort()).toEqual(Object.keys(rest).sort());
  });
});

test("a value that stays is no change; several at once are one, the newest first", async () => {
  const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
  const same = await changed(supervisor, { infectiousBefore: 2, symptoms: DEFAULT_SYMPTOMS });
  expect(same.version).toBe(1);
  await changed(supervisor, { infectiousBefore: 2, monitoringDays: 10, lostAfterDays: 4 });
  await changed(supervisor, { closureDays: 20 });
  const { body } = await lister(supervisor, "changes");
  expect(body).toMatchObject({ total: 2, page: 1 });
  const settings = body.items.map((one: { changes: { setting: string }[] }) =>
    one.changes.map(({ setting }) => setting),
  );
  expect(settings).toEqual([["closureDays"], ["monitoringDays", "lostAfterDays"]]);
});

test("whoever changes the same version second is told so, and nothing is lost or kept", async () => {
  const id = await buildInvestigation(app);
  const [one, two] = [await signInAs(app, "supervisor", id), await signInAs(app, "officer", id)];
  const answers = await Promise.all([
    patch(one, { version: 1, monitoringDays: 10 }),
    patch(two, { version: 1, monitoringDays: 11 }),
  ]);
  expect(answers.map((answer) => answer.status).sort()).toEqual([200, 409]);
  expect(answers.find((answer) => answer.status === 409)?.body.code).toBe("stale_version");
  const stale = await patch(two, { version: 1, monitoringDays: 2 });
  expect(stale.body.code).toBe("stale_version");
  expect((await lister(one, "changes")).body.total).toBe(1);
  const preview = await two.client.post(`${two.base}/settings/preview`, {
    version: 1,
    monitoringDays: 2,
  });
  expect(preview.body.code).toBe("stale_version");
});

test.each([
  [
    "the longest below the shortest",
    { incubationMax: 1, incubationMin: 2 },
    "incubationMax",
    "max_below_min",
  ],
  [
    "the shortest above the longest on record",
    { incubationMin: 15 },
    "incubationMin",
    "max_below_min",
  ],
  ["a zone that is none", { timeZone: "Mars/Olympus" }, "timeZone", "not_a_zone"],
  ["an offset in place of a zone", { timeZone: "+05:30" }, "timeZone", "not_a_zone"],
  ["a number left blank", { monitoringDays: null }, "monitoringDays", "required"],
  ["a country that has no telephone numbers", { countryCode: "ZZ" }, "countryCode", "not_in_list"],
  ["a threshold below the floor", { smallCellThreshold: 4 }, "smallCellThreshold", "too_small"],
  [
    "a symptom twice",
    {
      symptoms: [
        { code: "a", label: "A" },
        { code: "a", label: "B" },
      ],
    },
    "symptoms",
    "repeated",
  ],
  ["no symptom at all", { symptoms: [] }, "symptoms", "required"],
  [
    "a code with a space",
    { symptoms: [{ code: "a b", label: "A" }] },
    "symptoms.0.code",
    "invalid",
  ],
  [
    "a grading without minutes",
    { exposureGrading: { ...DEFAULT_EXPOSURE_GRADING, highMinutes: 0 } },
    "exposureGrading.highMinutes",
    "too_small",
  ],
  [
    "a text without words",
    { texts: [{ kind: "advice", language: "en", text: " " }] },
    "texts.0.text",
    "required",
  ],
  ["a key of somebody else's", { graphVersion: 4 }, "", "unknown_key"],
  ["practice", { practice: true }, "", "unknown_key"],
])("%s is refused beside its field, also by the preview", async (_title, body, path, code) => {
  const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
  const asked = { version: 1, ...body };
  const refused = await patch(supervisor, asked);
  const preview = await supervisor.client.post(`${supervisor.base}/settings/preview`, asked);
  for (const answer of [refused, preview]) {
    expect(answer.status).toBe(422);
    expect(answer.body.errors).toEqual([{ path, code }]);
  }
  expect((await read(supervisor)).version).toBe(1);
});

test("tracers and epidemiologists change nothing; what they see of the history differs", async () => {
  const id = await buildInvestigation(app);
  const everyone = await signInEveryone(app, id);
  await changed(everyone.officer, { lostAfterDays: 4 });
  for (const role of ["tracer", "epidemiologist"] as const) {
    const one = everyone[role];
    expect((await patch(one, { version: 2, lostAfterDays: 2 })).status).toBe(403);
    const preview = await one.client.post(`${one.base}/settings/preview`, { version: 2 });
    expect(preview.status).toBe(403);
  }
  expect((await lister(everyone.tracer, "changes")).status).toBe(403);
  expect((await lister(everyone.epidemiologist, "changes")).body.items[0]).toMatchObject({
    by: null,
    changes: [{ setting: "lostAfterDays", from: 3, to: 4 }],
  });
  expect((await lister(everyone.supervisor, "changes")).body.items[0].by).toMatch(/^Account/);
  for (const one of Object.values(everyone)) {
    expect((await lister(one, "case-definitions")).body.total).toBe(1);
  }
});

test("an investigation with accounts of the demo stays marked invented", async () => {
  const id = await buildInvestigation(app);
  const account = await buildAccount(app, { demo: true });
  const memberId = await buildMember(app, id, account.id, "officer");
  const client = new TestClient(app);
  await client.signIn(account.email, PASSWORD);
  const body = { version: 1, invented: false };
  const path = `/api/investigations/${id}/settings`;
  const own = await client.call("patch", path, { body });
  expect(own.body.errors).toEqual([{ path: "invented", code: "demo_only" }]);
  const supervisor = await signInAs(app, "supervisor", id);
  expect((await patch(supervisor, body)).body.errors[0].code).toBe("demo_only");
  await asAdmin(app, "update core.member set ended_at = now() where id = $1", [memberId]);
  expect((await patch(supervisor, body)).body.invented).toBe(false);
});

test("the older address goes through the same command, so the history is whole", async () => {
  const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
  const answer = await supervisor.client.call("patch", supervisor.base, {
    body: { version: 1, name: "Renamed", infectiousAfter: 10 },
  });
  expect(answer.body).toMatchObject({ name: "Renamed", version: 2, practice: false });
  expect((await lister(supervisor, "changes")).body.items[0].changes).toEqual([
    { setting: "name", from: "Test investigation", to: "Renamed" },
  ]);
});

test("open pages are told", async () => {
  const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
  const heard: string[] = [];
  const leave = app.services.hub.subscribe(supervisor.investigationId, {
    tell: (message) => heard.push(message.topic),
    end: () => {},
  });
  await changed(supervisor, { lostAfterDays: 4 });
  await expect.poll(() => heard).toEqual(["settings"]);
  leave();
});

test("groups count their growth from the start of today in the zone that is set", async () => {
  const supervisor = await signInAs(app, "supervisor", await buildInvestigation(app));
  const since = async () =>
    (await supervisor.client.get(`${supervisor.base}/groups`)).body.since as string;
  expect(await since()).toMatch(/T00:00:00/);
  await changed(supervisor, { timeZone: "Asia/Kathmandu" });
  // Five hours and three quarters east of Greenwich.
  await expect.poll(since).toMatch(/T18:15:00/);
});

describe("the case definition", () => {
  it("gets a new version with its wording or its rules, and the old ones stay", async () => {
    const id = await buildInvestigation(app, { caseDefinition: "First." });
    const officer = await signInAs(app, "officer", id);
    await changed(officer, { caseDefinition: "Second." });
    const rules = {
      ...DEFAULT_CASE_RULES,
      probable: { laboratory: false, clinical: false, link: true },
    };
    const after = await changed(officer, { caseRules: rules });
    expect(after.caseDefinitionVersion).toBe(3);
    await changed(officer, { lostAfterDays: 9 });
    const { body } = await lister(officer, "case-definitions");
    expect(body.items).toEqual([
      { number: 3, wording: "Second.", rules, recordedAt: expect.any(String) },
      { number: 2, wording: "Second.", rules: DEFAULT_CASE_RULES, recordedAt: expect.any(String) },
      { number: 1, wording: "First.", rules: DEFAULT_CASE_RULES, recordedAt: expect.any(String) },
    ]);
  });

  it("is named by every classification made under it, and by no earlier one anew", async () => {
    const id = await buildInvestigation(app);
    const supervisor = await signInAs(app, "supervisor", id);
    const early = await register(supervisor, { name: "Early Case", onsetDate: ago(4) });
    await changed(supervisor, { caseDefinition: "Second." });

    const registered = await register(supervisor, { name: "Late Case" });
    const told = await submit(supervisor, registered, {
      contacts: [contactRow({ name: "Named Contact", lastExposure: ago(1) })],
    });
    expect(told.status).toBe(201);
    await bringIn(supervisor, "people", "ref,name,classification\nr1,File Person,suspected\n");
    const rows = () =>
      asAdmin<{ person_id: string; classification: string; v: number; now: number }>(
        app,
        `select c.person_id, c.classification, c.case_definition_version as v,
           p.case_definition_version as now
         from core.classification c join core.person p on p.id = c.person_id
         where c.investigation_id = $1 order by c.recorded_at, c.id`,
        [id],
      );
    expect((await rows()).map((row) => [row.classification, row.v])).toEqual([
      ["confirmed", 1],
      ["confirmed", 2],
      ["contact", 2],
      ["suspected", 2],
    ]);

    // A contact becomes a case under the third.
    await changed(supervisor, { caseDefinition: "Third." });
    const contact = (await rows()).find((row) => row.classification === "contact")?.person_id;
    const path = `${supervisor.base}/people/${contact}`;
    const { version } = (await supervisor.client.get(path)).body;
    const body = { version, classification: "probable" };
    expect((await supervisor.client.call("patch", path, { body })).status).toBe(200);
    expect((await rows()).at(-1)).toMatchObject({ classification: "probable", v: 3, now: 3 });
    expect((await rows()).find((row) => row.person_id === early)).toMatchObject({ v: 1, now: 1 });
  });
});

test("a symptom that leaves the list stays in the checks that tell of it", async () => {
  const id = await buildInvestigation(app);
  const supervisor = await signInAs(app, "supervisor", id);
  const source = await register(supervisor);
  await submit(supervisor, source, { contacts: [contactRow({ lastExposure: ago(1) })] });
  const [contact] = await asAdmin<{ id: string }>(
    app,
    "select id from core.person where investigation_id = $1 and classification = 'contact'",
    [id],
  );
  const checks = `${supervisor.base}/follow-up/${contact?.id}/checks`;
  const check = { outcome: "seen", symptoms: "yes", symptomCodes: ["rash"] };
  expect((await supervisor.client.post(checks, check)).status).toBe(201);
  const symptoms = DEFAULT_SYMPTOMS.filter((one) => one.code !== "rash");
  const preview = await supervisor.client.post(`${supervisor.base}/settings/preview`, {
    version: 1,
    symptoms,
  });
  expect(preview.body.moves).toEqual([
    { setting: "symptoms", measure: "checks_with_removed_symptoms", before: 0, after: 1 },
  ]);
  await changed(supervisor, { symptoms });
  expect((await supervisor.client.get(checks)).body.items[0].symptomCodes).toEqual(["rash"]);
});
