import { describe, expect, it } from "vitest";
import {
  betweenness,
  closeness,
  eigenvectorCentrality,
  normalisedBetweenness,
  pathFigures,
} from "../../shared/core/index.ts";
import { davis, davisEvent } from "./support/davis.ts";
import { graphOf } from "./support/graphs.ts";
import { florentine, karate, lesMiserables } from "./support/published-networks.ts";

const DIGITS = 11;

// Source: methods C.6.5, computed with networkx 2.8.8 and python-igraph 0.10.2, which agree to all
// digits shown.
const VALUES = [
  {
    name: "karate club (Zachary 1977)",
    network: karate(),
    pairs: 561,
    steps: 1351,
    diameter: 5,
    efficiency: 0.492008318479,
    betweenness: [231.071428571429, 160.551587301587],
    most: 0,
    normalised: 0.437635281385,
    closeness: 0.568965517241,
    harmonic: 0.704545454545,
  },
  {
    name: "Les Misérables (Knuth 1993)",
    network: lesMiserables(),
    pairs: 2926,
    steps: 7728,
    diameter: 5,
    efficiency: 0.43528708134,
    betweenness: [1624.468800433313, 504, 470.570631913666],
    most: 11,
    normalised: 0.569989052784,
    closeness: 0.64406779661,
    harmonic: 0.732456140351,
  },
  {
    name: "women and events (Davis et al. 1941)",
    network: davis(),
    pairs: 496,
    steps: 1144,
    diameter: 4,
    efficiency: 0.515288978495,
    betweenness: [110.206396982008, 101.932143480963],
    most: davisEvent(8),
    normalised: 0.237003004262,
    closeness: 0.596153846154,
    harmonic: 0.704301075269,
  },
  {
    name: "Florentine marriages (Padgett; Breiger & Pattison 1986)",
    network: florentine(),
    pairs: 105,
    steps: 261,
    diameter: 5,
    efficiency: 0.500158730159,
    betweenness: [47.5, 23.166666666667],
    most: null,
    normalised: 0.521978021978,
    closeness: 0.56,
    harmonic: 0.678571428571,
  },
] as const;

describe.each(VALUES)("$name", (known) => {
  const { n, links } = known.network;
  const graph = graphOf(n, links);

  it("has its path figures", () => {
    const figures = pathFigures(graph);
    expect(figures.meanPath.value).toBeCloseTo(known.steps / known.pairs, 14);
    expect(figures.diameter.value).toBe(known.diameter);
    expect(figures.reachableShare.value).toBe(1);
    expect(figures.efficiency.value).toBeCloseTo(known.efficiency, DIGITS);
    expect(figures.distanceCounts.reduce((sum, pairs) => sum + pairs, 0)).toBe(known.pairs);
    expect(figures.distanceCounts[1]).toBe(links.length);
  });

  it("has its betweenness", () => {
    const raw = betweenness(graph);
    const ranked = Array.from(raw).sort((a, b) => b - a);
    known.betweenness.forEach((value, k) => {
      expect(ranked[k]).toBeCloseTo(value, DIGITS);
    });
    if (known.most !== null) expect(raw.indexOf(ranked[0] ?? 0)).toBe(known.most);
    const normalised = normalisedBetweenness(raw).value;
    expect(Math.max(...(normalised ?? []))).toBeCloseTo(known.normalised, DIGITS);
  });

  it("has its closeness, the three forms alike where everyone reaches everyone", () => {
    const { harmonic, wassermanFaust, withinGroup } = closeness(graph);
    expect(Math.max(...(harmonic.value ?? []))).toBeCloseTo(known.harmonic, DIGITS);
    expect(Math.max(...(wassermanFaust.value ?? []))).toBeCloseTo(known.closeness, DIGITS);
    expect(withinGroup).toEqual(Array.from(wassermanFaust.value ?? []));
  });
});

// Source: methods C.6.5.
describe("more of the karate club", () => {
  const graph = graphOf(34, karate().links);

  it("names its people", () => {
    const raw = betweenness(graph);
    expect(raw[33]).toBeCloseTo(160.551587301587, DIGITS);
    expect(raw[32]).toBeCloseTo(76.690476190476, DIGITS);
    const harmonic = closeness(graph).harmonic.value ?? new Float64Array();
    expect(harmonic.indexOf(Math.max(...harmonic))).toBe(33);
  });

  // Source: networkx 2.8.8, eigenvector_centrality_numpy without weights.
  it("has its eigenvector centrality", () => {
    const answer = eigenvectorCentrality(graph).value;
    expect(answer?.centrality[33]).toBeCloseTo(0.373363470291, DIGITS);
    expect(answer?.centrality[0]).toBeCloseTo(0.355491444525, DIGITS);
    expect(answer?.people).toEqual(Int32Array.from({ length: 34 }, (_, u) => u));
  });
});

// Source: networkx 2.8.8, eigenvector_centrality to 1e-14 and eigvalsh of numpy, without weights.
describe.each([
  ["karate club", karate(), 33, 0.373363470291, 6.725697727632],
  ["Les Misérables", lesMiserables(), null, 0.317841260352, 12.005754950138],
  [
    "women and events, which have no odd circle",
    davis(),
    davisEvent(8),
    0.35824342557,
    6.74190812491,
  ],
  ["Florentine marriages", florentine(), null, 0.430308094041, 3.256103745431],
] as const)("%s", (_name, { n, links }, person, most, eigenvalue) => {
  it("has its eigenvector centrality and eigenvalue", () => {
    const answer = eigenvectorCentrality(graphOf(n, links)).value;
    const centrality = answer?.centrality ?? new Float64Array();
    expect(Math.max(...centrality)).toBeCloseTo(most, DIGITS);
    expect(answer?.eigenvalue).toBeCloseTo(eigenvalue, DIGITS);
    if (person !== null) expect(centrality.indexOf(Math.max(...centrality))).toBe(person);
  });
});

// Source: methods C.6.5, last paragraph: other editions keep the family without a marriage.
describe("Florentine marriages with Pucci, who married nobody", () => {
  const alone = graphOf(15, florentine().links);
  const graph = graphOf(16, florentine().links);

  it("keeps its paths and loses efficiency", () => {
    const figures = pathFigures(graph);
    expect(figures.meanPath.value).toBeCloseTo(261 / 105, 14);
    expect(figures.diameter.value).toBe(5);
    expect(figures.reachableShare.value).toBeCloseTo(105 / 120, 14);
    expect(figures.efficiency.value).toBeCloseTo(0.437638888889, DIGITS);
  });

  it("tells the forms of closeness apart", () => {
    const { wassermanFaust, withinGroup } = closeness(graph);
    expect(Math.max(...(wassermanFaust.value ?? []))).toBeCloseTo(0.522666666667, DIGITS);
    expect(Math.max(...withinGroup.map((value) => value ?? 0))).toBeCloseTo(0.56, DIGITS);
    expect(withinGroup[15]).toBeNull();
    expect(wassermanFaust.value?.[15]).toBe(0);
  });

  it("leaves betweenness and the eigenvector of the largest group alone", () => {
    expect(betweenness(graph).slice(0, 15)).toEqual(betweenness(alone));
    expect(eigenvectorCentrality(graph)).toEqual(eigenvectorCentrality(alone));
  });
});
