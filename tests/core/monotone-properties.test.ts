import { describe, expect, it } from "vitest";
import {
  components,
  degreeCounts,
  density,
  dispersion,
  excessDegreeRatio,
  type Graph,
  isolates,
  MEASURE_DIRECTIONS,
  MONOTONE_PROPERTIES,
  meanDegree,
  poissonUpper,
  transitivity,
  triangles,
  twoPaths,
} from "../../shared/core/index.ts";
import { graphOf, type Links, randomLinks } from "./support/graphs.ts";

const named = (key: string) => {
  const found = MONOTONE_PROPERTIES.find((property) => property.key === key);
  if (!found) throw new Error(`no property ${key}`);
  return found;
};
const at = (key: string, n: number, parameter = 0) =>
  named(key).threshold?.(n, parameter) ?? Number.NaN;

describe("thresholds", () => {
  it("are those of the table", () => {
    // Source: methods C.3.4.
    expect([10, 100, 1000].map((n) => at("connected", n))).toEqual([
      expect.closeTo(0.2302585, 7),
      expect.closeTo(0.0460517, 7),
      expect.closeTo(0.0069078, 7),
    ]);
    expect(at("no_isolate", 100)).toBe(at("connected", 100));
    expect(at("diameter_at_most_two", 100)).toBeCloseTo(0.3034854, 7);
    expect(at("diameter_at_most_two", 1000)).toBeCloseTo(0.1175394, 7);
    expect(at("at_least_one_pair", 100)).toBeCloseTo(1e-4, 18);
    expect(at("contains_tree", 100, 2)).toBeCloseTo(1e-4, 18);
    expect(at("contains_tree", 100, 3)).toBeCloseTo(1e-3, 17);
    expect([at("contains_cycle", 50), at("contains_triangle", 50)]).toEqual([0.02, 0.02]);
    expect(at("contains_complete_four", 1000)).toBeCloseTo(0.01, 15);
    expect(at("hamilton_cycle", 100)).toBeGreaterThan(at("connected", 100));
    // A group of εn people: c with S(c) = ε is −ln(1 − ε)/ε, here ε = S(2).
    expect(at("large_group", 500, 0.79681213002002) * 500).toBeCloseTo(2, 12);
  });

  // Source: Pittel, Spencer & Wormald 1996: c_k is the least λ/P(Poisson(λ) >= k − 1), and the core
  // then holds P(Poisson(λ) >= k) of all people.
  it.each([
    ["three_core", 3],
    ["four_core", 4],
    ["five_core", 5],
  ])("%s appears where the theory says, at once", (key, k) => {
    const meanAt = (rate: number) => rate / poissonUpper(k - 2, rate);
    let best = 0.5;
    for (let step = 0.1; step > 1e-7; step /= 10) {
      for (let rate = best - 10 * step; rate <= best + 100 * step; rate += step) {
        if (rate > 0.2 && meanAt(rate) < meanAt(best)) best = rate;
      }
    }
    expect(at(key, 1000) * 1000).toBeCloseTo(meanAt(best), 8);
    expect(named(key).jump).toBeCloseTo(poissonUpper(k - 1, best), 4);
  });

  it("have keys of their own, and the distance alone shrinks", () => {
    const keys = MONOTONE_PROPERTIES.map(({ key }) => key);
    expect(new Set(keys).size).toBe(keys.length);
    const shrinking = MONOTONE_PROPERTIES.filter(({ direction }) => direction === "down");
    expect(shrinking.map(({ key }) => key)).toEqual(["distance_between_people"]);
  });
});

const largest = (graph: Graph) => Math.max(0, ...components(graph).sizes);
const FIGURES: Partial<Record<keyof typeof MEASURE_DIRECTIONS, (graph: Graph) => number | null>> = {
  pairs: ({ m }) => m,
  meanDegree: ({ n, m }) => meanDegree(n, m).value,
  density: ({ n, m }) => density(n, m).value,
  largestDegree: (graph) => degreeCounts(graph).length - 1,
  largestGroup: largest,
  largestShare: (graph) => largest(graph) / graph.n,
  groupOfRandomPerson: (graph) =>
    components(graph).sizes.reduce((sum, size) => sum + size * size, 0),
  reachableShare: (graph) =>
    components(graph).sizes.reduce((sum, size) => sum + size * (size - 1), 0),
  triangles,
  twoPaths,
  groups: (graph) => components(graph).sizes.length,
  isolates,
  transitivity: (graph) => transitivity(graph).value,
  secondGroup: (graph) => [...components(graph).sizes].sort((a, b) => b - a)[1] ?? 0,
  groupsOfOneSize: (graph) => components(graph).sizes.filter((size) => size === 2).length,
  dispersion: (graph) => dispersion(graph).corrected.value,
  excessDegreeRatio: (graph) => excessDegreeRatio(degreeCounts(graph)).value,
};

describe("adding a pair among the same people", () => {
  it.each(Object.entries(FIGURES))("%s goes where the table says", (key, figure) => {
    const seen = { up: 0, down: 0 };
    const n = 9;
    for (let seed = 0; seed < 60; seed++) {
      const links: Links = randomLinks(n, 0.05 + (seed % 12) * 0.04, seed);
      const before = figure(graphOf(n, links));
      for (let a = 0; a < n; a++) {
        for (let b = a + 1; b < n; b++) {
          if (links.some(([u, v]) => u === a && v === b)) continue;
          const after = figure(graphOf(n, [...links, [a, b]]));
          if (before === null || after === null) continue;
          if (after > before + 1e-12) seen.up++;
          if (after < before - 1e-12) seen.down++;
        }
      }
    }
    const direction = MEASURE_DIRECTIONS[key as keyof typeof MEASURE_DIRECTIONS];
    expect({ up: seen.up > 0, down: seen.down > 0 }).toEqual({
      up: direction !== "down",
      down: direction !== "up",
    });
  });

  it("a pair that brings a new person may lower c", () => {
    // Source: methods C.3.4: eight pairs among eight people, then a ninth person with one pair.
    expect(meanDegree(8, 8).value).toBe(2);
    expect(meanDegree(9, 9).value).toBe(2);
    expect((density(9, 9).value ?? 1) < (density(8, 8).value ?? 0)).toBe(true);
  });
});
