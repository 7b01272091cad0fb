import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { clustering, transitivity, triangles, twoPaths } from "../../shared/core/index.ts";
import { contactSets, graphOf, type Links, linksOf, randomLinks } from "./support/graphs.ts";
import { HAND_STRUCTURES } from "./support/hand-structure.ts";
import { beside, moved, networks, RUN, relabelled } from "./support/networks.ts";
import { davis, florentine, karate, lesMiserables } from "./support/published-networks.ts";

// Source: methods D.3, exact by hand.
describe.each(HAND_STRUCTURES)("clustering of $name", (hand) => {
  it("has both averages", () => {
    const answer = clustering(graphOf(hand.n, hand.links));
    expect(answer.triangles).toBe(hand.triangles);
    expect(answer.twoPaths).toBe(hand.twoPaths);
    expect(answer.transitivity.value).toBeCloseTo(hand.transitivity, 14);
    expect(answer.averageZeros.value).toBeCloseTo(hand.averages[0], 14);
    expect(answer.averageTwoOrMore.value).toBeCloseTo(hand.averages[1], 14);
  });
});

// Source: methods C.6.5, networkx 2.8.8 and python-igraph 0.10.2.
const PUBLISHED = [
  {
    name: "karate club",
    ...karate(),
    closed: 45,
    paths: 528,
    zeros: 0.570638478208,
    twoOrMore: 0.587930553305,
  },
  {
    name: "Les Misérables",
    ...lesMiserables(),
    closed: 467,
    paths: 2808,
    zeros: 0.573136749932,
    twoOrMore: 0.735525495746,
  },
  { name: "Davis", ...davis(), closed: 0, paths: 536, zeros: 0, twoOrMore: 0 },
  {
    name: "Florentine marriages",
    ...florentine(),
    closed: 3,
    paths: 47,
    zeros: 0.16,
    twoOrMore: 0.218181818182,
  },
  {
    name: "Florentine marriages with a family apart",
    n: 16,
    links: florentine().links,
    closed: 3,
    paths: 47,
    zeros: 0.15,
    twoOrMore: 0.218181818182,
  },
] as const;

describe.each(PUBLISHED)("$name", (known) => {
  it("agrees with networkx and igraph", () => {
    const answer = clustering(graphOf(known.n, known.links));
    expect(answer.triangles).toBe(known.closed);
    expect(answer.twoPaths).toBe(known.paths);
    expect(answer.transitivity.value).toBeCloseTo((3 * known.closed) / known.paths, 14);
    expect(answer.averageZeros.value).toBeCloseTo(known.zeros, 11);
    expect(answer.averageTwoOrMore.value).toBeCloseTo(known.twoOrMore, 11);
  });
});

/** Each person's clustering straight from the definition; null below two contacts. */
function localByDefinition(n: number, links: Links): (number | null)[] {
  const sets = contactSets(n, links);
  return sets.map((contacts) => {
    const list = [...contacts];
    if (list.length < 2) return null;
    let met = 0;
    for (const v of list) for (const w of list) if (v < w && sets[v]?.has(w)) met++;
    return met / ((list.length * (list.length - 1)) / 2);
  });
}

describe("clustering", () => {
  it.each([0.02, 0.1, 0.3, 0.8])("is the definition, p = %d", (p) => {
    for (const seed of [1, 2, 3]) {
      const links = randomLinks(40, p, seed);
      const answer = clustering(graphOf(40, links));
      const expected = localByDefinition(40, links);
      expected.forEach((value, u) => {
        expect(answer.local[u]).toBeCloseTo(value ?? 0, 14);
      });
      const several = expected.filter((value) => value !== null);
      const total = several.reduce((sum, value) => sum + value, 0);
      expect(answer.averageZeros.value).toBeCloseTo(total / 40, 13);
      if (several.length > 0) {
        expect(answer.averageTwoOrMore.value).toBeCloseTo(total / several.length, 13);
      }
    }
  });

  it("says why it is undefined", () => {
    expect(clustering(graphOf(0, []))).toMatchObject({
      transitivity: { value: null, reason: "no_two_paths" },
      averageZeros: { value: null, reason: "no_people" },
      averageTwoOrMore: { value: null, reason: "no_two_paths" },
    });
    // Two people and their pair: nobody has two contacts, and everyone counts as 0.
    expect(clustering(graphOf(2, [[0, 1]]))).toMatchObject({
      transitivity: { value: null, reason: "no_two_paths" },
      averageZeros: { value: 0, reason: null },
      averageTwoOrMore: { value: null, reason: "no_two_paths" },
    });
  });

  it("may go either way when a pair is added", () => {
    const open = clustering(graphOf(4, linksOf("01 02 12"))).transitivity.value;
    const paw = clustering(graphOf(4, linksOf("01 02 12 23"))).transitivity.value;
    const more = clustering(graphOf(4, linksOf("01 02 12 23 13"))).transitivity.value;
    expect([open, paw, more]).toEqual([1, 3 / 5, 6 / 8]);
  });

  it("goes with the people when they are renumbered", () => {
    fc.assert(
      fc.property(relabelled(), ({ given, to }) => {
        const before = clustering(graphOf(given.n, given.links));
        const after = clustering(graphOf(given.n, moved(given.links, to)));
        before.local.forEach((value, u) => {
          expect(after.local[to[u] ?? -1]).toBe(value);
        });
        expect(after.transitivity).toEqual(before.transitivity);
      }),
      RUN,
    );
  });

  it("keeps everybody's own figure when another network stands beside", () => {
    fc.assert(
      fc.property(networks(), networks(), (left, right) => {
        const both = beside(left, right);
        const [x, y, sum] = [left, right, both].map(({ n, links }) =>
          clustering(graphOf(n, links)),
        );
        expect([...(sum?.local ?? [])]).toEqual([...(x?.local ?? []), ...(y?.local ?? [])]);
        expect(sum?.triangles).toBe((x?.triangles ?? 0) + (y?.triangles ?? 0));
      }),
      RUN,
    );
  });

  it("agrees with the single figures", () => {
    const graph = graphOf(200, randomLinks(200, 0.05, 5));
    const answer = clustering(graph);
    expect(answer.triangles).toBe(triangles(graph));
    expect(answer.twoPaths).toBe(twoPaths(graph));
    expect(answer.transitivity).toEqual(transitivity(graph));
  });

  // One person met by all, and rings among the others: the count must not become quadratic.
  it("counts a large gathering around one person", () => {
    const n = 60_001;
    const links: [number, number][] = [];
    for (let u = 1; u < n; u++) links.push([0, u], [u, u === n - 1 ? 1 : u + 1]);
    const answer = clustering(graphOf(n, links));
    expect(answer.triangles).toBe(n - 1);
    expect(answer.local[0]).toBeCloseTo(2 / (n - 2), 14);
    expect(answer.local[1]).toBeCloseTo(2 / 3, 14);
  });
});
