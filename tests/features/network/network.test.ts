import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { graphAnswer, summaryAnswer } from "../../../shared/contracts/network.ts";
import { karate, type PublishedNetwork } from "../../core/support/published-networks.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";
import { contactRow, register, submit } from "../../support/field-work.ts";
import { bringIn } from "../../support/imports.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

type Query = Record<string, string>;

/** The report, waited for until it holds the investigation's graph version. */
async function summary(member: Member, query: Query = {}) {
  const { graphVersion } = (await member.client.get(member.base)).body;
  for (let turn = 0; turn < 100; turn++) {
    const answer = await member.client.get(`${member.base}/network/summary`, query);
    expect(answer.status).toBe(200);
    const found = summaryAnswer.parse(answer.body);
    if (found.graphVersion >= graphVersion) return found;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  throw new Error("the report did not follow");
}

async function picture(member: Member, query: Query = {}) {
  const answer = await member.client.get(`${member.base}/network/graph`, query);
  expect(answer.status).toBe(200);
  return graphAnswer.parse(answer.body);
}

/** A fresh investigation with a supervisor. */
async function supervised(settings: Parameters<typeof buildInvestigation>[1] = {}) {
  return await signInAs(app, "supervisor", await buildInvestigation(app, settings));
}

async function importNetwork(member: Member, network: PublishedNetwork): Promise<void> {
  const people = Array.from({ length: network.n }, (_, k) => `p${k}`);
  const pairs = network.links.map(([u, v]) => `p${u},p${v}`);
  await bringIn(member, "people", ["ref", ...people].join("\n"));
  await bringIn(member, "pairs", ["ref_a,ref_b", ...pairs].join("\n"));
}

describe("GET network/summary", () => {
  it("takes an imported file without an interviewed column as a complete network", async () => {
    const supervisor = await supervised();
    await importNetwork(supervisor, karate());
    const found = await summary(supervisor);
    expect(found).toMatchObject({ people: 34, pairs: 78, n: 34, undated: 78, from: null });
    // methods C.2.3
    expect(found.threshold.pairsPerPerson).toBeCloseTo(4.588235294118, 11);
    expect(found.threshold.pairsPerPersonInterval?.[0]).toBeCloseTo(3.724189049823, 11);
    expect(found.threshold.pairsPerPersonInterval?.[1]).toBeCloseTo(5.614304183473, 11);
    expect(found.threshold).toMatchObject({ population: "complete", verdict: "above" });
  });

  it("reproduces the fixture of 100 interviewed among 1,000 after import", async () => {
    const supervisor = await supervised({ populationAtRisk: 1000 });
    const people = Array.from({ length: 475 }, (_, k) => `p${k},${k < 100 ? "yes" : "no"}`);
    const pairs = [
      ...Array.from({ length: 100 }, (_, k) => `p${k},p${(k + 1) % 100}`),
      ...Array.from({ length: 375 }, (_, k) => `p${k % 100},p${100 + k}`),
      // Two people who were not interviewed: seen by no interview.
      "p200,p300",
    ];
    await bringIn(supervisor, "people", ["ref,interviewed", ...people].join("\n"));
    await bringIn(supervisor, "pairs", ["ref_a,ref_b", ...pairs].join("\n"));
    const found = await summary(supervisor);
    // methods, box of C.8
    expect(found).toMatchObject({ people: 475, pairs: 476, n: 1000, interviewed: 100 });
    expect(found.threshold.pairsPerPerson).toBeCloseTo(4.997630331754, 11);
    expect(found.threshold.pairsPerPersonInterval?.[0]).toBeCloseTo(4.568890972301, 11);
    expect(found.threshold.pairsPerPersonInterval?.[1]).toBeCloseTo(5.466380931629, 11);
    expect(found.threshold.verdict).toBeNull();
    const told = await summary(supervisor, { population: "interviewed" });
    expect(told).toMatchObject({ people: 100, pairs: 100, population: "interviewed" });
    expect(told.threshold.verdict).toBe("above");
  });

  it("answers as of an instant before an interview, and after", async () => {
    const supervisor = await supervised();
    const tracer = await signInAs(app, "tracer", supervisor.investigationId);
    const caseId = await register(tracer, { name: "Cleo Marsh" });
    await new Promise((resolve) => setTimeout(resolve, 5));
    const before = new Date().toISOString();
    await new Promise((resolve) => setTimeout(resolve, 5));
    await submit(tracer, caseId, {
      contacts: [contactRow({ name: "Dov Pell" }), contactRow({ name: "Eli Roan" })],
      groupExposures: [{ setting: "social", countMin: 4, countMax: 9 }],
    });
    expect(await summary(supervisor)).toMatchObject({
      people: 3,
      pairs: 2,
      interviewed: 1,
      unresolvedGroupExposures: 1,
      meanDegreeInterviewed: 2,
      componentSizes: [3],
    });
    expect(await summary(supervisor, { asOf: before })).toMatchObject({
      people: 1,
      pairs: 0,
      interviewed: 0,
      unresolvedGroupExposures: 0,
      cutOff: before,
    });
    expect(await summary(supervisor, { population: "cases" })).toMatchObject({ people: 1 });
  });

  it("refuses what is no question, and roles that have no report", async () => {
    const supervisor = await supervised();
    const path = `${supervisor.base}/network/summary`;
    const wrong = await supervisor.client.get(path, { from: "2026-02-02", to: "2026-02-01" });
    expect(wrong.status).toBe(422);
    expect(wrong.body.errors).toEqual([{ path: "to", code: "last_before_first" }]);
    expect((await supervisor.client.get(path, { asOf: "yesterday" })).status).toBe(422);
    expect((await supervisor.client.get(path, { population: "everyone" })).status).toBe(422);
    expect((await supervisor.client.get(path, { colour: "red" })).status).toBe(422);
    expect((await supervisor.client.get(path, { from: "1900-01-01" })).status).toBe(200);
    expect((await supervisor.client.get(path, { asOf: "2100-12-31" })).status).toBe(200);
    for (const role of ["tracer", "officer"] as const) {
      const member = await signInAs(app, role, supervisor.investigationId);
      expect((await member.client.get(path)).status).toBe(403);
    }
  });
});

describe("GET network/graph", () => {
  it("draws people by study number, the same at every asking, and one group alone", async () => {
    const supervisor = await supervised();
    await importNetwork(supervisor, karate());
    await summary(supervisor);
    const epidemiologist = await signInAs(app, "epidemiologist", supervisor.investigationId);
    const drawn = await picture(epidemiologist);
    expect(drawn).toMatchObject({ level: "people" });
    expect(drawn.nodes).toHaveLength(34);
    expect(drawn.pairs).toHaveLength(78);
    expect(new Set(drawn.nodes.map(({ group }) => group)).size).toBe(1);
    expect(drawn.nodes.every(({ groupRank }) => groupRank === 0)).toBe(true);
    const places = new Set(drawn.nodes.map(({ x, y }) => `${x} ${y}`));
    expect(places.size).toBe(34);
    const again = await picture(epidemiologist, { window: "all" });
    expect(again.nodes).toEqual(drawn.nodes);

    const { items } = (await epidemiologist.client.get(`${epidemiologist.base}/groups`)).body;
    const one = await picture(epidemiologist, { group: items[0].id });
    expect(one.nodes).toHaveLength(34);
    const nobody = await epidemiologist.client.get(`${epidemiologist.base}/network/graph`, {
      group: "no-such-group",
    });
    expect(nobody.status).toBe(404);
  });

  it("draws groups in place of people above 1,500, largest first and apart", async () => {
    const supervisor = await supervised();
    const people = Array.from({ length: 1600 }, (_, k) => `p${k}`);
    const pairs = Array.from({ length: 700 }, (_, k) => `p${2 * k},p${2 * k + 1}`);
    pairs.push("p0,p2");
    await bringIn(supervisor, "people", ["ref", ...people].join("\n"));
    await bringIn(supervisor, "pairs", ["ref_a,ref_b", ...pairs].join("\n"));
    await summary(supervisor);
    const drawn = await picture(supervisor);
    expect(drawn.level).toBe("groups");
    expect(drawn.pairs).toEqual([]);
    expect(drawn.nodes).toHaveLength(699);
    expect(drawn.nodes[0]).toMatchObject({ size: 4, groupRank: 0 });
    const groups = await supervisor.client.get(`${supervisor.base}/groups`);
    expect(groups.body.items[0].id).toBe(drawn.nodes[0]?.id);
    const one = await picture(supervisor, { group: drawn.nodes[0]?.id ?? "" });
    expect(one).toMatchObject({ level: "people" });
    expect(one.nodes).toHaveLength(4);
    expect(one.pairs).toHaveLength(3);
  });
});
