import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  attributeAssortativity,
  colemanHomophily,
  degreeAssortativity,
  eiIndex,
  MISSING_GROUP,
  mixingCounts,
} from "../../shared/core/index.ts";
import { contactSets, graphOf, type Links, linksOf, randomLinks } from "./support/graphs.ts";
import { HAND_STRUCTURES } from "./support/hand-structure.ts";
import { moved, networks, RUN, relabelled } from "./support/networks.ts";
import {
  davis,
  florentine,
  karate,
  karateClubs,
  lesMiserables,
  miserablesGroups,
} from "./support/published-networks.ts";

const groupsOf = (...numbers: number[]) => Int32Array.from(numbers);

describe("degree assortativity", () => {
  // Source: methods D.3, exact by hand.
  it.each(HAND_STRUCTURES)("of $name", (hand) => {
    const { value, reason } = degreeAssortativity(graphOf(hand.n, hand.links));
    if (hand.degreeAssortativity === null) expect([value, reason]).toEqual([null, "equal_degrees"]);
    else expect(value).toBeCloseTo(hand.degreeAssortativity, 13);
  });

  // Source: methods C.6.5, networkx 2.8.8 and python-igraph 0.10.2.
  it.each([
    { name: "karate club", ...karate(), r: -0.475613097685 },
    { name: "Les Misérables", ...lesMiserables(), r: -0.165225134422 },
    { name: "Davis", ...davis(), r: -0.336997937144 },
    { name: "Florentine marriages", ...florentine(), r: -0.374837872892 },
  ])("of $name", ({ n, links, r }) => {
    expect(degreeAssortativity(graphOf(n, links)).value).toBeCloseTo(r, 11);
    // People without pairs change nothing.
    expect(degreeAssortativity(graphOf(n + 5, links)).value).toBeCloseTo(r, 11);
  });

  // Source: methods D.3, "Degenerate".
  it("is undefined without pairs and between equals", () => {
    expect(degreeAssortativity(graphOf(0, [])).reason).toBe("no_pairs");
    expect(degreeAssortativity(graphOf(3, [])).reason).toBe("no_pairs");
    expect(degreeAssortativity(graphOf(2, [[0, 1]])).reason).toBe("equal_degrees");
    expect(degreeAssortativity(graphOf(4, linksOf("01 02 03 12 13 23"))).reason).toBe(
      "equal_degrees",
    );
  });

  it("is the correlation over link ends", () => {
    fc.assert(
      fc.property(networks(), ({ n, links }) => {
        const { value } = degreeAssortativity(graphOf(n, links));
        if (value === null) return;
        const sets = contactSets(n, links);
        const ends = sets.flatMap((contacts) =>
          [...contacts].map((v) => [contacts.size, sets[v]?.size ?? 0] as const),
        );
        const mean = ends.reduce((sum, [x]) => sum + x, 0) / ends.length;
        const top = ends.reduce((sum, [x, y]) => sum + (x - mean) * (y - mean), 0);
        const bottom = ends.reduce((sum, [x]) => sum + (x - mean) ** 2, 0);
        expect(value).toBeCloseTo(top / bottom, 12);
        expect(Math.abs(value)).toBeLessThanOrEqual(1 + 1e-12);
      }),
      RUN,
    );
  });

  it("does not depend on the numbers of people", () => {
    fc.assert(
      fc.property(relabelled(), ({ given, to }) => {
        const before = degreeAssortativity(graphOf(given.n, given.links));
        const after = degreeAssortativity(graphOf(given.n, moved(given.links, to)));
        expect(after.reason).toBe(before.reason);
        expect(after.value ?? 0).toBeCloseTo(before.value ?? 0, 12);
      }),
      RUN,
    );
  });
});

// Source: methods C.5.3, computed with networkx and igraph; exact where a fraction stands.
describe("karate club by club", () => {
  const { n, links } = karate();
  const counts = mixingCounts(graphOf(n, links), karateClubs(), 2);

  it("has its pairs inside and across", () => {
    expect([...counts.members]).toEqual([17, 17]);
    expect([...counts.insideOf]).toEqual([35, 32]);
    expect(counts.pairs - counts.inside).toBe(11);
    expect([counts.peopleLeftOut, counts.pairsLeftOut]).toEqual([0, 0]);
  });

  it("has its assortativity", () => {
    expect(attributeAssortativity(counts).value).toBeCloseTo(0.717530864198, 11);
  });

  it("has its E–I index and what chance gives", () => {
    const { value, expected, expectedKeepingDegrees } = eiIndex(counts);
    expect(value.value).toBeCloseTo(-0.717948717949, 11);
    expect(expected.value).toBeCloseTo(0.030303030303, 11);
    expect(expectedKeepingDegrees.value).toBeCloseTo(-0.001479289941, 11);
  });

  it("has its homophily against both baselines", () => {
    const [first, second] = colemanHomophily(counts);
    expect(first?.insideShare.value).toBeCloseTo(0.864197530864, 11);
    expect(second?.insideShare.value).toBeCloseTo(0.853333333333, 11);
    expect(first?.original.value).toBeCloseTo(0.728395061728, 11);
    expect(second?.original.value).toBeCloseTo(0.706666666667, 11);
    expect(first?.corrected.value).toBeCloseTo(0.736383442266, 11);
    expect(second?.corrected.value).toBeCloseTo(0.715294117647, 11);
  });
});

describe("mixing by an attribute", () => {
  // Source: methods C.6.5 (group attribute of the file), networkx 2.8.8.
  it("Les Misérables by the group of the file", () => {
    const { n, links } = lesMiserables();
    const counts = mixingCounts(graphOf(n, links), miserablesGroups(), 11);
    expect(attributeAssortativity(counts).value).toBeCloseTo(0.677690145245, 11);
  });

  // Source: methods C.5.3, exact.
  it("two triangles and a bridge", () => {
    const graph = graphOf(6, linksOf("01 02 12 23 34 35 45"));
    const counts = mixingCounts(graph, groupsOf(0, 0, 0, 1, 1, 1), 2);
    expect(attributeAssortativity(counts).value).toBeCloseTo(5 / 7, 14);
  });

  it("leaves out and counts what is not known", () => {
    const graph = graphOf(7, linksOf("01 02 12 23 34 35 45 06"));
    const counts = mixingCounts(graph, groupsOf(0, 0, 0, 1, 1, 1, MISSING_GROUP), 2);
    expect([counts.people, counts.peopleLeftOut]).toEqual([6, 1]);
    expect([counts.pairs, counts.pairsLeftOut]).toEqual([7, 1]);
    const without = mixingCounts(
      graphOf(6, linksOf("01 02 12 23 34 35 45")),
      groupsOf(0, 0, 0, 1, 1, 1),
      2,
    );
    expect(attributeAssortativity(counts)).toEqual(attributeAssortativity(without));
    expect(eiIndex(counts)).toEqual(eiIndex(without));
    expect(colemanHomophily(counts)).toEqual(colemanHomophily(without));
  });

  it("says why it is undefined", () => {
    const graph = graphOf(4, linksOf("01 12"));
    const all = mixingCounts(graph, groupsOf(0, 0, 0, 0), 1);
    expect(attributeAssortativity(all).reason).toBe("one_group");
    expect(eiIndex(all).value.value).toBe(-1);
    expect(eiIndex(all).expected.value).toBe(-1);
    expect(colemanHomophily(all)[0]?.original.reason).toBe("one_group");

    const none = mixingCounts(graph, new Int32Array(4).fill(MISSING_GROUP), 2);
    expect(attributeAssortativity(none).reason).toBe("no_pairs");
    expect(eiIndex(none).value.reason).toBe("no_pairs");
    expect(eiIndex(none).expected.reason).toBe("no_people");
    expect(colemanHomophily(none)[0]?.insideShare.reason).toBe("no_pairs");

    // All pairs in one group although there are two; a group of one; a group without pairs.
    const apart = mixingCounts(graph, groupsOf(0, 0, 0, 1), 2);
    expect(attributeAssortativity(apart).reason).toBe("one_group");
    expect(colemanHomophily(apart)[1]?.original.reason).toBe("no_pairs");
    const alone = mixingCounts(graph, groupsOf(0, 1, 0, 0), 2);
    expect(colemanHomophily(alone)[1]).toEqual({
      insideShare: { value: 0, reason: null },
      original: { value: null, reason: "one_in_group" },
      corrected: { value: null, reason: "one_in_group" },
    });
    expect(() => mixingCounts(graph, groupsOf(0, 1, 0), 2)).toThrow(RangeError);
    expect(() => mixingCounts(graph, groupsOf(0, 1, 2, 0), 2)).toThrow(RangeError);
  });

  it("homophily reaches both of its ends", () => {
    const split = mixingCounts(graphOf(4, linksOf("01 23")), groupsOf(0, 0, 1, 1), 2);
    expect(colemanHomophily(split).map(({ corrected }) => corrected.value)).toEqual([1, 1]);
    const crossed = mixingCounts(graphOf(4, linksOf("02 13")), groupsOf(0, 0, 1, 1), 2);
    expect(colemanHomophily(crossed).map(({ original }) => original.value)).toEqual([-1, -1]);
  });

  /** The mixing matrix, pair by pair. */
  const matrixOf = (links: Links, group: Int32Array, groups: number) => {
    const matrix = Array.from({ length: groups }, () => new Array<number>(groups).fill(0));
    const seen = new Set<string>();
    for (const [a, b] of links) {
      const key = a < b ? `${a} ${b}` : `${b} ${a}`;
      const [x, y] = [group[a] ?? -1, group[b] ?? -1];
      if (seen.has(key) || x < 0 || y < 0) continue;
      seen.add(key);
      for (const [from, to] of [
        [x, y],
        [y, x],
      ] as const) {
        const row = matrix[from];
        if (row) row[to] = (row[to] ?? 0) + 1;
      }
    }
    return matrix;
  };

  it("is what the mixing matrix says", () => {
    for (let seed = 1; seed <= 12; seed++) {
      const links = randomLinks(25, 0.15, seed);
      const group = Int32Array.from({ length: 25 }, (_, u) => ((u * 7 + seed) % 5) - 1);
      const matrix = matrixOf(links, group, 4);
      const counts = mixingCounts(graphOf(25, links), group, 4);
      const rows = matrix.map((row) => row.reduce((sum, value) => sum + value, 0));
      const all = rows.reduce((sum, value) => sum + value, 0);
      const trace = matrix.reduce((sum, row, g) => sum + (row[g] ?? 0), 0) / all;
      const squares = rows.reduce((sum, value) => sum + (value / all) ** 2, 0);
      expect([...counts.ends]).toEqual(rows);
      expect(attributeAssortativity(counts).value).toBeCloseTo(
        (trace - squares) / (1 - squares),
        13,
      );
      expect(eiIndex(counts).value.value).toBeCloseTo(1 - 2 * trace, 13);
      colemanHomophily(counts).forEach(({ insideShare }, g) => {
        expect(insideShare.value).toBeCloseTo((matrix[g]?.[g] ?? 0) / (rows[g] ?? 1), 13);
      });
    }
  });

  // Source: methods C.5.3; the mean over all graphs with m pairs is the expectation (exact).
  it("E–I index: mean over all graphs on five people is its expectation", () => {
    const pairs = [0, 1, 2, 3, 4].flatMap((a) =>
      [0, 1, 2, 3, 4].filter((b) => b > a).map((b) => [a, b] as const),
    );
    const sums = new Map<number, { graphs: number; sum: number }>();
    let expected = 0;
    for (let mask = 1; mask < 1024; mask++) {
      const links = pairs.filter((_, bit) => (mask >> bit) & 1);
      const { value, expected: mean } = eiIndex(
        mixingCounts(graphOf(5, links), groupsOf(0, 0, 1, 1, 1), 2),
      );
      const held = sums.get(links.length) ?? { graphs: 0, sum: 0 };
      sums.set(links.length, {
        graphs: held.graphs + 1,
        sum: held.sum + (value.value ?? Number.NaN),
      });
      expected = mean.value ?? Number.NaN;
    }
    expect(expected).toBeCloseTo(1 - (2 * (2 + 6)) / 20, 14);
    for (const { graphs, sum } of sums.values()) expect(sum / graphs).toBeCloseTo(expected, 12);
  });
});
