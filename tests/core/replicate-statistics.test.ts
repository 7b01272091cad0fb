import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  buildGraph,
  components,
  degreeCounts,
  HEAVY_STATISTICS,
  isolates,
  observedRow,
  STATISTICS,
  type Statistic,
  transitivity,
  triangles,
} from "../../shared/core/index.ts";
import { contactSets, endsOf, type Links, randomLinks } from "./support/graphs.ts";
import { HAND_GRAPHS } from "./support/hand-graphs.ts";
import { networkOf } from "./support/null-models.ts";
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
    expect(found.attributeModularity).toBeCloseTo(5 / 14, 14);
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

describe("figures that need a graph", () => {
  const heavy = (n: number, links: Links) => {
    const statistics = HEAVY_STATISTICS;
    const choice = { statistics, degreeBins: 0, sizeBins: 0, attribute: null };
    return Array.from(observedRow(choice, networkOf(n, links)), (value) => value);
  };

  it("of the karate club and of two triangles with a bridge", () => {
    // Source: methods C.6.5 (networkx 2.8.8 and igraph 0.10.2) and D.3 (exact).
    const { n, links } = karate();
    const known = [2.408199643494, 5, 1, Number.NaN, 231.071428571429, 4, 1, 1, 0.419789612097];
    const found = heavy(n, links);
    known.forEach((value, at) => {
      if (!Number.isNaN(value)) expect(found[at]).toBeCloseTo(value, 11);
    });
    const h4 = HAND_GRAPHS[3] ?? { n: 0, links: [] };
    const exact = [9 / 5, 3, 1, 31 / 45, 6, 2, 2, 1, 5 / 14];
    heavy(h4.n, h4.links).forEach((value, at) => {
      expect(value).toBeCloseTo(exact[at] ?? 9, 13);
    });
  });

  it("are undefined or 0 where there is nobody", () => {
    const nan = Number.NaN;
    expect(heavy(0, [])).toEqual([nan, nan, nan, nan, nan, nan, 0, 0, nan]);
  });
});
