import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { recompute } from "../../../server/analysis/compare/recompute.ts";
import { comparisonFile } from "../../../server/analysis/compare/run-file.ts";
import { withTx } from "../../../server/db/with-tx.ts";
import { endInterruptedRuns } from "../../../server/features/compare/upkeep.ts";
import { compareRunList } from "../../../shared/contracts/compare.ts";
import { CORE_VERSION } from "../../../shared/core/index.ts";
import type { Role } from "../../../shared/roles.ts";
import { contextOf } from "../../policy/support/world.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { askRun, compareNow, ended, resultOf, runOf } from "../../support/comparisons.ts";
import {
  buildInvestigation,
  type Member,
  signInAs,
  signInEveryone,
} from "../../support/factories.ts";
import { asAdmin, contactRow, eventsNamed, register, submit } from "../../support/field-work.ts";

let app: TestApp;
let everyone: Record<Role, Member>;
let supervisor: Member;
let epidemiologist: Member;

/** Three cases, each interviewed; the second had been named by the first. */
async function trace(): Promise<void> {
  const held = async (person: string, fields: Record<string, unknown>) =>
    expect((await submit(supervisor, person, fields)).status).toBe(201);
  const first = await register(supervisor, { name: "Ada Quill", area: "North" });
  const named = (name: string) => contactRow({ name, setting: "social" });
  await held(first, {
    contacts: [named("Ben Rook"), named("Cy Fell"), named("Di Moor")],
    groupExposures: [{ setting: "transport", countMin: 12, countMax: 12 }],
  });
  const [ben] = await asAdmin<{ id: string }>(
    app,
    `select cp.person_a as id from core.contact_pair cp where cp.person_b = $1
     union select cp.person_b from core.contact_pair cp where cp.person_a = $1 limit 1`,
    [first],
  );
  await held(ben?.id ?? "", { contacts: [named("Eve Tarn"), named("Flo Beck")] });
  const third = await register(supervisor, { name: "Gil Hythe" });
  await held(third, { contacts: [named("Hal Wold")] });
  // Nobody has asked this one yet: on record, and seen through no interview.
  await register(supervisor, { name: "Ida Lowe" });
}

beforeAll(async () => {
  app = await startTestApp();
  everyone = await signInEveryone(app, await buildInvestigation(app, { populationAtRisk: 500 }));
  ({ supervisor, epidemiologist } = everyone);
  await trace();
});

afterAll(async () => {
  await app?.close();
});

const path = (member: Member, rest = "") => `${member.base}/compare/runs${rest}`;

describe("a record made by tracing", () => {
  test("is compared with what the same interviews record under random mixing", async () => {
    const run = await compareNow(supervisor, { attribute: "interviewed" });
    expect(run).toMatchObject({ people: 8, pairs: 6, by: expect.any(String) });
    const { seen, baselines, measures, comparisons } = resultOf(run);
    expect(seen).toMatchObject({
      state: "traced",
      n: 500,
      interviewed: 3,
      coverage: 3 / 500,
      recall: null,
      unresolvedGroupExposures: 1,
      leftOutPeople: 1,
      leftOutPairs: 0,
    });
    expect(seen.cautions).toEqual(["coverage_partial", "recall_unknown", "group_exposures_open"]);
    expect(baselines.map(({ baseline, standing, drawn }) => [baseline, standing, drawn])).toEqual([
      ["traced", "show", true],
      ["gnm", "grey", true],
      ["degreePreserving", "refuse", false],
      ["degreePreservingInterviewedEnd", "warn", true],
      ["mixing", "grey", true],
    ]);
    // Six pairs of 3·2/2 + 3·497 eligible ones; of two who could have been named before, one was.
    expect(baselines[0]?.parameters).toEqual({
      population: 500,
      interviews: 3,
      p: 6 / 1494,
      q: 1,
      sigma: 0.5,
      reached: 199,
    });
    expect(comparisons.find(({ key }) => key === "largest_group")).toEqual({
      key: "largest_group",
      standing: "grey",
      reasons: ["traced_rejects_random_mixing"],
      instead: "traced_mixing",
    });
    const people = measures.find(({ statistic }) => statistic === "people");
    expect(people?.observed).toBe(8);
    expect(Object.keys(people?.baselines ?? {})).toEqual(["traced"]);
    const ei = measures.find(({ statistic }) => statistic === "ei");
    expect(ei?.baselines.traced).toBeUndefined();
    // Degrees are those of the three who were interviewed: 3, 3 and 1.
    expect(resultOf(run).degrees.observed.slice(0, 4)).toEqual([0, 1, 0, 2]);
  });

  test("an earlier cut-off, a range and other populations are the report's", async () => {
    const early = await compareNow(epidemiologist, { asOf: "2020-01-01" });
    expect(early).toMatchObject({ people: 0, asOf: "2020-01-01", reached: 0 });
    expect(resultOf(early).seen.state).toBe("unseen");
    expect(resultOf(early).baselines.every(({ drawn }) => !drawn)).toBe(true);
    const free = await compareNow(supervisor, { from: "2026-01-01", to: "2026-01-31" });
    expect(free).toMatchObject({ window: "free", from: "2026-01-01", to: "2026-01-31", pairs: 0 });
    const asked = await compareNow(supervisor, { population: "interviewed" });
    expect(asked).toMatchObject({ people: 3, pairs: 1 });
    const traced = resultOf(asked).baselines[0];
    expect(traced).toMatchObject({ standing: "refuse", reasons: ["needs_whole_record"] });
    const cases = await compareNow(supervisor, { population: "cases" });
    const query = { population: "cases", window: "all" };
    const summary = await supervisor.client.get(`${supervisor.base}/network/summary`, query);
    const seen = resultOf(cases).seen;
    expect([seen.n, seen.interviewed]).toEqual([summary.body.n, summary.body.interviewed]);
  }, 60_000);

  test("the download recomputes without the server, by study number alone", async () => {
    const run = await compareNow(epidemiologist, { attribute: "area", name: "For checking" });
    const answer = await epidemiologist.client.get(path(epidemiologist, `/${run.id}/file`));
    expect(answer.status).toBe(200);
    expect(answer.headers["content-type"]).toBe("application/json; charset=utf-8");
    expect(answer.headers["content-disposition"]).toContain("strandline-comparison-");
    const file = answer.body;
    expect(file.run).toMatchObject({ id: run.id, coreVersion: CORE_VERSION, seed: 1 });
    expect(file.result).toEqual(run.result);
    expect(JSON.parse(JSON.stringify(recompute(comparisonFile.parse(file))))).toEqual(run.result);
    expect(file.people.length).toBe(8);
    const asked = file.people.filter((one: { interviewed: boolean }) => one.interviewed);
    expect(asked.map((one: { interviewOrder: number }) => one.interviewOrder).sort()).toEqual([
      1, 2, 3,
    ]);
    expect(file.people.map((one: { class: string | null }) => one.class)).toContain("North");
    const known = new Set(file.people.map((one: { studyNumber: string }) => one.studyNumber));
    for (const pair of file.pairs) expect(pair.every((end: string) => known.has(end))).toBe(true);
    expect(file.pairs.length).toBe(6);
    expect(answer.text).not.toMatch(/Quill|Rook|Tarn|Wold/);
    const [event] = await eventsNamed(app, supervisor.investigationId, "compare.downloaded");
    expect(event).toMatchObject({
      account_id: epidemiologist.accountId,
      counts: { run: run.id, people: 8, pairs: 6 },
    });
    expect(JSON.stringify(event)).not.toContain("For checking");
  });
});

describe("what is done with runs", () => {
  test("they are listed newest first, found by name, renamed by maker or supervisor", async () => {
    const mine = await compareNow(epidemiologist, { name: "Zebra crossing" });
    const theirs = await compareNow(supervisor, { name: "Plain" });
    const list = compareRunList.parse((await supervisor.client.get(path(supervisor))).body);
    expect(list.items.slice(0, 2).map(({ id }) => id)).toEqual([theirs.id, mine.id]);
    const one = await supervisor.client.get(path(supervisor), { q: "zebra", pageSize: "1" });
    expect([one.body.total, one.body.items[0].id]).toEqual([1, mine.id]);
    expect((await supervisor.client.get(path(supervisor), { sort: "name" })).status).toBe(422);

    const rename = (member: Member, id: string) =>
      member.client.call("patch", path(member, `/${id}`), { body: { name: "Other" } });
    expect((await rename(supervisor, mine.id)).body).toMatchObject({ name: "Other" });
    expect((await runOf(epidemiologist, theirs.id)).can).toEqual({ change: false });
    expect((await rename(epidemiologist, theirs.id)).status).toBe(403);
    const drop = await epidemiologist.client.call("delete", path(epidemiologist, `/${theirs.id}`));
    expect(drop.status).toBe(403);
    const gone = await supervisor.client.call("delete", path(supervisor, `/${mine.id}`));
    expect(gone.status).toBe(204);
    expect((await epidemiologist.client.get(path(epidemiologist, `/${mine.id}`))).status).toBe(404);
  });

  test("one under way tells its progress, can be stopped, and is then kept as stopped", async () => {
    const member = await signInAs(app, "epidemiologist", await buildInvestigation(app));
    await asAdmin(
      app,
      `insert into core.person (id, investigation_id, study_number, recorded_at)
       select gen_random_uuid(), $1, 'C' || k, now() from generate_series(1, 800) k`,
      [member.investigationId],
    );
    await asAdmin(
      app,
      `with p as (select id, row_number() over (order by id) - 1 as k from core.person
          where investigation_id = $1),
        c as (insert into core.contact_pair (id, investigation_id, person_a, person_b)
          select gen_random_uuid(), $1, least(a.id, b.id), greatest(a.id, b.id)
          from p a join p b on b.k = (a.k + 1) % 800 or b.k = (a.k + 7) % 800 returning id)
       insert into core.exposure (id, investigation_id, pair_id)
       select gen_random_uuid(), $1, id from c`,
      [member.investigationId],
    );
    const id = await askRun(member, { replicates: 9999 });
    const end = Date.now() + 25_000;
    let run = await runOf(member, id);
    while (run.progress === 0 && Date.now() < end) {
      await new Promise((resolve) => setTimeout(resolve, 50));
      run = await runOf(member, id);
    }
    expect(run).toMatchObject({ state: "running", people: 800, pairs: 1600, result: null });
    expect(run.progress).toBeGreaterThan(0);
    expect(run.progress).toBeLessThan(1);
    const early = await member.client.get(path(member, `/${id}/file`));
    expect(early.status).toBe(404);
    const stopped = await member.client.call("post", path(member, `/${id}/cancel`), { body: {} });
    expect([stopped.status, stopped.body.state]).toEqual([200, "cancelled"]);
    // The next one is made after it: by then it has ended for good.
    expect((await compareNow(supervisor)).state).toBe("ready");
    expect(await runOf(member, id)).toMatchObject({ state: "cancelled", result: null });
    expect((await member.client.call("delete", path(member, `/${id}`))).status).toBe(204);

    // Swaps on 1600 pairs are worth threads of their own; one thread must find the same.
    const threaded = await compareNow(member);
    const file = await member.client.get(path(member, `/${threaded.id}/file`));
    const alone = recompute(comparisonFile.parse(file.body));
    expect(JSON.parse(JSON.stringify(alone))).toEqual(threaded.result);
  }, 90_000);

  test("row security lets an epidemiologist change and delete their own alone", async () => {
    const theirs = await compareNow(supervisor);
    const mine = await compareNow(epidemiologist);
    const nonce = await contextOf(app, epidemiologist, "epidemiologist");
    const context = { pool: app.pools.epidemiologist, nonce };
    for (const statement of [
      sql`update core.compare_run set name = 'Taken' where investigation_id is not null`,
      sql`delete from core.compare_run where id in (${theirs.id}, ${mine.id})`,
    ]) {
      await withTx(context, (tx) => tx.execute(statement));
    }
    expect((await runOf(supervisor, theirs.id)).name).toBe("A comparison");
    expect((await supervisor.client.get(path(supervisor, `/${mine.id}`))).status).toBe(404);
    const forged = sql`update core.compare_run set result = '{}' where id = ${theirs.id}`;
    await expect(withTx(context, (tx) => tx.execute(forged))).rejects.toMatchObject({
      cause: { code: "42501" },
    });
  });

  test("a process that ends leaves an entry that says so, and it can be run again", async () => {
    const run = await compareNow(epidemiologist);
    await asAdmin(app, "update core.compare_run set state = 'running' where id = $1", [run.id]);
    expect(await endInterruptedRuns(app.pools)).toBe(1);
    expect(await runOf(epidemiologist, run.id)).toMatchObject({
      state: "failed",
      failure: "compare_interrupted",
    });
    const again = await epidemiologist.client.post(path(epidemiologist, `/${run.id}/again`));
    expect((await ended(epidemiologist, again.body.id)).result).toEqual(run.result);
  });

  test("tracers and data officers have none of it", async () => {
    for (const role of ["tracer", "officer"] as const) {
      expect((await everyone[role].client.get(path(everyone[role]))).status).toBe(403);
    }
  });

  test.each([
    [{ name: " " }, "name", "required"],
    [{ population: "some" }, "population", "not_in_list"],
    [{ attribute: "name" }, "attribute", "not_in_list"],
    [{ replicates: 200 }, "replicates", "not_in_list"],
    [{ seed: -1 }, "seed", "too_small"],
    [{ seed: 0.5 }, "seed", "not_a_whole_number"],
    [{ from: "2026-02-30" }, "from", "not_a_day"],
    [{ from: "2026-02-02", to: "2026-02-01" }, "to", "last_before_first"],
    [{ asOf: "yesterday" }, "asOf", "not_an_instant"],
  ])("%j is told beside its field", async (body, field, code) => {
    const answer = await supervisor.client.post(path(supervisor), { name: "A", ...body });
    expect([answer.status, answer.body.errors]).toEqual([422, [{ path: field, code }]]);
  });
});
