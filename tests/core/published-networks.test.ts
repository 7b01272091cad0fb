import { describe, expect, it } from "vitest";
import { networkReport, triangles, twoPaths } from "../../shared/core/index.ts";
import { graphOf } from "./support/graphs.ts";
import { davis, florentine, karate, lesMiserables } from "./support/published-networks.ts";

// Source: methods C.6.5, computed with networkx 2.8.8 and python-igraph 0.10.2, which agree to all
// digits shown.
const VALUES = [
  {
    name: "karate club (Zachary 1977)",
    network: karate(),
    n: 34,
    m: 78,
    density: 0.139037433155,
    c: 4.588235294118,
    sumOfSquares: 1212,
    maxDegree: 17,
    triangles: 45,
    twoPaths: 528,
    transitivity: 45 / 176,
  },
  {
    name: "Les Misérables (Knuth 1993)",
    network: lesMiserables(),
    n: 77,
    m: 254,
    density: 0.086807928913,
    c: 6.597402597403,
    sumOfSquares: 6124,
    maxDegree: 36,
    triangles: 467,
    twoPaths: 2808,
    transitivity: 0.498931623932,
  },
  {
    name: "women and gatherings (Davis et al. 1941)",
    network: davis(),
    n: 32,
    m: 89,
    density: 0.179435483871,
    c: 5.5625,
    sumOfSquares: 1250,
    maxDegree: 14,
    triangles: 0,
    twoPaths: 536,
    transitivity: 0,
  },
  {
    name: "Florentine marriages (Padgett; Breiger & Pattison 1986)",
    network: florentine(),
    n: 15,
    m: 20,
    density: 0.190476190476,
    c: 2.666666666667,
    sumOfSquares: 134,
    maxDegree: 6,
    triangles: 3,
    twoPaths: 47,
    transitivity: 9 / 47,
  },
] as const;

const OPTIONS = { declaredPopulation: null, presetWindow: true, recall: null };

describe.each(VALUES)("$name", (known) => {
  const graph = graphOf(known.network.n, known.network.links);
  const answer = networkReport(graph, null, OPTIONS);

  it("agrees with networkx and igraph", () => {
    expect(answer.people).toBe(known.n);
    expect(answer.pairs).toBe(known.m);
    expect(answer.density).toBeCloseTo(known.density, 11);
    expect(answer.meanDegree).toBeCloseTo(known.c, 11);
    expect(answer.componentSizes).toEqual([known.n]);
    expect(answer.largestShare).toBe(1);
    expect(answer.isolates).toBe(0);
    expect(answer.degreeCounts.length - 1).toBe(known.maxDegree);
    const squares = answer.degreeCounts.reduce((sum, people, k) => sum + people * k * k, 0);
    expect(squares).toBe(known.sumOfSquares);
    expect(triangles(graph)).toBe(known.triangles);
    expect(twoPaths(graph)).toBe(known.twoPaths);
    expect(answer.transitivity).toBeCloseTo(known.transitivity, 11);
  });
});

describe("threshold of known networks", () => {
  // Source: methods C.2.3 (Wilson limits computed with scipy 1.10.1) and C.2.4.
  it("karate club lies above", () => {
    const { n, links } = karate();
    const { threshold, reasons } = networkReport(graphOf(n, links), null, OPTIONS);
    expect(threshold.pairsPerPerson).toBeCloseTo(4.588235294118, 11);
    expect(threshold.pairsPerPersonInterval?.[0]).toBeCloseTo(3.724189049823, 11);
    expect(threshold.pairsPerPersonInterval?.[1]).toBeCloseTo(5.614304183473, 11);
    expect(threshold.verdict).toBe("above");
    expect(reasons).toEqual({});
  });

  // Source: methods C.2.4, "n < 30: no verdict".
  it("Florentine families are too few for a verdict", () => {
    const { n, links } = florentine();
    const { threshold, reasons } = networkReport(graphOf(n, links), null, OPTIONS);
    expect(threshold.verdict).toBeNull();
    expect(threshold.pairsPerPerson).toBeCloseTo(2.666666666667, 11);
    expect(reasons).toEqual({ "threshold.verdict": "too_few_people" });
  });
});
