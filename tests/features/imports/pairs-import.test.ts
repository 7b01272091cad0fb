import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { bringIn, commit, problemLines, stage } from "../../support/imports.ts";

let app: TestApp;
let admin: pg.Client;
let supervisor: Member;
let id: string;

beforeAll(async () => {
  app = await startTestApp();
  admin = new pg.Client({ connectionString: app.adminUrl });
  await admin.connect();
});

afterAll(async () => {
  await admin.end();
  await app.close();
});

async function freshInvestigation(): Promise<void> {
  id = await buildInvestigation(app);
  supervisor = await signInAs(app, "supervisor", id);
  await bringIn(supervisor, "people", "ref,classification\nA,confirmed\nB,contact\nC,contact\n");
}

async function count(table: string): Promise<number> {
  const found = await admin.query(
    `select count(*)::int as n from ${table} where investigation_id = $1`,
    [id],
  );
  return found.rows[0].n;
}

async function tellings(): Promise<Record<string, unknown>[]> {
  const found = await admin.query(
    `select e.first_exposure, e.last_exposure, e.setting, p.name as place, p.setting as place_setting,
       e.minutes, e.minutes_missing, e.distance_m, e.distance_missing,
       case e.named_by when cp.person_a then 'low' when cp.person_b then 'high' end as told
     from core.exposure e join core.contact_pair cp on cp.id = e.pair_id
       left join core.place p on p.id = e.place_id
     where e.investigation_id = $1 order by e.first_exposure nulls last, e.minutes`,
    [id],
  );
  return found.rows;
}

describe("a pairs file", () => {
  beforeAll(freshInvestigation);

  it("makes one pair for two people and one exposure for each telling", async () => {
    const done = await bringIn(
      supervisor,
      "pairs",
      [
        "ref_a,ref_b,first_exposure,last_exposure,setting,place,minutes,distance_m,named_by",
        "A,B,2026-01-02,2026-01-03,workplace,Old Mill Bakery,30,1.5,A",
        "B,A,2026-01-02,2026-01-03,workplace,old mill bakery,30,1.50,B",
        "A,C,2026-02,unknown,refused,Pier,unknown,refused,",
        "A,C,,,household,Venning,,,",
      ].join("\n"),
    );
    expect(done).toMatchObject({
      state: "committed",
      problems: [],
      counts: { addedPairs: 2, addedExposures: 4, repeated: 0, addedPlaces: 3, addedPeople: 0 },
    });
    expect(await count("core.contact_pair")).toBe(2);
    const blank = { distance_missing: null, minutes_missing: null };
    const rows = await tellings();
    expect(rows).toMatchObject([
      { first_exposure: "2026-01-02", last_exposure: "2026-01-03", minutes: 30, distance_m: 1.5 },
      { setting: "workplace", place: "Old Mill Bakery", place_setting: "workplace", ...blank },
      {
        first_exposure: "2026-02",
        last_exposure: "unknown",
        setting: "refused",
        place: "Pier",
        place_setting: null,
        minutes: null,
        minutes_missing: "unknown",
        distance_m: null,
        distance_missing: "refused",
        told: null,
      },
      { first_exposure: null, setting: "household", place: null, place_setting: "household" },
    ]);
    expect(new Set(rows.slice(0, 2).map((row) => row.told))).toEqual(new Set(["low", "high"]));
  });

  it("adds nothing for a telling that is on record or repeated, in either order", async () => {
    const before = await count("core.exposure");
    const text = [
      "ref_b,ref_a,first_exposure,last_exposure,setting,place,minutes,distance_m,named_by",
      "A,B,2026-01-02,2026-01-03,workplace,OLD MILL BAKERY,30,1.5,A",
      "B,C,2026-01-09,,,,,,C",
      "C,B,2026-01-09,,,,,,C",
    ].join("\n");
    const staged = await stage(supervisor, "pairs", text);
    expect(staged.counts).toMatchObject({ good: 3, bad: 0, repeated: 1 });
    const done = await commit(supervisor, staged.id);
    expect(done.counts).toMatchObject({ addedPairs: 1, addedExposures: 1, repeated: 2 });
    expect(await count("core.exposure")).toBe(before + 1);
    expect(await count("core.place")).toBe(3);
    const changes = await count("core.graph_change");
    const again = await bringIn(supervisor, "pairs", `${text}\n`);
    expect(again.counts).toMatchObject({ addedPairs: 0, addedExposures: 0, repeated: 3 });
    expect(await count("core.graph_change")).toBe(changes);
  });

  it("reaches the live graph", async () => {
    const answer = await supervisor.client.get(`${supervisor.base}/groups`);
    const end = Date.now() + 10_000;
    let body = answer.body;
    while (body.items?.[0]?.size !== 3 && Date.now() < end) {
      await new Promise((resolve) => setTimeout(resolve, 50));
      body = (await supervisor.client.get(`${supervisor.base}/groups`)).body;
    }
    expect(body.items[0]).toMatchObject({ size: 3, cases: 1 });
  });
});

describe("references that are not on record", () => {
  beforeAll(freshInvestigation);
  const text = "ref_a,ref_b\nA,B\nA,X\nX,Y\n unknown,A\nB,C\n";
  const problems = ["3 ref_b unknown_ref", "4 ref_a unknown_ref", "4 ref_b unknown_ref"];

  it("are row errors, and their rows are left out", async () => {
    const staged = await stage(supervisor, "pairs", text);
    expect(problemLines(staged)).toEqual([...problems, "5 ref_a required"]);
    expect(staged.counts).toMatchObject({ good: 2, bad: 3, unknownRows: 2, unknownRefs: 2 });
    const done = await commit(supervisor, staged.id);
    expect(problemLines(done)).toEqual([...problems, "5 ref_a required"]);
    expect(done).toMatchObject({
      createMissing: false,
      problemCount: 4,
      counts: { addedPairs: 2, addedPeople: 0, skipped: 3 },
    });
    expect(await count("core.person")).toBe(3);
  });

  it("open the file again when it is brought again: what is on record is not added twice", async () => {
    const part = "ref_a,ref_b\nA,C\nA,P1\n";
    const first = await bringIn(supervisor, "pairs", part);
    expect(first.counts).toMatchObject({ addedExposures: 1, skipped: 1 });
    await bringIn(supervisor, "people", "ref,classification\nP1,contact\n");
    const again = await stage(supervisor, "pairs", part);
    expect(again).toMatchObject({ id: first.id, state: "ready", problems: [] });
    const done = await commit(supervisor, again.id);
    expect(done.counts).toMatchObject({ addedExposures: 1, repeated: 1, skipped: 0 });
    expect((await stage(supervisor, "pairs", part)).state).toBe("committed");
  });

  it("become people with nothing but a reference when that is chosen", async () => {
    const staged = await stage(supervisor, "pairs", `${text}\n`);
    const done = await commit(supervisor, staged.id, { createMissing: true });
    expect(problemLines(done)).toEqual(["5 ref_a required"]);
    expect(done).toMatchObject({
      createMissing: true,
      counts: { addedPairs: 2, addedExposures: 2, repeated: 2, addedPeople: 2, skipped: 1 },
    });
    const found = await admin.query(
      `select classification, source from core.person p join identity.person i on i.person_id = p.id
       where p.investigation_id = $1 and i.name_cipher is null and i.ref_token is not null
         and p.classification is null`,
      [id],
    );
    expect(found.rows).toEqual([
      { classification: null, source: "import" },
      { classification: null, source: "import" },
    ]);
    // The reference is theirs: a people file fills the rest.
    const filled = await bringIn(
      supervisor,
      "people",
      "ref,name,classification\nX,Xenia Dale,suspected\n",
    );
    expect(filled.counts).toMatchObject({ addedPeople: 0, filledPeople: 1 });
  });

  it("are judged again when a staged file is brought again or committed later", async () => {
    const late = "ref_a,ref_b\nA,L1\nA,L2\n";
    const staged = await stage(supervisor, "pairs", late);
    expect(staged.counts).toMatchObject({ good: 0, bad: 2 });
    await bringIn(supervisor, "people", "ref\nL1\n");
    const again = await stage(supervisor, "pairs", late);
    expect(again.id).toBe(staged.id);
    expect(problemLines(again)).toEqual(["3 ref_b unknown_ref"]);
    await bringIn(supervisor, "people", "ref\nL2\n");
    const done = await commit(supervisor, staged.id);
    expect(done).toMatchObject({ problems: [], problemCount: 0, counts: { good: 2, skipped: 0 } });
  });
});
