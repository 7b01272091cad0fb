import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { articulation, components, coreNumbers } from "../../shared/core/index.ts";
import { contactSets, graphOf, type Links, linksOf, randomLinks } from "./support/graphs.ts";
import { HAND_STRUCTURES } from "./support/hand-structure.ts";
import { beside, moved, networks, pairsOf, RUN, relabelled } from "./support/networks.ts";
import { davis, florentine, karate, lesMiserables } from "./support/published-networks.ts";

// Source: methods D.3, exact by hand.
describe.each(HAND_STRUCTURES)("$name", (hand) => {
  const graph = graphOf(hand.n, hand.links);

  it("has its articulation people and bridges", () => {
    const { people, bridges } = articulation(graph);
    expect([...people]).toEqual(hand.articulation);
    expect(pairsOf(bridges)).toEqual(hand.bridges);
  });

  it("has its core numbers", () => {
    expect([...coreNumbers(graph)]).toEqual(hand.cores);
  });
});

// Source: methods C.6.5, networkx 2.8.8 and python-igraph 0.10.2.
const PUBLISHED = [
  { name: "karate club", ...karate(), people: 1, bridges: 1, cores: "1:1 2:11 3:12 4:10" },
  {
    name: "Les Misérables",
    ...lesMiserables(),
    people: 8,
    bridges: 18,
    cores: "1:18 2:11 3:7 4:3 6:7 7:11 8:8 9:12",
  },
  { name: "Davis", ...davis(), people: 0, bridges: 0, cores: "2:4 3:5 4:23" },
  { name: "Florentine marriages", ...florentine(), people: 4, bridges: 5, cores: "1:5 2:10" },
];

describe.each(PUBLISHED)("$name", (known) => {
  const graph = graphOf(known.n, known.links);

  it("agrees with networkx and igraph", () => {
    const found = articulation(graph);
    expect(found.people.length).toBe(known.people);
    expect(found.bridges.a.length).toBe(known.bridges);
    const counts = new Map<number, number>();
    for (const core of coreNumbers(graph)) counts.set(core, (counts.get(core) ?? 0) + 1);
    const text = [...counts].sort(([a], [b]) => a - b).map(([core, count]) => `${core}:${count}`);
    expect(text.join(" ")).toBe(known.cores);
  });
});

it("karate: person 1 is the one articulation person, and the bridge is theirs", () => {
  const { n, links } = karate();
  const { people, bridges } = articulation(graphOf(n, links));
  expect([...people]).toEqual([0]);
  expect(pairsOf(bridges)).toEqual([[0, 11]]);
});

/** How many groups are left, by taking things away and looking. */
const groupsOf = (n: number, links: Links) => components(graphOf(n, links)).sizes.length;

/** Cores by taking away, for each k, whoever has fewer than k contacts left until none has. */
function coresByDefinition(n: number, links: Links): number[] {
  const cores = new Array<number>(n).fill(0);
  for (let k = 1; k < n; k++) {
    const sets = contactSets(n, links);
    let gone = true;
    while (gone) {
      gone = false;
      sets.forEach((contacts, u) => {
        if (contacts.size === 0 || contacts.size >= k) return;
        for (const v of contacts) sets[v]?.delete(u);
        contacts.clear();
        gone = true;
      });
    }
    sets.forEach((contacts, u) => {
      if (contacts.size >= k) cores[u] = k;
    });
  }
  return cores;
}

describe("against the definition", () => {
  it("articulation people and bridges are what splits a group", () => {
    fc.assert(
      fc.property(networks(12, 2), ({ n, links }) => {
        const whole = groupsOf(n, links);
        const cuts = Array.from({ length: n }, (_, u) => u).filter(
          // The person stays as a group of their own; a person with no pair is one already.
          (u) =>
            groupsOf(
              n,
              links.filter(([a, b]) => a !== u && b !== u),
            ) -
              whole >
            1,
        );
        const pairs = contactSets(n, links).flatMap((contacts, u) =>
          [...contacts]
            .filter((v) => v > u)
            .sort((x, y) => x - y)
            .map((v) => [u, v] as [number, number]),
        );
        const splitting = pairs.filter(
          ([u, v]) =>
            groupsOf(
              n,
              pairs.filter(([a, b]) => a !== u || b !== v),
            ) > whole,
        );
        const found = articulation(graphOf(n, links));
        expect([...found.people]).toEqual(cuts);
        expect(pairsOf(found.bridges)).toEqual(splitting);
      }),
      RUN,
    );
  });

  it("core numbers are those of repeated taking away", () => {
    fc.assert(
      fc.property(networks(), ({ n, links }) => {
        expect([...coreNumbers(graphOf(n, links))]).toEqual(coresByDefinition(n, links));
      }),
      RUN,
    );
    for (const p of [0.05, 0.1, 0.3]) {
      const links = randomLinks(60, p, 9);
      expect([...coreNumbers(graphOf(60, links))]).toEqual(coresByDefinition(60, links));
    }
  });
});

describe("properties", () => {
  it("both go with the people when they are renumbered", () => {
    fc.assert(
      fc.property(relabelled(), ({ given, to }) => {
        const [before, after] = [given.links, moved(given.links, to)].map((links) =>
          graphOf(given.n, links),
        );
        if (!before || !after) throw new Error("two graphs");
        const at = (u: number) => to[u] ?? -1;
        const cores = coreNumbers(after);
        coreNumbers(before).forEach((core, u) => {
          expect(cores[at(u)]).toBe(core);
        });
        const ascending = (x: number, y: number) => x - y;
        const cuts = [...articulation(before).people].map(at).sort(ascending);
        expect([...articulation(after).people]).toEqual(cuts);
        const bridges = pairsOf(articulation(before).bridges)
          .map(([a, b]) => [at(a), at(b)].sort(ascending))
          .sort(([a = 0, b = 0], [c = 0, d = 0]) => a - c || b - d);
        expect(pairsOf(articulation(after).bridges)).toEqual(bridges);
      }),
      RUN,
    );
  });

  it("both are kept when another network stands beside", () => {
    fc.assert(
      fc.property(networks(), networks(), (left, right) => {
        const both = beside(left, right);
        const [x, y, sum] = [left, right, both].map(({ n, links }) => {
          const graph = graphOf(n, links);
          return { ...articulation(graph), cores: [...coreNumbers(graph)] };
        });
        if (!x || !y || !sum) throw new Error("three networks");
        expect(sum.cores).toEqual([...x.cores, ...y.cores]);
        expect([...sum.people]).toEqual([...x.people, ...[...y.people].map((u) => u + left.n)]);
        expect(sum.bridges.a.length).toBe(x.bridges.a.length + y.bridges.a.length);
      }),
      RUN,
    );
  });

  // Source: methods C.3.4 (monotone table).
  it("a further pair never lowers a core number, and nobody's exceeds their contacts", () => {
    fc.assert(
      fc.property(networks(), fc.nat(), fc.nat(), ({ n, links }, x, step) => {
        const pair = [x % n, (x + 1 + (step % (n - 1))) % n] as const;
        const before = coreNumbers(graphOf(n, links));
        const after = coreNumbers(graphOf(n, [...links, pair]));
        const sets = contactSets(n, links);
        before.forEach((core, u) => {
          expect(core).toBeLessThanOrEqual(sets[u]?.size ?? 0);
          expect(after[u]).toBeGreaterThanOrEqual(core);
          expect(after[u]).toBeLessThanOrEqual(core + 1);
        });
      }),
      RUN,
    );
  });

  // Source: methods C.3.4 ("Not monotone").
  it("a further pair may add or take away bridges and articulation people", () => {
    const count = (text: string) => {
      const { people, bridges } = articulation(graphOf(4, linksOf(text)));
      return [people.length, bridges.a.length];
    };
    expect(count("01 12")).toEqual([1, 2]);
    expect(count("01 12 23")).toEqual([2, 3]);
    expect(count("01 12 23 03")).toEqual([0, 0]);
  });
});

describe("shapes that break recursive or quadratic code", () => {
  it("a chain of 200,000 people", () => {
    const n = 200_000;
    const links = Array.from({ length: n - 1 }, (_, u) => [u, u + 1] as const);
    const graph = graphOf(n, links);
    const { people, bridges } = articulation(graph);
    expect(people.length).toBe(n - 2);
    expect(bridges.a.length).toBe(n - 1);
    expect(bridges.b[n - 2]).toBe(n - 1);
    expect(coreNumbers(graph).every((core) => core === 1)).toBe(true);
  });

  it("one person met by 100,000, and a clique of 300 beside", () => {
    const n = 100_301;
    const links: [number, number][] = [];
    for (let u = 1; u <= 100_000; u++) links.push([0, u]);
    for (let u = 100_001; u < n; u++) for (let v = u + 1; v < n; v++) links.push([u, v]);
    const graph = graphOf(n, links);
    const cores = coreNumbers(graph);
    expect([cores[0], cores[1], cores[n - 1]]).toEqual([1, 1, 299]);
    expect([...articulation(graph).people]).toEqual([0]);
  });

  it("nobody, and people without pairs", () => {
    for (const n of [0, 1, 5]) {
      const graph = graphOf(n, []);
      expect(coreNumbers(graph)).toEqual(new Int32Array(n));
      const { people, bridges } = articulation(graph);
      expect([people.length, bridges.a.length, bridges.b.length]).toEqual([0, 0, 0]);
    }
  });
});
