import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  buildGraph,
  components,
  degreeCounts,
  isolates,
  observedRow,
  type ReplicatePlan,
  replicateRange,
  STATISTICS,
  type Statistic,
  transitivity,
  triangles,
} from "../../shared/core/index.ts";
import { contactSets, endsOf, type Links, randomLinks } from "./support/graphs.ts";
import { HAND_GRAPHS } from "./support/hand-graphs.ts";
import { meanOf, networkOf } from "./support/null-models.ts";
import { florentine, karate, lesMiserables } from "./support/published-networks.ts";

/** All figures of a network by name. */
function figures(n: number, links: Links, attribute: Int32Array | null = null, flags?: Uint8Array) {
  const choice = { statistics: STATISTICS, degreeBins: 0, sizeBins: 0, attribute };
  const row = observedRow(choice, networkOf(n, links, flags ?? null));
  return Object.fromEntries(STATISTICS.map((name, at) => [name, row[at] ?? 0])) as Record<
    Statistic,
    number
  >;
}

describe("figures of the hand graphs", () => {
  // Source: methods D.3 (exact).
  const CLUSTERING = [0, 7 / 12, 1 / 2, 7 / 9, 0, 3 / 8, 1 / 2];
  const ASSORTATIVITY = [-1 / 2, -5 / 7, 1, -1 / 6, -1, Number.NaN, -1 / 3];
  it.each(HAND_GRAPHS.map((graph, at) => ({ graph, at })))("$graph.name", ({ graph, at }) => {
    const found = figures(graph.n, graph.links);
    const [largest = 0, ...small] = graph.groups;
    expect(found.people).toBe(graph.n);
    expect(found.pairs).toBe(graph.links.length);
    expect(found.groups).toBe(graph.groups.length);
    expect(found.largestGroup).toBe(largest);
    expect(found.triangles).toBe(graph.triangles);
    expect(found.transitivity).toBeCloseTo(graph.transitivity, 14);
    expect(found.meanDegree).toBeCloseTo(graph.c, 14);
    expect(found.averageClustering).toBeCloseTo(CLUSTERING[at] ?? 9, 14);
    const r = ASSORTATIVITY[at] ?? 9;
    if (Number.isNaN(r)) expect(found.degreeAssortativity).toBeNaN();
    else expect(found.degreeAssortativity).toBeCloseTo(r, 14);
    const squares = graph.groups.reduce((sum, size) => sum + size * size, 0);
    expect(found.sizeSquares).toBeCloseTo(squares / graph.n, 14);
    const others = small.reduce((sum, size) => sum + size, 0);
    expect(found.meanSmallGroup).toBe(others / small.length);
    expect(found.meanSmallGroupOfPerson).toBe((squares - largest * largest) / others);
    const spread = graph.sumOfSquares - graph.n * graph.c * graph.c;
    expect(found.degreeVariance).toBeCloseTo(spread / (graph.n - 1), 13);
  });
});

describe("figures of known networks", () => {
  // Source: methods C.6.5 (networkx 2.8.8 and igraph 0.10.2): transitivity, average clustering,
  // assortativity.
  it.each([
    ["karate", karate(), 0.255681818182, 0.570638478208, -0.475613097685],
    ["Les Misérables", lesMiserables(), 0.498931623932, 0.573136749932, -0.165225134422],
    ["Florentine", florentine(), 9 / 47, 0.16, -0.374837872892],
  ] as const)("%s", (_, { n, links }, closed, clustering, assortativity) => {
    const found = figures(n, links);
    expect(found.transitivity).toBeCloseTo(closed, 11);
    expect(found.averageClustering).toBeCloseTo(clustering, 11);
    expect(found.degreeAssortativity).toBeCloseTo(assortativity, 11);
  });
});

describe("mixing by an attribute", () => {
  it("of two triangles with a bridge", () => {
    // Source: methods C.5.3 (exact) r = 5/7; best Q of D.3: 5/14; 6 pairs inside, 1 across.
    const h4 = HAND_GRAPHS[3] ?? { n: 0, links: [] };
    const found = figures(h4.n, h4.links, Int32Array.of(0, 0, 0, 1, 1, 1));
    expect(found.attributeAssortativity).toBeCloseTo(5 / 7, 14);
    expect(found.modularity).toBeCloseTo(5 / 14, 14);
    expect(found.ei).toBeCloseTo(-5 / 7, 14);
  });

  it("leaves out pairs with a missing value, and is undefined in one class", () => {
    const links: Links = [
      [0, 1],
      [1, 2],
      [2, 3],
    ];
    const found = figures(4, links, Int32Array.of(0, 0, -1, 1));
    expect([found.ei, found.attributeAssortativity]).toEqual([-1, Number.NaN]);
    expect(figures(4, links, Int32Array.of(-1, 0, -1, 1)).ei).toBeNaN();
  });
});

describe("against slower ways", () => {
  it("agrees with the measures of the core and with sets on random networks", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 60 }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.nat(10_000),
        (n, p, seed) => {
          const links = randomLinks(n, p * p, seed);
          const graph = buildGraph(n, endsOf(links));
          const { sizes } = components(graph);
          const found = figures(n, links);
          expect(found.groups).toBe(sizes.length);
          expect(found.largestGroup).toBe(sizes[0] ?? 0);
          expect(found.isolates).toBe(isolates(graph));
          expect(found.triangles).toBe(triangles(graph));
          expect(found.transitivity).toBe(transitivity(graph).value ?? Number.NaN);
          let clustering = 0;
          const all = contactSets(n, links);
          for (const mine of all) {
            const list = [...mine];
            const choices = (list.length * (list.length - 1)) / 2;
            let closed = 0;
            for (const u of list) for (const v of list) if (u < v && all[u]?.has(v)) closed++;
            if (choices > 0) clustering += closed / choices;
          }
          if (n > 0) expect(found.averageClustering).toBeCloseTo(clustering / n, 12);
        },
      ),
      { seed: 20261203, numRuns: 25 },
    );
  });

  it("finds the triangles of a hub with 3000 contacts and of the complete graph on 70", () => {
    const hub: [number, number][] = [];
    for (let v = 1; v <= 3000; v++) hub.push([0, v]);
    for (let v = 1; v < 3000; v += 2) hub.push([v, v + 1]);
    expect(figures(3001, hub).triangles).toBe(1500);
    const complete = randomLinks(70, 2, 1);
    const found = figures(70, complete);
    expect([found.triangles, found.averageClustering]).toEqual([(70 * 69 * 68) / 6, 1]);
  });

  it("takes degrees among interviewed people and counts both curves", () => {
    const links: Links = [
      [0, 1],
      [0, 2],
      [0, 3],
      [4, 1],
    ];
    const flags = Uint8Array.of(1, 0, 0, 0, 1, 0, 1);
    const choice = {
      statistics: ["meanDegree", "degreeVariance", "maxDegree"] as const,
      degreeBins: 3,
      sizeBins: 3,
      attribute: null,
    };
    const row = observedRow(choice, networkOf(7, links, flags));
    // Interviewed: 0 with three pairs, 4 with one, 6 with none. Groups: 5, 1, 1.
    expect([...row]).toEqual([4 / 3, 7 / 3, 3, 1, 1, 1, 2, 0, 1]);
    const everyone = observedRow({ ...choice, degreeBins: 4 }, networkOf(7, links));
    const graph = buildGraph(7, endsOf(links));
    expect([...everyone.subarray(3, 7)]).toEqual([...degreeCounts(graph)]);
  });

  it("says NaN, not 0, where there is nothing", () => {
    const none = figures(0, []);
    expect([none.people, none.pairs, none.groups, none.isolates]).toEqual([0, 0, 0, 0]);
    for (const name of ["meanDegree", "transitivity", "degreeAssortativity", "ei"] as const) {
      expect(none[name]).toBeNaN();
    }
    expect(figures(1, []).degreeVariance).toBeNaN();
    expect(figures(3, [[0, 1]]).meanSmallGroup).toBe(1);
  });
});

describe("karate club against its baselines", () => {
  // Source: methods C.7.5, own simulation of 4000 replicates: mean (SE), sd.
  const clubs = Int32Array.from({ length: 34 }, (_, u) =>
    [0, 1, 2, 3, 4, 5, 6, 7, 8, 10, 11, 12, 13, 16, 17, 19, 21].includes(u) ? 0 : 1,
  );
  const { n, links } = karate();
  const names: Statistic[] = [
    "transitivity",
    "triangles",
    "averageClustering",
    "degreeAssortativity",
    "largestGroup",
    "maxDegree",
    "modularity",
  ];
  const gnm = [
    [0.13567, 0.00048],
    [15.573, 0.06],
    [0.13359, 0.00059],
    [-0.06788, 0.0016],
    [33.786, 0.0074],
    [9.012, 0.017],
    [-0.01737, 0.00085],
  ];
  const kept = [
    [0.22354, 0.00041],
    [39.344, 0.072],
    [0.35599, 0.00082],
    [-0.30184, 0.00077],
    [34, 0.002],
    [17, 0],
    [-0.01898, 0.00075],
  ];
  const runs = [
    { name: "G(n,m)", model: { kind: "gnm", n, m: 78 } as const, table: gnm },
    {
      name: "degrees kept",
      model: {
        kind: "degreePreserving",
        n,
        pairs: endsOf(links),
        isInterviewed: null,
        proposalsPerPair: 100,
      } as const,
      table: kept,
    },
  ];
  it.each(runs)("$name", ({ model, table }) => {
    const plan: ReplicatePlan = {
      seed: 75,
      model,
      statistics: names,
      degreeBins: 0,
      sizeBins: 0,
      attribute: clubs,
    };
    const columns: number[][] = names.map(() => []);
    replicateRange(plan, 0, 1500, (_, row) => {
      for (const [at, value] of row.entries()) columns[at]?.push(value);
      return true;
    });
    table.forEach(([mean = 0, se = 0], at) => {
      const own = meanOf(columns[at] ?? []);
      expect(Math.abs(own.mean - mean), names[at]).toBeLessThanOrEqual(4 * Math.hypot(own.se, se));
    });
  });

  it("is extreme against random mixing and ordinary once degrees are kept", () => {
    const upper = runs.map(({ model }) => {
      const plan: ReplicatePlan = {
        seed: 74,
        model,
        statistics: ["transitivity"],
        degreeBins: 0,
        sizeBins: 0,
        attribute: null,
      };
      let atLeast = 0;
      replicateRange(plan, 0, 999, (_, row) => {
        if ((row[0] ?? 0) >= 45 / 176) atLeast++;
        return true;
      });
      return (atLeast + 1) / 1000;
    });
    expect(upper[0]).toBeLessThan(0.005);
    // 4000 replicates gave 0.130; 4 SE of 999 and 4000 together are 0.048.
    expect(Math.abs((upper[1] ?? 0) - 0.13)).toBeLessThan(0.048);
  });

  it("observed values are those of the table", () => {
    const found = figures(n, links, clubs);
    expect(found.modularity).toBeCloseTo(0.358234714004, 11);
    // Source: methods C.5.3 (networkx = igraph).
    expect(found.attributeAssortativity).toBeCloseTo(0.717530864198, 11);
    expect(found.ei).toBeCloseTo(-0.717948717949, 11);
    expect(found.maxDegree).toBe(17);
  });
});
