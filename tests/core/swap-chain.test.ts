import { describe, expect, it } from "vitest";
import {
  buildGraph,
  components,
  createStream,
  degreePreservingSampler,
  onlyGraph,
  SwapChain,
  triangles,
} from "../../shared/core/index.ts";
import { endsOf, graphOf, type Links, linksOf } from "./support/graphs.ts";
import { HAND_GRAPHS } from "./support/hand-graphs.ts";
import { chiLimit, chiSquared, degreesOf, everyGraph, keyOf } from "./support/null-models.ts";
import { karate } from "./support/published-networks.ts";

/** The graphs a chain visits, with how often, thinned. */
function visit(n: number, links: Links, flags: Uint8Array | null, draws: number, thin: number) {
  const chain = new SwapChain(n, endsOf(links), links.length, flags);
  const random = createStream(31, n);
  chain.run(100 * links.length, random);
  const counts = new Map<string, number>();
  const graphs = new Map<string, { connected: boolean; triangles: number }>();
  for (let k = 0; k < draws; k++) {
    chain.run(thin, random);
    const key = keyOf(chain.pairs());
    counts.set(key, (counts.get(key) ?? 0) + 1);
    if (graphs.has(key)) continue;
    const graph = buildGraph(n, chain.pairs());
    graphs.set(key, {
      connected: components(graph).sizes.length === 1,
      triangles: triangles(graph),
    });
  }
  return { counts, graphs: [...graphs.values()] };
}

describe("graphs with given degrees come up alike", () => {
  // Source: methods C.7.3, counts of all graphs with these degrees (exact).
  it("(2,2,2,2,2,2): 60 rings of six and 10 pairs of triangles", () => {
    const { counts, graphs } = visit(6, linksOf("01 12 23 34 45 05"), null, 14_000, 60);
    expect(graphs.length).toBe(70);
    expect(graphs.filter(({ connected }) => !connected).length).toBe(10);
    expect(chiSquared(counts, 70)).toBeLessThan(chiLimit(69));
  });

  it("(3,2,2,2,1): six graphs, all connected, three of them with a triangle", () => {
    const { counts, graphs } = visit(5, linksOf("01 02 03 12 34"), null, 6000, 60);
    expect(graphs.map((graph) => graph.triangles).sort()).toEqual([0, 0, 0, 1, 1, 1]);
    expect(graphs.every(({ connected }) => connected)).toBe(true);
    expect(chiSquared(counts, 6)).toBeLessThan(chiLimit(5));
  });

  it("(3,3,2,2,1,1): 17 graphs, 16 connected, triangles 0, 1, 2 in 6, 10, 1", () => {
    const { counts, graphs } = visit(6, linksOf("01 02 03 12 14 35"), null, 8000, 60);
    const found = [0, 1, 2].map((t) => graphs.filter((graph) => graph.triangles === t).length);
    expect(found).toEqual([6, 10, 1]);
    expect(graphs.filter(({ connected }) => connected).length).toBe(16);
    expect(chiSquared(counts, 17)).toBeLessThan(chiLimit(16));
  });

  it("independent restarts are uniform too: a seventh of the rings of six falls apart", () => {
    const sampler = degreePreservingSampler(6, endsOf(linksOf("01 12 23 34 45 05")), 6, null);
    const draws = 3000;
    let apart = 0;
    for (let i = 0; i < draws; i++) {
      const { a, b, length } = sampler.sample(createStream(32, i));
      if (components(buildGraph(6, { a, b }, length)).sizes.length > 1) apart++;
    }
    const se = Math.sqrt(((1 / 7) * (6 / 7)) / draws);
    expect(Math.abs(apart / draws - 1 / 7)).toBeLessThan(4 * se);
  });
});

/** Every graph on five people, with and without an interviewed end to each pair. */
const FIVE = [...everyGraph(5)].map((links) => ({ links, degrees: degreesOf(5, links).join() }));
const SUBSETS = Array.from({ length: 32 }, (_, mask) =>
  Uint8Array.from({ length: 5 }, (_, u) => (mask >>> u) & 1),
);

describe("pairs that keep an interviewed end", () => {
  const allowed = (links: Links, flags: Uint8Array) =>
    links.every(([u, v]) => flags[u] === 1 || flags[v] === 1);

  it("reaches every such graph on five people, whoever was interviewed", () => {
    // Full enumeration (exact). People are alike, so who was interviewed matters by number only.
    for (const flags of [31, 15, 7, 3, 1].map((mask) => SUBSETS[mask] ?? new Uint8Array(5))) {
      const classes = new Map<string, Links[]>();
      for (const { links, degrees } of FIVE) {
        if (allowed(links, flags)) classes.set(degrees, [...(classes.get(degrees) ?? []), links]);
      }
      for (const graphs of classes.values()) {
        const [start = []] = graphs;
        if (graphs.length === 1) continue;
        const wanted = new Set(
          graphs.map((links) => keyOf({ ...endsOf(links), length: links.length })),
        );
        const chain = new SwapChain(5, endsOf(start), start.length, flags);
        const random = createStream(33, wanted.size);
        const seen = new Set([keyOf(chain.pairs())]);
        for (let k = 0; k < 400 * wanted.size && seen.size < wanted.size; k++) {
          chain.run(1, random);
          seen.add(keyOf(chain.pairs()));
        }
        expect(seen).toEqual(wanted);
      }
    }
  });

  it("gives them equal chances", () => {
    const start = linksOf("01 02 13 24 15");
    const flags = Uint8Array.from([1, 1, 1, 0, 0, 0]);
    const degrees = degreesOf(6, start).join();
    const wanted = [...everyGraph(6)].filter(
      (links) => allowed(links, flags) && degreesOf(6, links).join() === degrees,
    );
    expect(wanted.length).toBeGreaterThan(10);
    const { counts } = visit(6, start, flags, 400 * wanted.length, 50);
    expect(counts.size).toBe(wanted.length);
    expect(chiSquared(counts, wanted.length)).toBeLessThan(chiLimit(wanted.length - 1));
  });

  it("refuses a pair between two people who were not interviewed", () => {
    expect(() => new SwapChain(2, endsOf([[0, 1]]), 1, new Uint8Array(2))).toThrow(/interviewed/);
  });
});

describe("onlyGraph", () => {
  it("agrees with enumeration on all graphs of five people and all sets of interviewed", () => {
    for (const flags of [null, ...SUBSETS]) {
      const ok = ({ links }: { links: Links }) =>
        flags === null || links.every(([u, v]) => flags[u] === 1 || flags[v] === 1);
      const graphs = FIVE.filter(ok);
      const alike = new Map<string, number>();
      for (const { degrees } of graphs) alike.set(degrees, (alike.get(degrees) ?? 0) + 1);
      const wrong = graphs.filter(
        ({ links, degrees }) => onlyGraph(graphOf(5, links), flags) !== (alike.get(degrees) === 1),
      );
      expect(wrong).toEqual([]);
    }
  });

  it("knows the hand graphs", () => {
    // Source: methods C.7.3 and D.3: the paw and the star are threshold graphs.
    const only = HAND_GRAPHS.filter(({ n, links }) => onlyGraph(graphOf(n, links), null));
    expect(only.map(({ name }) => name)).toEqual(["H2 paw", "H5 star"]);
    expect(onlyGraph(graphOf(4, linksOf("01 02 03 12 13 23")), null)).toBe(true);
    expect(onlyGraph(graphOf(0, []), null)).toBe(true);
    expect(onlyGraph(graphOf(3, linksOf("01")), null)).toBe(true);
  });
});

describe("a chain", () => {
  it("keeps degrees and simple graphs, counts what it accepts, and starts over", () => {
    const { n, links } = karate();
    const chain = new SwapChain(n, endsOf(links), links.length, null);
    const accepted = chain.run(20_000, createStream(34, 0));
    // Source: methods C.7.5, "acceptance about 0.40–0.41 by convention".
    expect(accepted / 20_000).toBeGreaterThan(0.35);
    expect(accepted / 20_000).toBeLessThan(0.45);
    const graph = buildGraph(n, chain.pairs());
    expect(graph.m).toBe(78);
    const degrees = Array.from(
      { length: n },
      (_, u) => (graph.offsets[u + 1] ?? 0) - (graph.offsets[u] ?? 0),
    );
    expect(degrees).toEqual(degreesOf(n, links));
    chain.reset();
    expect(keyOf(chain.pairs())).toBe(keyOf({ ...endsOf(links), length: links.length }));
  });

  it("stands still on the paw, the star and fewer than two pairs", () => {
    for (const links of [linksOf("01 02 12 23"), linksOf("01 02 03 04 05"), linksOf("01"), []]) {
      const chain = new SwapChain(6, endsOf(links), links.length, null);
      expect(chain.run(2000, createStream(35, 0))).toBe(0);
      expect(chain.length).toBe(links.length);
    }
  });

  it("refuses repeated and self pairs", () => {
    expect(
      () =>
        new SwapChain(
          2,
          endsOf([
            [0, 1],
            [1, 0],
          ]),
          2,
          null,
        ),
    ).toThrow(/twice/);
    expect(() => new SwapChain(2, endsOf([[1, 1]]), 1, null)).toThrow(RangeError);
  });
});
