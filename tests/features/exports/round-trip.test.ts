import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { generateOutbreak } from "../../../drizzle/seed/generator/generate-outbreak.ts";
import { dayIn, now } from "../../../server/clock.ts";
import {
  groupList,
  type NetworkSummary,
  summaryAnswer,
} from "../../../shared/contracts/network.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { fileOf, takeOut } from "../../support/exports.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { asAdmin, contactRow, register, submit } from "../../support/field-work.ts";
import { commit, problemLines, stage } from "../../support/imports.ts";
import { loadGenerated } from "../../support/load-generated.ts";

const SETTINGS = {
  monitoringDays: 14,
  infectiousBefore: 2,
  infectiousAfter: 10,
  incubationMin: 2,
  incubationMax: 10,
  populationAtRisk: 5000,
};
const QUESTIONS = [
  { population: "all", window: "all" },
  { population: "all" },
  { population: "cases", window: "all" },
  { population: "interviewed", window: "all" },
  { population: "interviewed" },
] as const;

let app: TestApp;
let source: Member;

beforeAll(async () => {
  app = await startTestApp();
  const investigationId = await buildInvestigation(app, SETTINGS);
  source = await signInAs(app, "supervisor", investigationId);
  const outbreak = generateOutbreak({
    seed: 26,
    people: 400,
    lastDay: dayIn("UTC", now()),
    tracers: ["first"],
    ...SETTINGS,
  });
  await loadGenerated(app, investigationId, outbreak);
  await addOddities();
}, 60_000);

afterAll(async () => {
  await app?.close();
});

/** What a generator does not make: cells that bite, words, partial days, withdrawn things. */
async function addOddities(): Promise<void> {
  const odd = await register(source, {
    ref: "=1+1",
    name: '\'t Hart, "Jo"',
    phone: "+44 7700 900123",
    email: "unknown",
    birthDate: "1980-05",
    address: "-5 Quay\nSecond line, north",
    area: "＝East",
    occupation: "@home",
    household: "+Harbour row",
    onsetDate: "2026-02",
    specimenDate: "unknown",
    result: "refused",
    isolationDate: "refused",
    diedDate: "2026-04",
    classification: "probable",
  });
  const told = [
    contactRow({ name: "Twice Told", minutes: "unknown", distanceM: 0.1, setting: "household" }),
    contactRow({ name: "Not Asked" }),
    contactRow({
      name: "Partly Dated",
      firstExposure: "2026-03",
      lastExposure: "unknown",
      setting: "refused",
      place: "-Hall; north",
      minutes: 0,
      distanceM: "refused",
    }),
  ];
  const made = await submit(source, odd, { contacts: told });
  expect(made.status).toBe(201);
  const gone = await register(source, { name: "Gone Person", classification: "confirmed" });
  const alone = await submit(source, gone, {
    contacts: [contactRow({ name: "Of Gone", lastExposure: "2026-04-01" })],
  });
  expect(alone.status).toBe(201);
  await asAdmin(app, "update core.person set withdrawn_at = now() where id = $1", [gone]);
  await asAdmin(
    app,
    `update core.exposure set withdrawn_at = now() where id = (
       select id from core.exposure where investigation_id = $1 and withdrawn_at is null
       order by recorded_at limit 1)`,
    [source.investigationId],
  );
  // Said to the graph by a change through the routes.
  await asAdmin(
    app,
    `with v as (update core.investigation set graph_version = graph_version + 1 where id = $1
       returning graph_version)
     insert into core.graph_change (investigation_id, graph_version, kind)
     select $1, graph_version, 'bulk' from v`,
    [source.investigationId],
  );
  await register(source, { name: "Last Person", classification: "contact" });
}

async function summary(member: Member, query: Record<string, string>): Promise<NetworkSummary> {
  const { graphVersion } = (await member.client.get(member.base)).body;
  for (let turn = 0; turn < 250; turn++) {
    const answer = await member.client.get(`${member.base}/network/summary`, query);
    expect(answer.status).toBe(200);
    const found = summaryAnswer.parse(answer.body);
    if (found.graphVersion >= graphVersion) return found;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  throw new Error("the report did not follow");
}

/** The report but for what belongs to the moment it was recorded, and what no file holds. */
function report(found: NetworkSummary) {
  const {
    asOf: _asOf,
    cutOff: _cutOff,
    graphVersion: _version,
    // Values of earlier days: brought in, everything was recorded today.
    trail: _trail,
    // Groups that could not be named are in no file.
    unresolvedGroupExposures: _groups,
    ...figures
  } = found;
  return figures;
}

async function groupsOf(member: Member) {
  const out: unknown[] = [];
  for (let page = 1; page < 20; page++) {
    const answer = await member.client.get(`${member.base}/groups`, {
      page: String(page),
      pageSize: "200",
    });
    const found = groupList.parse(answer.body);
    out.push(...found.items.map(({ size, cases, contacts }) => [size, cases, contacts].join(" ")));
    if (out.length >= found.total) return out.sort();
  }
  throw new Error("the groups do not end");
}

/** Rows that look like another one of the file are set aside; the file knows that they are not. */
async function keepApart(member: Member, importId: string): Promise<void> {
  for (let round = 0; round < 40; round++) {
    const list = await member.client.get(`${member.base}/imports/${importId}/matches`);
    const open = (list.body.items as { id: string; state?: string }[]).map((one) => one.id);
    if (open.length === 0) return;
    const answer = await member.client.post(`${member.base}/imports/${importId}/matches`, {
      decision: "other",
      ids: open,
    });
    expect(answer.status).toBeLessThan(300);
  }
  throw new Error("the rows that were set aside do not come to an end");
}

/** Brings two files into a fresh investigation. */
async function broughtElsewhere(people: string, pairs: string): Promise<Member> {
  const member = await signInAs(app, "supervisor", await buildInvestigation(app, SETTINGS));
  for (const [kind, text] of [
    ["people", people],
    ["pairs", pairs],
  ] as const) {
    const staged = await stage(member, kind, text);
    expect(problemLines(staged)).toEqual([]);
    const done = await commit(member, staged.id);
    expect(done.state).toBe("committed");
    expect(problemLines(done)).toEqual([]);
    if (kind === "people") await keepApart(member, staged.id);
  }
  return member;
}

async function linesOf(member: Member) {
  const items: Record<string, unknown>[] = [];
  for (let page = 1; page < 20; page++) {
    const answer = await member.client.get(`${member.base}/people`, {
      page: String(page),
      pageSize: "200",
    });
    items.push(...answer.body.items);
    if (items.length >= answer.body.total) return items;
  }
  throw new Error("the line list does not end");
}

const COMPARED = [
  "name",
  "phone",
  "sex",
  "ageBand",
  "area",
  "occupation",
  "household",
  "classification",
  "onsetDate",
  "specimenDate",
  "resultDate",
  "result",
  "reportDate",
  "interviewDate",
  "interviewed",
  "isolationDate",
  "diedDate",
] as const;

const byRef = (items: Record<string, unknown>[], ref: (item: Record<string, unknown>) => string) =>
  Object.fromEntries(
    items.map((item) => [
      ref(item),
      Object.fromEntries(COMPARED.map((key) => [key, item[key] ?? null])),
    ]),
  );

describe.each([
  ["with identity", true],
  ["by study number", false],
] as const)("taken out %s and brought in elsewhere", (_title, identified) => {
  let people: string;
  let pairs: string;
  let other: Member;

  beforeAll(async () => {
    people = await fileOf(source, await takeOut(source, { kind: "people", identified }));
    pairs = await fileOf(source, await takeOut(source, { kind: "pairs", identified }));
    other = await broughtElsewhere(people, pairs);
  }, 60_000);

  test.each(QUESTIONS)("gives the same network report: $population $window", async (question) => {
    const mine = report(await summary(source, question));
    const theirs = report(await summary(other, question));
    expect(mine.people).toBeGreaterThan(30);
    for (const key of Object.keys(mine) as (keyof typeof mine)[]) {
      expect(theirs[key], key).toEqual(mine[key]);
    }
  });

  test("gives the same groups, with as many cases and contacts in each", async () => {
    const mine = await groupsOf(source);
    expect(mine.length).toBeGreaterThan(5);
    expect(await groupsOf(other)).toEqual(mine);
  });

  test("gives the same file again", async () => {
    if (!identified) return;
    const again = await fileOf(other, await takeOut(other, { kind: "people", identified: true }));
    expect(again.split("\r\n").sort()).toEqual(people.split("\r\n").sort());
    const told = await fileOf(other, await takeOut(other, { kind: "pairs", identified: true }));
    expect(told.split("\r\n").map(sameWayRound).sort()).toEqual(
      pairs.split("\r\n").map(sameWayRound).sort(),
    );
  });

  test("leaves out who and what was withdrawn", () => {
    expect(people).not.toContain("Gone Person");
    const rows = people.split("\r\n").filter(Boolean).length - 1;
    expect(rows).toBeGreaterThan(100);
  });
});

/** Which of two people stands first is not said by a pair. */
function sameWayRound(line: string): string {
  return line.split(",").sort().join(",");
}

test("the line list of the one with identity is the same, field by field", async () => {
  const file = await takeOut(source, { kind: "people", identified: true });
  const pairs = await takeOut(source, { kind: "pairs", identified: true });
  const other = await broughtElsewhere(await fileOf(source, file), await fileOf(source, pairs));
  const mine = byRef(await linesOf(source), (item) => String(item.ref ?? item.studyNumber));
  const theirs = byRef(await linesOf(other), (item) => String(item.ref));
  expect(Object.keys(mine).length).toBeGreaterThan(100);
  for (const [ref, fields] of Object.entries(mine)) expect(theirs[ref], ref).toEqual(fields);
  expect(Object.keys(theirs).length).toBe(Object.keys(mine).length);
});
