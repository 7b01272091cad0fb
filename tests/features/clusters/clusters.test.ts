import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { clusterList } from "../../../shared/contracts/clusters.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, register, submit } from "../../support/field-work.ts";
import { ago, today } from "../../support/follow-desk.ts";

let app: TestApp;
let id: string;
let supervisor: Member;
let epidemiologist: Member;
/** Ids of the cases of this file by their names. */
const cases: Record<string, string> = {};

beforeAll(async () => {
  app = await startTestApp();
  id = await buildInvestigation(app, { timeZone: "UTC" });
  supervisor = await signInAs(app, "supervisor", id);
  epidemiologist = await signInAs(app, "epidemiologist", id);
});

afterAll(async () => {
  await app?.close();
});

async function aCase(name: string, fields: Record<string, unknown> = {}): Promise<string> {
  const made = await register(supervisor, { name: `${name} Zqcluster`, ...fields });
  cases[name] = made;
  return made;
}

async function tell(name: string, fields: Record<string, unknown>) {
  const answer = await submit(supervisor, cases[name] ?? "", fields);
  expect(answer.status).toBe(201);
}

async function ask(query: Record<string, string> = {}) {
  const answer = await epidemiologist.client.get(`${epidemiologist.base}/clusters`, query);
  expect(answer.status).toBe(200);
  return clusterList.parse(answer.body);
}

/** The answer on the record as it is now: the last one is given while the next is worked out. */
async function clusters(query: Record<string, string> = {}) {
  for (let tries = 0; tries < 100; tries++) {
    const list = await ask(query);
    if (!list.updating) return list;
    await new Promise((done) => setTimeout(done, 20));
  }
  throw new Error("the proposed clusters did not follow");
}

async function studyNumbers(...names: string[]): Promise<string[]> {
  const rows = await asAdmin<{ id: string; study_number: string }>(
    app,
    "select id, study_number from core.person where investigation_id = $1",
    [id],
  );
  return names.map((name) => rows.find((row) => row.id === cases[name])?.study_number ?? "");
}

async function change(name: string, fields: Record<string, unknown>) {
  const path = `${supervisor.base}/people/${cases[name]}`;
  const { version } = (await supervisor.client.get(path)).body;
  const answer = await supervisor.client.call("patch", path, {
    body: { version, ...fields },
  });
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
}

describe("GET clusters", () => {
  it("is empty at first, and says what it was computed with", async () => {
    expect(await clusters()).toEqual({
      items: [],
      total: 0,
      page: 1,
      pageSize: 50,
      graphVersion: expect.any(Number),
      updating: false,
      today,
      windowDays: 14,
      minimumCases: 2,
      withoutReferenceDay: 0,
    });
  });

  it("joins two cases that met, when their reference days are near", async () => {
    await aCase("Ada", { onsetDate: ago(20) });
    const bea = await aCase("Bea", { onsetDate: ago(3) });
    await tell("Ada", { contacts: [contactRow({ name: null, personId: bea })] });
    expect((await clusters()).total).toBe(0);
    // The date of a case is no change of the graph; the list follows all the same.
    await change("Bea", { onsetDate: ago(6) });
    const { items } = await clusters();
    expect(items).toEqual([
      {
        number: 1,
        kind: "contact_only",
        cases: 2,
        firstDay: ago(20),
        lastDay: ago(6),
        onsets: [
          { day: ago(20), count: 1, basis: "onset" },
          { day: ago(6), count: 1, basis: "onset" },
        ],
        newInLast7Days: 1,
        places: 0,
        members: await studyNumbers("Ada", "Bea"),
      },
    ]);
  });

  it("joins through a place on overlapping days, told of contacts or of groups", async () => {
    const days = { place: "Zqplace Hall", firstExposure: ago(15), lastExposure: ago(12) };
    await aCase("Cyd", { onsetDate: ago(9) });
    await aCase("Dot", { onsetDate: "unknown" });
    await aCase("Eve", { onsetDate: ago(8), classification: "probable" });
    await aCase("Fay", { onsetDate: ago(8) });
    await tell("Cyd", { contacts: [contactRow({ name: "Some Friend", ...days })] });
    await tell("Dot", { contacts: [contactRow({ name: "Another Friend", ...days })] });
    await tell("Eve", {
      groupExposures: [
        { setting: "social", ...days, firstExposure: ago(12), lastExposure: ago(10) },
      ],
    });
    // Same kind of place on the same days, but another place; and the place on other days.
    await tell("Fay", {
      contacts: [
        contactRow({ name: "Third Friend", ...days, place: "Elsewhere" }),
        contactRow({ name: "Fourth Friend", ...days, firstExposure: ago(9), lastExposure: ago(9) }),
      ],
    });
    let list = await clusters();
    expect(list.withoutReferenceDay).toBe(1);
    expect(list.items[1]).toMatchObject({ kind: "social", cases: 2, places: 1 });
    expect(list.items[1]?.members).toEqual(await studyNumbers("Cyd", "Eve"));

    // A specimen day stands for an onset that is not known.
    const test = await supervisor.client.post(
      `${supervisor.base}/people/${cases.Dot}/tests`,
      { specimenDate: ago(5), kind: "PCR", result: "positive" },
      true,
    );
    expect(test.status).toBe(201);
    list = await clusters();
    expect(list.withoutReferenceDay).toBe(0);
    expect(list.items[0]).toMatchObject({ number: 1, cases: 3, newInLast7Days: 1, places: 1 });
    expect(list.items[0]?.members).toEqual(await studyNumbers("Cyd", "Eve", "Dot"));
    expect(list.items[0]?.onsets.at(-1)).toEqual({ day: ago(5), count: 1, basis: "specimen" });
  });

  it("counts confirmed and probable cases only", async () => {
    await change("Eve", { classification: "suspected" });
    expect((await clusters()).items.map((one) => one.cases)).toEqual([2, 2]);
    await change("Eve", { classification: "probable" });
    expect((await clusters()).items.map((one) => one.cases)).toEqual([3, 2]);
  });

  it("sorts, pages, and finds the cluster of a study number", async () => {
    const numbers = (list: Awaited<ReturnType<typeof clusters>>) =>
      list.items.map(({ number }) => number);
    expect(numbers(await clusters({ sort: "cases" }))).toEqual([2, 1]);
    expect(numbers(await clusters({ sort: "firstDay" }))).toEqual([2, 1]);
    const second = await clusters({ page: "2", pageSize: "1" });
    expect(second).toMatchObject({ total: 2, page: 2, pageSize: 1, items: [{ number: 2 }] });
    const [ada] = await studyNumbers("Ada");
    expect(numbers(await clusters({ q: (ada ?? "").toLowerCase() }))).toEqual([2]);
    const refused = await epidemiologist.client.get(`${epidemiologist.base}/clusters`, {
      sort: "kind",
    });
    expect(refused.status).toBe(422);
    expect(refused.body.errors).toEqual([{ path: "sort", code: "not_sortable" }]);
  });

  it("no longer joins what was taken back", async () => {
    await asAdmin(
      app,
      `update core.exposure e set withdrawn_at = now() from core.contact_pair p
       where p.id = e.pair_id and $1 in (p.person_a, p.person_b) and $2 in (p.person_a, p.person_b)`,
      [cases.Ada, cases.Bea],
    );
    await asAdmin(
      app,
      "update core.investigation set graph_version = graph_version + 1 where id = $1",
      [id],
    );
    expect((await clusters()).items.map((one) => one.cases)).toEqual([3]);
  });

  it("gives the last answer with its version while the next is worked out, then the next", async () => {
    const before = await clusters();
    // The background login has to wait for the table, a request's own reads do not touch it.
    const lock = new pg.Client({ connectionString: app.adminUrl });
    await lock.connect();
    await lock.query("begin");
    await lock.query("lock table core.group_exposure in access exclusive mode");
    try {
      await asAdmin(
        app,
        "update core.investigation set graph_version = graph_version + 1 where id = $1",
        [id],
      );
      const meanwhile = await ask();
      expect(meanwhile).toEqual({ ...before, updating: true });
      expect((await ask()).updating).toBe(true);
    } finally {
      await lock.query("rollback");
      await lock.end();
    }
    const after = await clusters();
    expect(after.graphVersion).toBeGreaterThan(before.graphVersion);
    expect(after.updating).toBe(false);
  });

  it("is worked out anew for other settings, however old the last answer", async () => {
    await asAdmin(app, "update core.investigation set cluster_minimum_cases = 4 where id = $1", [
      id,
    ]);
    expect(await ask()).toMatchObject({ total: 0, minimumCases: 4, updating: false });
    await asAdmin(app, "update core.investigation set cluster_minimum_cases = 2 where id = $1", [
      id,
    ]);
    expect(await ask()).toMatchObject({ total: 1, minimumCases: 2, updating: false });
  });

  it("carries no name, and is for supervisors and epidemiologists", async () => {
    const seen = await supervisor.client.get(`${supervisor.base}/clusters`);
    expect(seen.status).toBe(200);
    expect(seen.text).not.toMatch(/Zqcluster|Friend|Zqplace|Hall/);
    for (const personId of Object.values(cases)) expect(seen.text).not.toContain(personId);
    for (const role of ["tracer", "officer"] as const) {
      const other = await signInAs(app, role, id);
      expect((await other.client.get(`${other.base}/clusters`)).status).toBe(403);
    }
    const elsewhere = await buildInvestigation(app);
    const path = `/api/investigations/${elsewhere}/clusters`;
    expect((await supervisor.client.get(path)).status).toBe(404);
  });
});
