import { describe, expect, it } from "vitest";
import {
  betweenness,
  closeness,
  eigenvectorCentrality,
  normalisedBetweenness,
  pathFigures,
  sampledBetweenness,
  sampledCloseness,
  sampledPathFigures,
} from "../../shared/core/index.ts";
import { createStream } from "../../shared/core/random/random-stream.ts";
import { expectClose } from "./support/close-to.ts";
import { graphOf, linksOf } from "./support/graphs.ts";
import { HAND_GRAPHS } from "./support/hand-graphs.ts";

const times = (count: number, value: number) => new Array<number>(count).fill(value);

// In the order of HAND_GRAPHS: reachable pairs, sum of distances, diameter, efficiency, then
// betweenness, Wasserman–Faust closeness and harmonic closeness by person.
// Source: methods D.3, exact by hand, cross-checked with networkx and igraph.
const VALUES = [
  {
    reach: [6, 6],
    steps: 10,
    diameter: 3,
    efficiency: 13 / 18,
    betweenness: [0, 2, 2, 0],
    close: [1 / 2, 3 / 4, 3 / 4, 1 / 2],
    harmonic: [11 / 18, 5 / 6, 5 / 6, 11 / 18],
  },
  {
    reach: [6, 6],
    steps: 8,
    diameter: 2,
    efficiency: 5 / 6,
    betweenness: [0, 0, 2, 0],
    close: [3 / 4, 3 / 4, 1, 3 / 5],
    harmonic: [5 / 6, 5 / 6, 1, 2 / 3],
  },
  {
    reach: [4, 15],
    steps: 4,
    diameter: 1,
    efficiency: 4 / 15,
    betweenness: times(6, 0),
    close: [...times(3, 2 / 5), 1 / 5, 1 / 5, 0],
    harmonic: [...times(3, 2 / 5), 1 / 5, 1 / 5, 0],
  },
  {
    reach: [15, 15],
    steps: 27,
    diameter: 3,
    efficiency: 31 / 45,
    betweenness: [0, 0, 6, 6, 0, 0],
    close: [1 / 2, 1 / 2, 5 / 7, 5 / 7, 1 / 2, 1 / 2],
    harmonic: [19 / 30, 19 / 30, 4 / 5, 4 / 5, 19 / 30, 19 / 30],
  },
  {
    reach: [15, 15],
    steps: 25,
    diameter: 2,
    efficiency: 2 / 3,
    betweenness: [10, ...times(5, 0)],
    close: [1, ...times(5, 5 / 9)],
    harmonic: [1, ...times(5, 3 / 5)],
  },
  {
    reach: [13, 28],
    steps: 18,
    diameter: 2,
    efficiency: 3 / 8,
    betweenness: [...times(5, 1), ...times(3, 0)],
    close: [...times(5, 8 / 21), ...times(3, 2 / 7)],
    harmonic: [...times(5, 3 / 7), ...times(3, 2 / 7)],
  },
  {
    reach: [21, 28],
    steps: 43,
    diameter: 4,
    efficiency: 79 / 168,
    betweenness: [0, 0, 8, 9, 0, 5, 0, 0],
    close: [18 / 49, 18 / 49, 18 / 35, 4 / 7, 3 / 7, 36 / 77, 9 / 28, 0],
    harmonic: [41 / 84, 41 / 84, 13 / 21, 9 / 14, 11 / 21, 25 / 42, 17 / 42, 0],
  },
] as const;

describe.each(HAND_GRAPHS.map((hand, k) => ({ ...hand, known: VALUES[k] })))("$name", (hand) => {
  const { known } = hand;
  const graph = graphOf(hand.n, hand.links);

  it("has its path figures", () => {
    const figures = pathFigures(graph);
    const [pairs = 0, possible = 0] = known?.reach ?? [];
    expect(figures.meanPath.value).toBeCloseTo((known?.steps ?? 0) / pairs, 14);
    expect(figures.diameter.value).toBe(known?.diameter);
    expect(figures.reachableShare.value).toBeCloseTo(pairs / possible, 14);
    expect(figures.efficiency.value).toBeCloseTo(known?.efficiency ?? 0, 14);
  });

  it("has its betweenness and closeness", () => {
    expectClose(betweenness(graph), known?.betweenness ?? [], 1e-14);
    const { harmonic, wassermanFaust } = closeness(graph);
    expectClose(wassermanFaust.value, known?.close ?? [], 1e-14);
    expectClose(harmonic.value, known?.harmonic ?? [], 1e-14);
  });

  it("is no estimate once everyone is drawn", () => {
    const everyone = { sources: hand.n };
    const exact = pathFigures(graph);
    const figures = sampledPathFigures(graph, 1000, createStream(1, 0));
    expect(figures).toMatchObject({ ...everyone, diameterAtLeast: exact.diameter });
    expect(figures.reachableShare).toEqual(exact.reachableShare);
    for (const name of ["meanPath", "efficiency"] as const) {
      expect(figures[name].value?.value).toBeCloseTo(exact[name].value ?? Number.NaN, 14);
      expect(figures[name].value?.standardError).toBe(0);
    }
    const between = sampledBetweenness(graph, 1000, createStream(1, 0));
    expect(between.sources).toBe(hand.n);
    expectClose(between.value, known?.betweenness ?? [], 1e-14);
    const close = sampledCloseness(graph, 1000, createStream(1, 0)).value;
    expectClose(close?.value ?? null, known?.harmonic ?? [], 1e-14);
    expectClose(close?.standardError ?? null, times(hand.n, 0), 0);
  });
});

// Source: methods C.6.3: the triangle's people of H3 have 0.4, 1 and 0.4.
it("tells the forms of closeness apart in a disconnected network", () => {
  const { harmonic, wassermanFaust, withinGroup } = closeness(graphOf(6, linksOf("01 02 12 34")));
  expect(wassermanFaust.value?.[0]).toBeCloseTo(0.4, 14);
  expect(harmonic.value?.[0]).toBeCloseTo(0.4, 14);
  expect(withinGroup).toEqual([1, 1, 1, 1, 1, null]);
});

// Source: methods D.3, "Degenerate", and C.6.2.
describe("degenerate graphs", () => {
  it.each([
    [0, "no_people"],
    [1, "one_person"],
  ] as const)("%i people: nothing is defined", (n, reason) => {
    const graph = graphOf(n, []);
    const none = { value: null, reason };
    expect(pathFigures(graph)).toMatchObject({
      meanPath: none,
      diameter: none,
      reachableShare: none,
      efficiency: none,
    });
    expect(sampledPathFigures(graph, 8, createStream(1, 0))).toMatchObject({
      meanPath: none,
      diameterAtLeast: none,
      reachableShare: none,
      efficiency: none,
    });
    expect(closeness(graph)).toMatchObject({ harmonic: none, wassermanFaust: none });
    expect(sampledCloseness(graph, 8, createStream(1, 0))).toEqual(none);
    expect(Array.from(betweenness(graph))).toEqual(times(n, 0));
    expect(normalisedBetweenness(betweenness(graph)).reason).toBe("fewer_than_three_people");
    expect(eigenvectorCentrality(graph).reason).toBe(n === 0 ? "no_people" : "no_pairs");
  });

  it("two people with their pair: path 1, no betweenness to normalise", () => {
    const graph = graphOf(2, [[0, 1]]);
    expect(pathFigures(graph).meanPath.value).toBe(1);
    expect(closeness(graph).withinGroup).toEqual([1, 1]);
    expect(normalisedBetweenness(betweenness(graph))).toEqual({
      value: null,
      reason: "fewer_than_three_people",
    });
    expectClose(eigenvectorCentrality(graph).value?.centrality ?? null, times(2, Math.SQRT1_2));
  });

  it("several people and no pair: no path, but an efficiency of 0", () => {
    const graph = graphOf(5, []);
    const none = { value: null, reason: "no_reachable_pairs" };
    const zero = { value: 0, reason: null };
    expect(pathFigures(graph)).toMatchObject({
      meanPath: none,
      diameter: none,
      reachableShare: zero,
      efficiency: zero,
    });
    expect(sampledPathFigures(graph, 3, createStream(1, 0)).meanPath).toEqual(none);
    expect(Array.from(closeness(graph).harmonic.value ?? [])).toEqual(times(5, 0));
    expect(eigenvectorCentrality(graph)).toEqual({ value: null, reason: "no_pairs" });
  });
});
