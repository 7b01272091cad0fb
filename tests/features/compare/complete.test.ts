import { afterAll, beforeAll, expect, test } from "vitest";
import { recompute } from "../../../server/analysis/compare/recompute.ts";
import { comparisonFile } from "../../../server/analysis/compare/run-file.ts";
import type { CompareRun } from "../../../shared/contracts/compare.ts";
import type { Statistic } from "../../../shared/core/index.ts";
import { karate } from "../../core/support/published-networks.ts";
import { startTestApp, type TestApp } from "../../support/app.ts";
import { bringInNetwork, compareNow, ended, resultOf } from "../../support/comparisons.ts";
import { buildInvestigation, type Member, signInAs } from "../../support/factories.ts";

let app: TestApp;
let complete: Member;
let interviewed: Member;

const half = (person: number) => (person < 17 ? "North" : "South");

beforeAll(async () => {
  app = await startTestApp();
  complete = await signInAs(app, "supervisor", await buildInvestigation(app));
  await bringInNetwork(complete, karate(), { area: half });
  interviewed = await signInAs(app, "supervisor", await buildInvestigation(app));
  await bringInNetwork(interviewed, karate(), { interviewed: () => "yes" });
});

afterAll(async () => {
  await app?.close();
});

const measureOf = (run: CompareRun, statistic: Statistic) => {
  const found = resultOf(run).measures.find((one) => one.statistic === statistic);
  if (!found) throw new Error(`there is no ${statistic}`);
  return found;
};
const standings = (run: CompareRun) =>
  Object.fromEntries(
    resultOf(run).baselines.map(({ baseline, standing, drawn }) => [baseline, [standing, drawn]]),
  );

// Sources: Zachary's club has 34 people, 78 pairs, transitivity 45·3/528 = 0.255681818182 and degree
// assortativity -0.475613097685 (networkx 2.8); under G(34, 78) transitivity has mean 0.135 and sd
// 0.027, with degrees kept 0.25 and about 0.03 (own simulation of the methods sheet, C.7.5).
test("the lesson: extreme against random mixing, ordinary once degrees are kept", async () => {
  const run = await compareNow(complete, { replicates: 999, attribute: "area" });
  expect(run).toMatchObject({ people: 34, pairs: 78, reached: 999, progress: 1, seed: 1 });
  expect(resultOf(run).seen).toMatchObject({ state: "complete", n: 34, cautions: [] });
  expect(standings(run)).toEqual({
    traced: ["refuse", false],
    gnm: ["show", true],
    degreePreserving: ["show", true],
    degreePreservingInterviewedEnd: ["refuse", false],
    mixing: ["show", true],
  });
  const transitivity = measureOf(run, "transitivity");
  expect(transitivity.observed).toBeCloseTo(0.255681818182, 12);
  const { gnm, degreePreserving, mixing } = transitivity.baselines;
  expect(gnm?.pUpper).toBe(0.001);
  expect(gnm?.mean).toBeCloseTo(0.135, 2);
  expect(degreePreserving?.pTwoSided).toBeGreaterThan(0.2);
  expect(degreePreserving?.low).toBeLessThan(0.2557);
  expect(degreePreserving?.high).toBeGreaterThan(0.2557);
  expect(mixing?.mean).not.toBeNull();
  const assortativity = measureOf(run, "degreeAssortativity");
  expect(assortativity.observed).toBeCloseTo(-0.475613097685, 11);
  expect(assortativity.baselines.gnm?.pLower).toBe(0.001);
  // What a baseline holds fixed has no figure there.
  expect(measureOf(run, "degreeVariance").baselines.degreePreserving).toBeUndefined();
  expect(measureOf(run, "ei").baselines.mixing).toBeUndefined();
  expect(measureOf(run, "ei").baselines.gnm?.pTwoSided).toBeLessThan(0.01);
  expect(measureOf(run, "meanSmallGroup")).toMatchObject({ observed: null, reason: "one_group" });
}, 60_000);

test("its download gives the same figures in one thread, without the server", async () => {
  const run = await compareNow(complete, { attribute: "area" });
  const { client, base } = complete;
  const answer = await client.get(`${base}/compare/runs/${run.id}/file`);
  const file = comparisonFile.parse(answer.body);
  expect([file.people.length, file.pairs.length, file.classes]).toEqual([
    34,
    78,
    ["North", "South"],
  ]);
  expect(JSON.parse(JSON.stringify(recompute(file)))).toEqual(run.result);
  // A pair less is another network.
  const other = recompute({ ...file, pairs: file.pairs.slice(1) });
  expect(other.measures).not.toEqual(run.result?.measures);
}, 60_000);

test("figures, histograms, curves and laws hang together", async () => {
  const result = resultOf(await compareNow(complete));
  for (const { baselines } of result.measures) {
    const pValues = Object.values(baselines).flatMap(({ pTwoSided, pHolm }) =>
      pTwoSided === null ? [] : [[pTwoSided, pHolm ?? -1]],
    );
    for (const [p, adjusted] of pValues) expect(adjusted).toBeGreaterThanOrEqual(p as number);
    for (const { histogram, undefinedReplicates } of Object.values(baselines)) {
      expect(histogram?.counts.length ?? 24).toBe(24);
      const all = (histogram?.counts ?? []).reduce((sum, count) => sum + count, 0);
      expect(all + undefinedReplicates).toBe(199);
    }
  }
  const { degrees, sizes } = result;
  expect(degrees.observed.slice(0, 5)).toEqual([0, 1, 11, 6, 6]);
  expect(degrees.observed.reduce((sum, count) => sum + count, 0)).toBe(34);
  expect(degrees.binomial?.reduce((sum, count) => sum + count, 0)).toBeCloseTo(34, 9);
  expect(Object.keys(degrees.baselines)).toEqual(["gnm"]);
  const band = degrees.baselines.gnm;
  expect(band?.quickLook).toBe(true);
  expect(band?.p).toBeLessThan(0.05);
  band?.low.forEach((low, k) => {
    expect(band.globalLow?.[k]).toBeLessThanOrEqual(low);
    expect(band.globalHigh?.[k]).toBeGreaterThanOrEqual(band.high[k] as number);
  });
  // One group of 34: the last entry of the curve is "that many or more".
  expect(sizes.observed.at(-1)).toBe(1);
});

test("where everyone was interviewed, the same baselines and the interviews' own are shown", async () => {
  const run = await compareNow(interviewed);
  expect(resultOf(run).seen).toMatchObject({ state: "covered", coverage: 1, interviewed: 34 });
  expect(standings(run)).toEqual({
    traced: ["show", true],
    gnm: ["show", true],
    degreePreserving: ["show", true],
    degreePreservingInterviewedEnd: ["show", true],
    mixing: ["refuse", false],
  });
  const mixing = resultOf(run).baselines.find(({ baseline }) => baseline === "mixing");
  expect(mixing?.reasons).toEqual(["no_attribute"]);
  expect(measureOf(run, "transitivity").baselines.gnm?.pUpper).toBeLessThan(0.02);
  // With everyone interviewed the simulated interviews are G(n, p): the mean degree varies about c.
  expect(measureOf(run, "meanDegree").baselines.traced?.mean).toBeCloseTo(156 / 34, 0);
});

test("a run again on the stored input has the same result, whatever was recorded since", async () => {
  const first = await compareNow(complete, { attribute: "area", seed: 12345678901 });
  const other = await compareNow(complete, { attribute: "area", seed: 2 });
  expect(other.result).not.toEqual(first.result);
  const { base, client } = complete;
  const made = await client.post(`${base}/people`, { name: "Late Comer", area: "North" });
  expect(made.status).toBe(201);
  const asked = await client.post(`${base}/compare/runs/${first.id}/again`);
  expect([asked.status, Object.keys(asked.body)]).toEqual([201, ["id"]]);
  const second = await ended(complete, asked.body.id);
  expect(second).toMatchObject({ state: "ready", people: 34, seed: 12345678901 });
  expect(JSON.stringify(second.result)).toBe(JSON.stringify(first.result));
  expect(second.cutOff).toBe(first.cutOff);
  expect((await compareNow(complete)).people).toBe(35);
}, 60_000);

test("a star has no other network with its degrees, and says so", async () => {
  const member = await signInAs(app, "epidemiologist", await buildInvestigation(app));
  const owner = await signInAs(app, "supervisor", member.investigationId);
  const links = Array.from({ length: 6 }, (_, k) => [0, k + 1] as const);
  await bringInNetwork(owner, { n: 7, links });
  const run = await compareNow(member);
  const kept = resultOf(run).baselines.find(({ baseline }) => baseline === "degreePreserving");
  expect(kept).toMatchObject({ standing: "refuse", drawn: false, reasons: ["only_graph"] });
  expect(run.by).toBeNull();
});
