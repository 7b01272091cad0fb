import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { bringIn, commit, problemLines, stage } from "../../support/imports.ts";

let app: TestApp;
let admin: pg.Client;
let supervisor: Member;
let officer: Member;
let id: string;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
  id = await buildInvestigation(app);
  supervisor = await signInAs(app, "supervisor", id);
  officer = await signInAs(app, "officer", id);
});

afterAll(async () => {
  await admin.end();
  await app.close();
});

async function count(table: string): Promise<number> {
  const found = await admin.query(
    `select count(*)::int as n from ${table} where investigation_id = $1`,
    [id],
  );
  return found.rows[0].n;
}

/** The person a reference names, as the supervisor's line list shows them. */
async function personNamed(name: string): Promise<Record<string, unknown>> {
  const answer = await supervisor.client.call("post", `${supervisor.base}/people/search`, {
    body: { q: name },
  });
  expect(answer.status).toBe(200);
  expect(answer.body.total).toBe(1);
  const page = await supervisor.client.get(`${supervisor.base}/people/${answer.body.items[0].id}`);
  expect(page.status).toBe(200);
  return page.body;
}

describe("a people file", () => {
  const FULL =
    "ref,name,phone,email,birth_date,sex,address,area,occupation,household,classification,onset_date,specimen_date,result_date,result,report_date,interview_date,interviewed,isolation_date,died_date\n" +
    'T-1,Orla Venning,+44 7700 900111,Orla@Example.org,1980-05,female,"1 Mill Lane,\nrear",North,baker,Venning,confirmed,2026-01-04,2026-01-05,2026-01-06,positive,2026-01-06,2026-01-07,yes,2026-01-06,2026-02-01\n' +
    "T-2,Bram Venning,refused,unknown,,male,,North,,venning ,contact,unknown,,,,,,no,,\n";

  it("is staged without touching the record", async () => {
    const staged = await stage(supervisor, "people", FULL);
    expect(staged).toMatchObject({
      kind: "people",
      state: "ready",
      rows: 2,
      counts: { good: 2, bad: 0, new: 2, known: 0, conflicts: 0 },
      problems: [],
      problemCount: 0,
    });
    expect(await count("core.person")).toBe(0);
    expect(await count("identity.import_stage")).toBe(1);
    const events = await admin.query(
      "select counts from audit.event where action = 'import.staged'",
    );
    expect(events.rows).toHaveLength(1);
    expect(events.rows[0].counts).toMatchObject({ rows: 2, good: 2 });
  });

  it("is committed in one go, every column in its place", async () => {
    const before = (await supervisor.client.get(supervisor.base)).body.graphVersion;
    const { id: importId } = await stage(supervisor, "people", FULL);
    const done = await commit(supervisor, importId);
    expect(done).toMatchObject({
      state: "committed",
      progress: 1,
      counts: { addedPeople: 2, addedTests: 1, addedInterviews: 1, addedPlaces: 1, skipped: 0 },
    });
    expect(await personNamed("Orla Venning")).toMatchObject({
      ref: "T-1",
      name: "Orla Venning",
      phone: "+44 7700 900111",
      email: "orla@example.org",
      birthDate: "1980-05",
      ageBand: "45-64",
      sex: "female",
      address: "1 Mill Lane,\nrear",
      area: "North",
      occupation: "baker",
      household: "Venning",
      classification: "confirmed",
      onsetDate: "2026-01-04",
      specimenDate: "2026-01-05",
      resultDate: "2026-01-06",
      result: "positive",
      reportDate: "2026-01-06",
      interviewDate: "2026-01-07",
      interviewed: "yes",
      interviewState: "complete",
      isolationDate: "2026-01-06",
      outcome: "died",
      outcomeDate: "2026-02-01",
    });
    const bram = await personNamed("Bram Venning");
    expect(bram).toMatchObject({
      phone: "refused",
      email: "unknown",
      birthDate: null,
      onsetDate: "unknown",
      reportDate: null,
      interviewed: "no",
      interviewState: null,
      outcome: null,
      classification: "contact",
    });
    // Spelled with another case and a space, still one household.
    const orla = await personNamed("Orla Venning");
    expect(bram.householdNumber).toBe(orla.householdNumber);
    const identity = await admin.query(
      "select birth_year, phone_last2, name_masked from identity.person order by birth_year nulls last",
    );
    expect(identity.rows).toEqual([
      { birth_year: 1980, phone_last2: "11", name_masked: "O. V." },
      { birth_year: null, phone_last2: null, name_masked: "B. V." },
    ]);
    const interviews = await admin.query(
      "select day, source, outcome from core.interview where investigation_id = $1",
      [id],
    );
    expect(interviews.rows).toEqual([{ day: "2026-01-07", source: "import", outcome: "complete" }]);
    expect(await count("core.classification")).toBe(2);
    const changes = await admin.query(
      "select kind from core.graph_change where investigation_id = $1",
      [id],
    );
    expect(changes.rows).toEqual([{ kind: "bulk" }]);
    expect((await supervisor.client.get(supervisor.base)).body.graphVersion).toBe(before + 1);
    expect(await count("identity.import_stage")).toBe(0);
    const events = await admin.query(
      "select role, counts from audit.event where action = 'import.committed'",
    );
    expect(events.rows).toHaveLength(1);
    expect(events.rows[0]).toMatchObject({ role: "supervisor", counts: { addedPeople: 2 } });
  });

  it("adds nothing the second time, whoever brings it and whatever it is called", async () => {
    const people = await count("core.person");
    const again = await stage(officer, "people", FULL, "../../x.csv");
    expect(again.state).toBe("committed");
    const done = await commit(officer, again.id);
    expect(done.state).toBe("committed");
    expect(done.id).toBe(again.id);
    expect(await count("core.person")).toBe(people);
    expect((await supervisor.client.get(`${supervisor.base}/imports`)).body.total).toBe(1);
    const changes = await count("core.graph_change");
    // Other bytes with the same rows: compared, nothing to fill, no new graph version.
    const same = await bringIn(officer, "people", `${FULL}\n`);
    expect(same.counts).toMatchObject({ addedPeople: 0, filledPeople: 0, conflicts: 0 });
    expect(await count("core.person")).toBe(people);
    expect(await count("core.test_result")).toBe(1);
    expect(await count("core.interview")).toBe(1);
    expect(await count("core.graph_change")).toBe(changes);
  });

  it("fills blanks of a known reference and lists what differs", async () => {
    const text =
      "ref,name,phone,birth_date,occupation,household,classification,onset_date,specimen_date,result,interviewed,interview_date,died_date\n" +
      "T-1,Orla Venning,07700 900111,1980-06,miller,Elsewhere,confirmed,2026-01-04,2026-01-05,negative,yes,2026-01-07,2026-02-01\n" +
      " T-2 ,Bram Venning,,1990-02-03,porter,Venning,confirmed,2026-01-09,2026-01-10,inconclusive,yes,,\n";
    const staged = await stage(supervisor, "people", text);
    const conflicts = [
      "2 birth_date conflict",
      "2 occupation conflict",
      "2 household conflict",
      "2 result conflict",
      "3 classification conflict",
      "3 onset_date conflict",
      "3 interviewed conflict",
    ];
    expect(problemLines(staged)).toEqual(conflicts);
    expect(staged.counts).toMatchObject({ good: 2, new: 0, known: 2, filled: 1, conflicts: 7 });
    const done = await commit(supervisor, staged.id);
    expect(problemLines(done)).toEqual(conflicts);
    expect(done.counts).toMatchObject({
      addedPeople: 0,
      filledPeople: 1,
      conflicts: 7,
      addedTests: 1,
    });
    const orla = await personNamed("Orla Venning");
    expect(orla).toMatchObject({ birthDate: "1980-05", occupation: "baker", result: "positive" });
    expect(await personNamed("Bram Venning")).toMatchObject({
      birthDate: "1990-02-03",
      ageBand: "25-44",
      occupation: "porter",
      phone: "refused",
      classification: "contact",
      onsetDate: "unknown",
      interviewed: "no",
      specimenDate: "2026-01-10",
      result: "inconclusive",
    });
    expect(await count("core.place")).toBe(1);
  });

  it("lets an officer fill an occupation without hinting at one they may not read", async () => {
    await bringIn(supervisor, "people", "ref,name\nO-1,Una Fell\n");
    const done = await bringIn(officer, "people", "ref,occupation\nT-1,smith\nO-1,smith\n");
    expect(done.problems).toEqual([]);
    expect(done.counts).toMatchObject({ conflicts: 0, filledPeople: 0 });
    expect(await personNamed("Orla Venning")).toMatchObject({ occupation: "baker" });
    expect(await personNamed("Una Fell")).toMatchObject({ occupation: "smith" });
  });

  it("commits the good rows and keeps the list of the others", async () => {
    const people = await count("core.person");
    const text =
      "ref,name,onset_date\nG-1,Good One,2026-01-01\nG-2,Bad One,2026-02-30\nG-1,Twice,\n";
    const staged = await stage(supervisor, "people", text);
    expect(staged.counts).toMatchObject({ good: 1, bad: 2, new: 1 });
    const problems = ["3 onset_date not_a_day", "4 ref duplicate_ref"];
    expect(problemLines(staged)).toEqual(problems);
    const done = await commit(supervisor, staged.id);
    expect(done.counts).toMatchObject({ addedPeople: 1, skipped: 2 });
    expect(problemLines(done)).toEqual(problems);
    expect(await count("core.person")).toBe(people + 1);
  });

  it("keeps a partial and a missing interview day as what they are", async () => {
    await bringIn(
      supervisor,
      "people",
      "ref,interviewed,interview_date\nI-1,yes,2026-01\nI-2,yes,\nI-3,,2026-01-02\n",
    );
    const found = await admin.query(
      `select i.day, p.interview_date from core.interview i join core.person p on p.id = i.person_id
       where i.investigation_id = $1 and i.day <> '2026-01-07' order by i.day`,
      [id],
    );
    expect(found.rows).toEqual([
      { day: "2026-01", interview_date: "2026-01" },
      { day: "unknown", interview_date: null },
    ]);
  });
});
