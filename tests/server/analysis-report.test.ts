import { afterAll, beforeAll, describe, expect, inject, it } from "vitest";
import { type Analysis, createAnalysis } from "../../server/analysis/analysis.ts";
import { createPools, endPools, type Pools } from "../../server/db/pools.ts";
import { type SummaryQuery, summaryAnswer, summaryQuery } from "../../shared/contracts/network.ts";
import {
  karate,
  lesMiserables,
  type PublishedNetwork,
} from "../core/support/published-networks.ts";
import { createTestDatabase, TEST_PASSWORDS, type TestDatabase } from "../support/database.ts";
import { StoredGraph } from "../support/stored-graph.ts";

const SETTINGS = {
  timeZone: "Pacific/Auckland",
  populationAtRisk: null,
  infectiousBefore: 2,
  infectiousAfter: 10,
};

let database: TestDatabase;
let pools: Pools;
let analysis: Analysis;

beforeAll(async () => {
  database = await createTestDatabase(inject("adminUrl"));
  pools = createPools(database.adminUrl, TEST_PASSWORDS, () => {});
  analysis = createAnalysis({ pools, log: { error: () => {} } });
});

afterAll(async () => {
  await analysis.stop();
  await endPools(pools);
  await database.drop();
});

async function summary(
  graph: StoredGraph,
  query: Partial<Record<keyof SummaryQuery, string>> = {},
  settings: Partial<typeof SETTINGS> | { populationAtRisk: number } = {},
) {
  const answer = await analysis.summary(graph.id, summaryQuery.parse(query), {
    ...SETTINGS,
    ...settings,
  });
  return summaryAnswer.parse(answer);
}

async function storeNetwork(network: PublishedNetwork): Promise<StoredGraph> {
  const graph = await StoredGraph.make(database.adminUrl);
  const ids = await graph.people(Array.from({ length: network.n }, () => ({})));
  const at = (person: number) => ids[person] ?? "";
  await graph.tellings(network.links.map(([u, v]) => ({ a: at(u), b: at(v) })));
  await graph.changed({ kind: "bulk" });
  return graph;
}

describe("complete networks without days", () => {
  it("gives the karate club's figures", async () => {
    const graph = await storeNetwork(karate());
    const found = await summary(graph);
    // methods C.2.3 and C.6.5
    expect(found).toMatchObject({
      people: 34,
      pairs: 78,
      population: "all",
      n: 34,
      from: null,
      to: null,
      window: "preset",
      undated: 78,
      coverage: 1,
      isolates: 0,
    });
    expect(found.threshold.population).toBe("complete");
    expect(found.threshold.pairsPerPerson).toBeCloseTo(4.588235294118, 11);
    expect(found.threshold.pairsPerPersonInterval?.[0]).toBeCloseTo(3.724189049823, 11);
    expect(found.threshold.pairsPerPersonInterval?.[1]).toBeCloseTo(5.614304183473, 11);
    expect(found.threshold.verdict).toBe("above");
    expect(found.transitivity).toBeCloseTo(45 / 176, 12);
    await graph.close();
  });

  it("gives the figures of Les Misérables", async () => {
    const graph = await storeNetwork(lesMiserables());
    const found = await summary(graph);
    expect(found).toMatchObject({ people: 77, pairs: 254, componentSizes: [77] });
    expect(found.meanDegree).toBeCloseTo(6.597402597403, 11);
    expect(found.transitivity).toBeCloseTo(0.498931623932, 11);
    expect(found.threshold.verdict).toBe("above");
    const free = await summary(graph, { from: "2026-01-01", to: "2026-02-01" });
    expect(free).toMatchObject({ pairs: 0, undated: 254, window: "free" });
    expect(free.threshold.verdict).toBeNull();
    expect(free.reasons["threshold.verdict"]).toBe("free_range");
    await graph.close();
  });
});

/** People numbered by position, the first `interviewed` of them with a complete interview. */
async function storeTraced(
  people: number,
  interviewed: number,
  population: number | null,
): Promise<{ graph: StoredGraph; ids: string[] }> {
  const graph = await StoredGraph.make(database.adminUrl, { population });
  const ids = await graph.people(
    Array.from({ length: people }, (_, k) => ({
      classification: k < interviewed ? "confirmed" : "contact",
      interviewed: k < interviewed ? "yes" : "no",
      recordedAt: "2026-03-01T00:00:00Z",
    })),
  );
  for (const id of ids.slice(0, interviewed)) {
    await graph.interview(id, "complete", "2026-03-02T00:00:00Z");
  }
  return { graph, ids };
}

describe("networks known from interviews", () => {
  it("reproduces the fixture of 100 interviewed among 1,000", async () => {
    const { graph, ids } = await storeTraced(500, 100, 1000);
    const at = (k: number) => ids[k] ?? "";
    // 475 pairs with an interviewed end: 75 among interviewed people, 400 to others; and 20 pairs
    // that no interview could have told of.
    const pairs = [
      ...Array.from({ length: 75 }, (_, k) => [k, k + 25] as const),
      ...Array.from({ length: 400 }, (_, k) => [k % 100, 100 + k] as const),
      ...Array.from({ length: 20 }, (_, k) => [100 + k, 200 + k] as const),
    ];
    await graph.tellings(pairs.map(([u, v]) => ({ a: at(u), b: at(v), namedBy: at(u) })));
    await graph.changed({ kind: "bulk" });
    const all = await summary(graph, {}, { populationAtRisk: 1000 });
    expect(all).toMatchObject({
      people: 500,
      pairs: 495,
      n: 1000,
      interviewed: 100,
      coverage: 0.1,
    });
    // methods, box of C.8
    expect(all.threshold.pairsPerPerson).toBeCloseTo(4.997630331754, 11);
    expect(all.threshold.pairsPerPersonInterval?.[0]).toBeCloseTo(4.568890972301, 11);
    expect(all.threshold.pairsPerPersonInterval?.[1]).toBeCloseTo(5.466380931629, 11);
    expect(all.threshold.verdict).toBeNull();
    expect(all.reasons["threshold.verdict"]).toBe("coverage_low");

    const told = await summary(graph, { population: "interviewed" }, { populationAtRisk: 1000 });
    expect(told).toMatchObject({ people: 100, pairs: 75, n: 1000 });
    expect(told.threshold.pairsPerPerson).toBe(all.threshold.pairsPerPerson);
    expect(told.threshold.verdict).toBe("above");
    // 2 × 75 ends among themselves, 400 to others.
    expect(told.meanDegreeInterviewed).toBeCloseTo(5.5, 12);

    const cases = await summary(graph, { population: "cases" }, { populationAtRisk: 1000 });
    expect(cases).toMatchObject({ people: 100, pairs: 75, n: 100, coverage: 1 });
    await graph.close();
  });

  it("takes recall from pairs told of by both ends", async () => {
    const { graph, ids } = await storeTraced(40, 40, null);
    const at = (k: number) => ids[k] ?? "";
    // methods C.8.2: a = 6, b = 4 gives 0.75
    for (let k = 0; k < 10; k++) {
      const told = { a: at(2 * k), b: at(2 * k + 1) };
      await graph.tellings([{ ...told, namedBy: told.a }]);
      if (k < 6) await graph.tellings([{ ...told, namedBy: told.b }]);
    }
    await graph.changed({ kind: "bulk" });
    const found = await summary(graph, { population: "interviewed" });
    expect(found.pairs).toBe(10);
    expect(found.threshold.recall).toBe(0.75);
    await graph.close();
  });

  it("counts the last 13 days up to the cut-off, and undated tellings only without a range", async () => {
    const { graph, ids } = await storeTraced(6, 2, null);
    const [a, b, c, d, e, f] = ids as [string, string, string, string, string, string];
    const recordedAt = "2026-03-05T00:00:00Z";
    await graph.tellings([
      // Auckland's 20 March is the cut-off: the window is 8 to 20 March.
      { a, b, first: "2026-03-08", last: "2026-03-08", recordedAt },
      { a, b: c, first: "2026-03-01", last: "2026-03-07", recordedAt },
      { a, b: d, first: "2026-03-02", last: "2026-03-08", recordedAt },
      { a, b: e, first: "2026-03-20", last: null, recordedAt },
      { a, b: f, first: "2026-03", last: "unknown", recordedAt },
      { a: b, b: f, first: "2026-03-21", last: "2026-03-21", recordedAt },
    ]);
    await graph.changed({ kind: "bulk" });
    const found = await summary(graph, { asOf: "2026-03-20" });
    expect(found).toMatchObject({
      pairs: 3,
      undated: 1,
      from: "2026-03-08",
      to: "2026-03-20",
      asOf: "2026-03-20",
      cutOff: "2026-03-20T11:00:00.000Z",
    });
    expect(await summary(graph, { asOf: "2026-03-20", window: "all" })).toMatchObject({
      pairs: 6,
      from: null,
      to: null,
    });
    const free = await summary(graph, { from: "2026-03-21", asOf: "2026-03-20" });
    expect(free).toMatchObject({ pairs: 1, from: "2026-03-21", to: null, window: "free" });
    await graph.close();
  });

  it("answers as the record stood: entries, withdrawals, interviews and classification", async () => {
    const graph = await StoredGraph.make(database.adminUrl);
    const early = "2026-03-01T00:00:00Z";
    const [a, b, c] = (await graph.people([
      { recordedAt: early },
      { recordedAt: early },
      { recordedAt: "2026-03-10T12:00:00Z" },
    ])) as [string, string, string];
    await graph.classify(a, "suspected", "2026-03-02T00:00:00Z");
    await graph.classify(a, "not_a_case", "2026-03-08T00:00:00Z");
    await graph.interview(a, "complete", "2026-03-05T00:00:00Z");
    const dated = { first: "2026-03-01", last: "2026-03-12" };
    await graph.tellings([{ a, b, ...dated, recordedAt: "2026-03-05T00:00:00Z" }]);
    await graph.tellings([{ a, b: c, ...dated, recordedAt: "2026-03-10T12:00:00Z" }]);
    await graph.withdraw(a, b);
    await graph.changed({ kind: "bulk" });
    const at = (asOf: string, population = "all") => summary(graph, { asOf, population });
    expect(await at("2026-03-04T23:59:59.999Z")).toMatchObject({ people: 2, pairs: 0 });
    expect(await at("2026-03-05T00:00:00Z")).toMatchObject({ pairs: 1, interviewed: 1 });
    // Auckland's 10 March ends at 11:00 UTC, an hour before the third person was entered.
    expect(await at("2026-03-10")).toMatchObject({ people: 2, pairs: 1 });
    expect(await at("2026-03-11")).toMatchObject({ people: 3, pairs: 2 });
    expect(await at("2026-03-07", "cases")).toMatchObject({ people: 1 });
    expect(await at("2026-03-09", "cases")).toMatchObject({ people: 0 });
    expect(await summary(graph, { window: "all" })).toMatchObject({ people: 3, pairs: 1 });
    await graph.close();
  });

  it("gives a trail whose days are what was asked as of those days", async () => {
    const { graph, ids } = await storeTraced(40, 35, null);
    const at = (k: number) => ids[k] ?? "";
    for (let day = 1; day <= 20; day++) {
      const text = `2026-03-${String(day).padStart(2, "0")}`;
      await graph.tellings([
        { a: at(day), b: at(day + 12), first: text, last: text, recordedAt: `${text}T20:00:00Z` },
      ]);
    }
    await graph.changed({ kind: "bulk" });
    const found = await summary(graph, { asOf: "2026-03-20" });
    expect(found.trail.map(({ day }) => day)).toHaveLength(14);
    expect(found.trail[0]?.day).toBe("2026-03-07");
    expect(found.trail.at(-1)?.day).toBe("2026-03-20");
    for (const { day, pairsPerPerson } of found.trail) {
      const then = await summary(graph, { asOf: day });
      expect(pairsPerPerson).toBe(then.threshold.pairsPerPerson);
    }
    expect(new Set(found.trail.map((point) => point.pairsPerPerson)).size).toBeGreaterThan(3);
    await graph.close();
  });

  it("says nothing of a threshold where nobody was interviewed and nothing was imported", async () => {
    const graph = await StoredGraph.make(database.adminUrl);
    await graph.people(Array.from({ length: 40 }, () => ({ classification: "suspected" })));
    await graph.changed({ kind: "bulk" });
    const found = await summary(graph);
    expect(found).toMatchObject({ people: 40, pairs: 0, interviewed: 0, coverage: 0 });
    expect(found.threshold.verdict).toBeNull();
    expect(found.threshold.pairsPerPerson).toBeNull();
    const empty = await StoredGraph.make(database.adminUrl);
    expect(await summary(empty)).toMatchObject({ people: 0, meanDegree: null, coverage: null });
    await graph.close();
    await empty.close();
  });

  it("ignores a declared population that the record has outgrown", async () => {
    const { graph, ids } = await storeTraced(40, 35, 10);
    await graph.tellings([{ a: ids[0] ?? "", b: ids[1] ?? "", namedBy: ids[0] ?? "" }]);
    await graph.changed({ kind: "bulk" });
    expect(await summary(graph, {}, { populationAtRisk: 10 })).toMatchObject({ n: 40 });
    await graph.close();
  });
});
