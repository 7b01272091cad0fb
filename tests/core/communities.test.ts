import fc from "fast-check";
import Graph from "graphology";
import theirModularity from "graphology-metrics/graph/modularity.js";
import { describe, expect, it } from "vitest";
import {
  communities,
  communitySearch,
  components,
  connectedParts,
  FEWEST_STARTS,
  inducedSubgraph,
  modularity,
} from "../../shared/core/index.ts";
import { graphOf, type Links, linksOf, randomLinks } from "./support/graphs.ts";
import { HAND_STRUCTURES } from "./support/hand-structure.ts";
import { beside, moved, networks, RUN, relabelled } from "./support/networks.ts";
import {
  davis,
  florentine,
  karate,
  karateClubs,
  lesMiserables,
  miserablesGroups,
} from "./support/published-networks.ts";

const SEED = 20260301;
const membershipOf = (n: number, sets: readonly (readonly number[])[]) => {
  const membership = new Int32Array(n);
  sets.forEach((set, label) => {
    for (const u of set) membership[u] = label;
  });
  return membership;
};

/** Every way to part n people into groups, as labels (restricted growth strings). */
function* partitions(n: number): Generator<Int32Array> {
  const labels = new Int32Array(n);
  const highest = new Int32Array(n + 1);
  for (;;) {
    yield labels;
    let at = n - 1;
    while (at > 0 && labels[at] === (highest[at] ?? 0) + 1) at--;
    if (at <= 0) return;
    labels[at] = (labels[at] ?? 0) + 1;
    labels.fill(0, at + 1);
    for (let k = at + 1; k <= n; k++) {
      highest[k] = Math.max(highest[k - 1] ?? 0, labels[k - 1] ?? 0);
    }
  }
}

/** The highest modularity there is, by trying every partition. */
function highestModularity(n: number, links: Links): number {
  const graph = graphOf(n, links);
  let best = Number.NEGATIVE_INFINITY;
  for (const labels of partitions(n)) best = Math.max(best, modularity(graph, labels).value ?? -1);
  return best;
}

describe("modularity of a stated partition", () => {
  // Source: methods C.6.5, networkx 2.8.8 and python-igraph 0.10.2.
  it("is that of networkx and igraph", () => {
    const club = karate();
    expect(modularity(graphOf(club.n, club.links), karateClubs()).value).toBeCloseTo(
      0.358234714004,
      11,
    );
    const novel = lesMiserables();
    expect(modularity(graphOf(novel.n, novel.links), miserablesGroups()).value).toBeCloseTo(
      0.538068076136,
      11,
    );
    const { n, links } = davis();
    const sides = Int32Array.from({ length: n }, (_, u) => (u < 18 ? 0 : 1));
    expect(modularity(graphOf(n, links), sides).value).toBeCloseTo(-0.5, 14);
  });

  // Source: methods C.6.5, exact by integer programme; partition printed there.
  it("karate club: the best partition known", () => {
    const { n, links } = karate();
    const best = membershipOf(n, [
      [0, 1, 2, 3, 7, 11, 12, 13, 17, 19, 21],
      [4, 5, 6, 10, 16],
      [8, 9, 14, 15, 18, 20, 22, 26, 29, 30, 32, 33],
      [23, 24, 25, 27, 28, 31],
    ]);
    expect(modularity(graphOf(n, links), best).value).toBeCloseTo(0.419789612097, 11);
  });

  it("counts the partitions it tries", () => {
    // Bell numbers.
    expect([1, 2, 3, 4, 5, 6].map((n) => [...partitions(n)].length)).toEqual([
      1, 2, 5, 15, 52, 203,
    ]);
  });

  // Source of the expected values: graphology-metrics 2.4.2.
  it("agrees with graphology", () => {
    for (const seed of [1, 2, 3, 4, 5, 6]) {
      const links = randomLinks(30, 0.1, seed);
      const labels = Int32Array.from({ length: 30 }, (_, u) => (u * seed) % 5);
      const other = new Graph({ type: "undirected" });
      for (let u = 0; u < 30; u++) other.addNode(u, { community: labels[u] });
      for (const [a, b] of links) other.addEdge(a, b);
      expect(modularity(graphOf(30, links), labels).value).toBeCloseTo(theirModularity(other), 12);
    }
  });

  it("is undefined without pairs and refuses labels that do not fit", () => {
    expect(modularity(graphOf(3, []), new Int32Array(3)).reason).toBe("no_pairs");
    expect(modularity(graphOf(0, []), new Int32Array(0)).reason).toBe("no_pairs");
    expect(() => modularity(graphOf(3, [[0, 1]]), new Int32Array(2))).toThrow(RangeError);
    expect(() => modularity(graphOf(3, [[0, 1]]), Int32Array.from([0, 3, 0]))).toThrow(RangeError);
  });

  it("everyone in one group: 0", () => {
    const { n, links } = florentine();
    expect(modularity(graphOf(n, links), new Int32Array(n)).value).toBeCloseTo(0, 14);
  });
});

describe("the search", () => {
  // Source: methods D.3, exact by hand.
  it.each(HAND_STRUCTURES)("finds the best partition of $name", (hand) => {
    const found = communities(graphOf(hand.n, hand.links), { seed: SEED, starts: 20 });
    expect(found.modularity.value).toBeCloseTo(hand.bestModularity, 14);
    expect(highestModularity(hand.n, hand.links)).toBeCloseTo(hand.bestModularity, 14);
  });

  // Source: methods C.6.5; karate and Florentine exact, Les Misérables best of 50 starts.
  it.each([
    { name: "karate club", ...karate(), known: 0.419789612097, floor: 0.4188, groups: 4 },
    { name: "Les Misérables", ...lesMiserables(), known: 0.560008370017, floor: 0.559, groups: 0 },
    { name: "Florentine marriages", ...florentine(), known: 0.39875, floor: 0.39875, groups: 3 },
  ])("reaches the best known of the $name in 20 starts", ({ n, links, known, floor, groups }) => {
    const found = communities(graphOf(n, links), { seed: SEED, starts: FEWEST_STARTS });
    const value = found.modularity.value ?? 0;
    expect(value).toBeGreaterThanOrEqual(floor - 1e-12);
    expect(value).toBeCloseTo(known, 11);
    if (groups > 0) expect(found.count).toBe(groups);
    expect(found.reached.length).toBe(20);
    expect(found.spread?.high).toBe(value);
    expect(found.spread?.low).toBe(Math.min(...found.reached));
    expect(found.spread?.low ?? 0).toBeGreaterThan(known - 0.02);
  });

  it("is never above the best partition there is, and reaches it on small networks", () => {
    for (let seed = 1; seed <= 15; seed++) {
      const links = randomLinks(8, 0.15 + 0.04 * (seed % 6), seed);
      if (links.length === 0) continue;
      const found = communities(graphOf(8, links), { seed, starts: 20 });
      expect(found.modularity.value).toBeCloseTo(highestModularity(8, links), 12);
    }
  });

  it("gives connected communities, labels in order, and its own modularity", () => {
    fc.assert(
      fc.property(networks(40, 2), fc.nat(1000), ({ n, links }, seed) => {
        const graph = graphOf(n, links);
        const found = communitySearch(graph)(seed, 3);
        expect(found.modularity).toEqual(modularity(graph, found.membership));
        found.sizes.forEach((size, label) => {
          const keep = Uint8Array.from(found.membership, (mine) => (mine === label ? 1 : 0));
          const part = inducedSubgraph(graph, keep).graph;
          expect(part.n).toBe(size);
          expect(components(part).sizes.length).toBe(1);
        });
        expect([...found.sizes]).toEqual([...found.sizes].sort((a, b) => b - a));
        const first = [...found.sizes].map((_, label) => found.membership.indexOf(label));
        found.sizes.forEach((size, label) => {
          if (size === found.sizes[label + 1]) {
            expect(first[label]).toBeLessThan(first[label + 1] ?? -1);
          }
        });
      }),
      RUN,
    );
  });

  it("leaves no single person who would be better placed elsewhere, nor two groups better as one", () => {
    for (const seed of [1, 2, 3, 4]) {
      const graph = graphOf(60, randomLinks(60, 0.07, seed));
      const found = communitySearch(graph)(seed, 0);
      const value = found.modularity.value ?? 0;
      const better = (change: (labels: Int32Array) => void) => {
        const labels = found.membership.slice();
        change(labels);
        return (modularity(graph, labels).value ?? 0) > value + 1e-12;
      };
      const labels = [...found.sizes.keys()];
      for (let u = 0; u < graph.n; u++) {
        const wish = [...labels, labels.length].filter((label) => label < graph.n);
        expect(wish.some((label) => better((to) => to.set([label], u)))).toBe(false);
      }
      for (const a of labels) {
        for (const b of labels) {
          if (b <= a) continue;
          expect(
            better((to) => {
              to.forEach((mine, u) => {
                if (mine === b) to[u] = a;
              });
            }),
          ).toBe(false);
        }
      }
    }
  });

  it("gives the same bytes for the same seed, whichever start is run first", () => {
    const { n, links } = lesMiserables();
    const graph = graphOf(n, links);
    const all = communities(graph, { seed: 5, starts: 6 });
    expect(communities(graph, { seed: 5, starts: 6 })).toEqual(all);
    const search = communitySearch(graph);
    const backwards = [5, 4, 3, 2, 1, 0].map((start) => search(5, start)).reverse();
    expect(backwards.map((found) => found.modularity.value)).toEqual([...all.reached]);
    const best = backwards.find((found) => found.modularity.value === all.modularity.value);
    expect(best?.membership).toEqual(all.membership);
  });

  it("goes other ways from another seed or start", () => {
    const search = communitySearch(graphOf(300, randomLinks(300, 0.02, 4)));
    const ways = [search(5, 0), search(5, 1), search(6, 0)].map((found) => found.modularity.value);
    expect(new Set(ways).size).toBe(3);
  });

  it("without pairs: everyone alone, and no figure", () => {
    const found = communities(graphOf(3, []), { seed: 1, starts: 20 });
    expect(found).toMatchObject({ count: 3, spread: null });
    expect(found.modularity).toEqual({ value: null, reason: "no_pairs" });
    expect([...found.membership]).toEqual([0, 1, 2]);
    expect(communities(graphOf(0, []), { seed: 1, starts: 1 }).count).toBe(0);
    expect(() => communities(graphOf(3, []), { seed: 1, starts: 0 })).toThrow(RangeError);
    expect(() => communities(graphOf(3, []), { seed: -1, starts: 1 })).toThrow(RangeError);
  });

  it("keeps networks side by side apart", () => {
    fc.assert(
      fc.property(networks(10), networks(10), (left, right) => {
        const both = beside(left, right);
        const { membership } = communitySearch(graphOf(both.n, both.links))(7, 0);
        const [mine, theirs] = [membership.slice(0, left.n), membership.slice(left.n)];
        const shared = [...mine].filter((label) => theirs.includes(label));
        expect(shared).toEqual([]);
      }),
      { ...RUN, numRuns: 60 },
    );
  });

  it("modularity does not depend on the numbers of people", () => {
    fc.assert(
      fc.property(relabelled(), ({ given, to }) => {
        const labels = Int32Array.from({ length: given.n }, (_, u) => (u % 3) % given.n);
        const carried = new Int32Array(given.n);
        labels.forEach((label, u) => {
          carried[to[u] ?? 0] = label;
        });
        const before = modularity(graphOf(given.n, given.links), labels);
        const after = modularity(graphOf(given.n, moved(given.links, to)), carried);
        expect(after).toEqual(before);
      }),
      RUN,
    );
  });

  // Planted: households of six with all their pairs, and one pair from each to the next.
  it("finds planted households, also among more people than a start settles on", () => {
    const homes = 4_000;
    const links: [number, number][] = [];
    for (let home = 0; home < homes; home++) {
      for (let a = 0; a < 6; a++) {
        for (let b = a + 1; b < 6; b++) links.push([6 * home + a, 6 * home + b]);
      }
      links.push([6 * home, 6 * ((home + 1) % homes) + 1]);
    }
    const graph = graphOf(6 * homes, links);
    const found = communitySearch(graph)(1, 0);
    const planted = Int32Array.from({ length: 6 * homes }, (_, u) => Math.floor(u / 6));
    const value = modularity(graph, planted).value ?? 0;
    // Pairs of households in one community are better still at this size (resolution limit).
    expect(found.modularity.value ?? 0).toBeGreaterThan(value);
    for (let home = 0; home < homes; home++) {
      const labels = found.membership.slice(6 * home, 6 * home + 6);
      expect(new Set(labels).size).toBe(1);
    }
  });
});

describe("connected parts", () => {
  it("takes apart what no pair joins", () => {
    const graph = graphOf(6, linksOf("01 12 34"));
    const { component, sizes } = connectedParts(graph, Int32Array.from([0, 0, 1, 0, 0, 0]));
    expect([...component]).toEqual([0, 0, 2, 1, 1, 3]);
    expect([...sizes]).toEqual([2, 2, 1, 1]);
  });

  it("of one group for all are the groups of the network", () => {
    fc.assert(
      fc.property(networks(), ({ n, links }) => {
        const graph = graphOf(n, links);
        expect(connectedParts(graph, new Int32Array(n).fill(-1))).toEqual(components(graph));
      }),
      RUN,
    );
  });

  it("refuses labels that do not fit", () => {
    expect(() => connectedParts(graphOf(3, []), new Int32Array(2))).toThrow(RangeError);
  });
});
