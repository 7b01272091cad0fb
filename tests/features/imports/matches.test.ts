import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Import, ImportMatchList } from "../../../shared/contracts/imports.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { bringIn, commit, problemLines, stage } from "../../support/imports.ts";

let app: TestApp;
let admin: pg.Client;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
});

afterAll(async () => {
  await admin.end();
  await app.close();
});

async function desk(): Promise<{ id: string; supervisor: Member; officer: Member }> {
  const id = await buildInvestigation(app);
  return {
    id,
    supervisor: await signInAs(app, "supervisor", id),
    officer: await signInAs(app, "officer", id),
  };
}

async function matches(member: Member, importId: string): Promise<ImportMatchList> {
  const answer = await member.client.get(`${member.base}/imports/${importId}/matches`);
  expect(answer.status).toBe(200);
  return answer.body;
}

function decide(member: Member, importId: string, body: object) {
  return member.client.call("post", `${member.base}/imports/${importId}/matches`, { body });
}

async function people(member: Member): Promise<Record<string, unknown>[]> {
  const answer = await member.client.get(`${member.base}/people`, { pageSize: "200" });
  return answer.body.items;
}

function sum({ rows, counts }: Import) {
  expect((counts.good ?? 0) + (counts.bad ?? 0) + (counts.setAside ?? 0)).toBe(rows);
}

const RECORD = [
  "ref,name,phone,birth_date,area",
  "A1,Corin Reedbed,0161 496 0811,1980-02-03,North",
  "A2,Wendeline Marsh,,1975-04,",
  "A3,Ivo Saltpan,,,",
  "A4,,0161 496 0899,,",
  "A5,Tamsin Oxbow,0161 496 0833,1990-05-05,",
  "",
].join("\n");

describe("rows that may be somebody on record", () => {
  it("are told apart by telephone, name and year of birth, and say by which", async () => {
    const { supervisor } = await desk();
    await bringIn(supervisor, "people", RECORD);
    const file = [
      "ref,name,phone,birth_date",
      "B1,Korin Reedbed,+44 161 496 0811,", // same number, a name that sounds alike
      "B2,Marsh Wendeline,,1975-06-01", // same parts of the name, same year
      "B3,ivo SALTPAN,0161 496 0700,", // same name, nothing against it
      "B4,Ludo Fenwick,0161 496 0899,", // same number, no name on record
      "B5,Pia Oxbow,0161 496 0833,2015-03", // a child with the same number
      "B6,Ada Reedbed,0161 496 0811,", // household: another given name
      "B7,Wendeline Marsh,,1999-03", // same name, another year
      "B8,Tamsin Oxbow,0161 496 0999,", // same name, another number
      "B9,Nobody Known,0161 496 0777,2001-02",
      "",
    ].join("\n");
    const staged = await stage(supervisor, "people", file);
    expect(staged.counts).toMatchObject({ good: 5, bad: 0, setAside: 4, new: 5 });
    sum(staged);
    const done = await commit(supervisor, staged.id);
    expect(done.counts).toMatchObject({ addedPeople: 5, setAside: 4, good: 5, bad: 0 });
    sum(done);
    expect(await people(supervisor)).toHaveLength(10);
    const list = await matches(supervisor, staged.id);
    expect(list.items.map(({ line, matchedOn }) => `${line} ${matchedOn}`)).toEqual([
      "2 phone_and_name",
      "3 name_and_birth_year",
      "4 name",
      "5 phone",
    ]);
    expect(list.total).toBe(4);
    expect(list.items[0]).toMatchObject({
      row: { name: "Korin Reedbed", phone: "+44 161 496 0811", born: null },
      other: { name: "Corin Reedbed", phone: "0161 496 0811", born: "1980-02-03" },
    });
  });

  it("go on record as decided: joined with their blanks filled, or as another person", async () => {
    const { id, supervisor } = await desk();
    await bringIn(supervisor, "people", RECORD);
    const file = [
      "ref,name,phone,area,sex,household",
      "B1,Corin Reedbed,0161 496 0811,South,male,Mill 1",
      "B3,Ivo Saltpan,,West,,Mill 3",
      "",
    ].join("\n");
    const { id: importId } = await bringIn(supervisor, "people", file);
    const [first, second] = (await matches(supervisor, importId)).items;
    const same = await decide(supervisor, importId, { decision: "same", ids: [first?.id] });
    // The area differs from the record and stays as it is.
    expect(same.body).toEqual({ decided: 1, waiting: 0, left: 1, conflicts: 1 });
    expect(same.status).toBe(200);
    const other = await decide(supervisor, importId, { decision: "other", ids: [second?.id] });
    expect(other.body).toEqual({ decided: 1, waiting: 0, left: 0, conflicts: 0 });
    const again = await decide(supervisor, importId, { decision: "other", ids: [first?.id] });
    expect(again.body).toMatchObject({ decided: 0, left: 0 });
    const all = await people(supervisor);
    expect(all).toHaveLength(6);
    const corin = all.filter(({ name }) => name === "Corin Reedbed");
    expect(corin).toMatchObject([{ ref: "A1", sex: "male", area: "North" }]);
    expect(all.filter(({ name }) => name === "Ivo Saltpan")).toHaveLength(2);
    const one = (await supervisor.client.get(`${supervisor.base}/imports/${importId}`)).body;
    expect(one.counts).toMatchObject({ setAside: 2, same: 1, other: 1 });
    const left = await admin.query(
      "select 1 from identity.import_match where import_id = $1 and body_cipher is not null",
      [importId],
    );
    expect(left.rowCount).toBe(0);
    // The reference of the joined row names the person on record from now on.
    const pairs = await bringIn(supervisor, "pairs", "ref_a,ref_b\nB1,A2\nA1,B3\n");
    expect(pairs.counts).toMatchObject({ addedPairs: 2, addedPeople: 0, unknownRows: 0 });
    const taken = await supervisor.client.call("post", `${supervisor.base}/people`, {
      key: true,
      body: { ref: "B1", name: "Someone Else" },
    });
    expect(taken.status).toBe(422);
    const repeated = await stage(supervisor, "people", "ref,name\nB1,Corin Reedbed\n");
    expect(repeated.counts).toMatchObject({ known: 1, new: 0, setAside: 0 });
    const events = await admin.query(
      "select action from audit.event where investigation_id = $1 and action like 'import.matches%'",
      [id],
    );
    expect(new Set(events.rows.map(({ action }) => action))).toEqual(
      new Set(["import.matches_listed", "import.matches_decided"]),
    );
  });

  it("keep their reference out of pairs until they are decided", async () => {
    const { supervisor } = await desk();
    await bringIn(supervisor, "people", RECORD);
    const { id: importId } = await bringIn(supervisor, "people", "ref,name\nB3,Ivo Saltpan\n");
    const text = "ref_a,ref_b\nB3,A1\nNEW,A2\n";
    const staged = await stage(supervisor, "pairs", text);
    expect(problemLines(staged)).toEqual(["2 ref_a waiting_ref", "3 ref_a unknown_ref"]);
    expect(staged.counts).toMatchObject({ unknownRefs: 1, unknownRows: 2 });
    const done = await commit(supervisor, staged.id, { createMissing: true });
    expect(done.counts).toMatchObject({ addedPeople: 1, addedPairs: 1, skipped: 1 });
    await decide(supervisor, importId, { decision: "same", matchedOn: "name" });
    const again = await bringIn(supervisor, "pairs", text);
    expect(again.counts).toMatchObject({ addedPairs: 1, addedPeople: 0, repeated: 1, skipped: 0 });
  });
});

describe("rows that may be an earlier row of the file", () => {
  const file = [
    "ref,name,phone",
    "C1,José Almansa,0161 496 0101",
    "C2,Jose\u0301 Almansa,",
    "C3,José Almansa,0161 496 0101",
    "C4,Berta Lys,0161 496 0101",
    "",
  ].join("\n");

  it("wait for that row, and composed letters are no difference", async () => {
    const { supervisor } = await desk();
    const staged = await stage(supervisor, "people", file);
    expect(staged.counts).toMatchObject({ good: 2, setAside: 2, new: 2 });
    const early = await decide(supervisor, staged.id, { decision: "other", matchedOn: "name" });
    expect(early.status).toBe(409);
    await commit(supervisor, staged.id);
    const list = await matches(supervisor, staged.id);
    expect(list.kinds).toEqual([
      { matchedOn: "name", waiting: 1 },
      { matchedOn: "phone_and_name", waiting: 1 },
    ]);
    expect(list.items.map(({ line, other }) => [line, other?.name])).toEqual([
      [3, "José Almansa"],
      [4, "José Almansa"],
    ]);
    const all = await decide(supervisor, staged.id, {
      decision: "same",
      matchedOn: "phone_and_name",
    });
    expect(all.body).toMatchObject({ decided: 1, left: 0 });
    expect((await matches(supervisor, staged.id)).total).toBe(1);
    expect(await people(supervisor)).toHaveLength(2);
  });

  it("are checked anew when the file is, and go with rows nobody committed", async () => {
    const { supervisor } = await desk();
    const first = await stage(supervisor, "people", file);
    const second = await stage(supervisor, "people", file);
    expect(second).toMatchObject({ id: first.id, counts: { setAside: 2 } });
    const kept = await admin.query("select 1 from identity.import_match where import_id = $1", [
      first.id,
    ]);
    expect(kept.rowCount).toBe(2);
    await admin.query(
      `update core.import set counts = jsonb_set(counts, '{stagedAt}', '1') where id = $1`,
      [first.id],
    );
    await app.pools.system.query("select core.sweep_import_stages()");
    const swept = await admin.query("select 1 from identity.import_match where import_id = $1", [
      first.id,
    ]);
    expect(swept.rowCount).toBe(0);
  });
});

describe("who decides sees what the role may", () => {
  it("a data officer initials, last digits and the year", async () => {
    const { supervisor, officer } = await desk();
    await bringIn(supervisor, "people", RECORD);
    const file = "ref,name,phone\nB1,Corin Reedbed,0161 496 0811\n";
    const { id: importId } = await bringIn(officer, "people", file);
    const list = await matches(officer, importId);
    expect(list.items).toMatchObject([
      {
        row: { name: "C. R.", phone: "11", born: null },
        other: { name: "C. R.", phone: "11", born: "1980" },
      },
    ]);
    const done = await decide(officer, importId, { decision: "same", ids: [list.items[0]?.id] });
    expect(done.body).toMatchObject({ decided: 1, left: 0 });
    expect(await people(supervisor)).toHaveLength(5);
  });

  it("nobody of another investigation, and no body that says too little or too much", async () => {
    const { supervisor } = await desk();
    const { id: importId } = await bringIn(supervisor, "people", "ref\nZ\n");
    const other = (await desk()).supervisor;
    const path = `${other.base}/imports/${importId}/matches`;
    expect((await other.client.get(path)).status).toBe(404);
    const body = { decision: "same", matchedOn: "name" };
    expect((await other.client.call("post", path, { body })).status).toBe(404);
    for (const wrong of [
      {},
      { decision: "same" },
      { decision: "perhaps", matchedOn: "name" },
      { decision: "same", ids: [] },
      { decision: "same", ids: ["x"] },
      { decision: "same", ids: [importId], matchedOn: "name" },
    ]) {
      expect((await decide(supervisor, importId, wrong)).status).toBe(422);
    }
  });

  it("two who decide at once put a row on record once", async () => {
    const { supervisor, officer } = await desk();
    await bringIn(supervisor, "people", RECORD);
    const { id: importId } = await bringIn(supervisor, "people", "ref,name\nB3,Ivo Saltpan\n");
    const ids = (await matches(supervisor, importId)).items.map((one) => one.id);
    const answers = await Promise.all(
      [supervisor, officer, supervisor, officer].map((member) =>
        decide(member, importId, { decision: "other", ids }),
      ),
    );
    for (const { status } of answers) expect([200, 409]).toContain(status);
    const decided = answers.filter(({ body }) => body.decided === 1);
    expect(decided).toHaveLength(1);
    expect(await people(supervisor)).toHaveLength(6);
  });
});
