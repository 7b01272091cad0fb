import { describe, expect, it } from "vitest";
import { networkReport, triangles, twoPaths } from "../../shared/core/index.ts";
import { graphOf, type Links, linksOf } from "./support/graphs.ts";
import { HAND_GRAPHS } from "./support/hand-graphs.ts";

const OPTIONS = { declaredPopulation: null, presetWindow: true, recall: null };
const report = (n: number, links: Links) => networkReport(graphOf(n, links), null, OPTIONS);

// Source of every value here: methods D.3, exact by hand, cross-checked with networkx and igraph.
describe.each(HAND_GRAPHS)("$name", (hand) => {
  const graph = graphOf(hand.n, hand.links);
  const answer = report(hand.n, hand.links);

  it("has its sizes, mean degree and density", () => {
    expect(answer.people).toBe(hand.n);
    expect(answer.pairs).toBe(hand.links.length);
    expect(answer.meanDegree).toBeCloseTo(hand.c, 14);
    expect(answer.density).toBeCloseTo(hand.density, 14);
  });

  it("has its groups, isolates and largest share", () => {
    expect(answer.componentSizes).toEqual(hand.groups);
    expect(answer.isolates).toBe(hand.groups.filter((size) => size === 1).length);
    expect(answer.largestShare).toBeCloseTo((hand.groups[0] ?? 0) / hand.n, 14);
  });

  it("has its degrees", () => {
    const counts = answer.degreeCounts;
    const sum = (weight: (degree: number) => number) =>
      counts.reduce((total, people, degree) => total + people * weight(degree), 0);
    expect(sum(() => 1)).toBe(hand.n);
    expect(sum((degree) => degree)).toBe(2 * hand.links.length);
    expect(sum((degree) => degree * degree)).toBe(hand.sumOfSquares);
  });

  it("has its triangles, 2-paths and transitivity", () => {
    expect(triangles(graph)).toBe(hand.triangles);
    expect(twoPaths(graph)).toBe(hand.twoPaths);
    expect(answer.transitivity).toBeCloseTo(hand.transitivity, 14);
  });
});

// Source: methods D.3, "Degenerate".
describe("degenerate graphs", () => {
  it("nobody: counts are 0, the rest null with the reason", () => {
    expect(report(0, [])).toEqual({
      people: 0,
      pairs: 0,
      meanDegree: null,
      density: null,
      componentSizes: [],
      isolates: 0,
      degreeCounts: [],
      transitivity: null,
      largestShare: null,
      threshold: {
        population: "complete",
        n: 0,
        interviewed: 0,
        pairsPerPerson: null,
        pairsPerPersonInterval: null,
        criticalHalfWidth: null,
        expectedGiantShare: null,
        verdict: null,
        openVerdicts: [],
      },
      reasons: {
        meanDegree: "no_people",
        density: "no_people",
        transitivity: "no_two_paths",
        largestShare: "no_people",
        "threshold.pairsPerPerson": "no_people",
        "threshold.pairsPerPersonInterval": "no_people",
        "threshold.criticalHalfWidth": "no_people",
        "threshold.expectedGiantShare": "no_people",
        "threshold.verdict": "too_few_people",
      },
    });
  });

  it("one person: mean degree 0, one group of one, density undefined", () => {
    const one = report(1, []);
    expect(one).toMatchObject({ people: 1, meanDegree: 0, density: null, largestShare: 1 });
    expect(one.componentSizes).toEqual([1]);
    expect(one.threshold).toMatchObject({ pairsPerPerson: 0, pairsPerPersonInterval: null });
    expect(one.reasons).toMatchObject({
      density: "one_person",
      transitivity: "no_two_paths",
      "threshold.pairsPerPersonInterval": "one_person",
    });
  });

  it("two people with their pair: density 1, no 2-path", () => {
    expect(report(2, [[0, 1]])).toMatchObject({ density: 1, transitivity: null, meanDegree: 1 });
  });

  it("no pair among several: mean degree and density are 0", () => {
    expect(report(5, [])).toMatchObject({ meanDegree: 0, density: 0, isolates: 5 });
    expect(report(5, []).degreeCounts).toEqual([5]);
  });

  it("everyone with everyone: transitivity 1", () => {
    expect(report(4, linksOf("01 02 03 12 13 23")).transitivity).toBe(1);
  });
});
