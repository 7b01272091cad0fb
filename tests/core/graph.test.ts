import { describe, expect, it } from "vitest";
import {
  buildGraph,
  components,
  countedPairs,
  inducedSubgraph,
  isolates,
  meanDegreeInterviewed,
} from "../../shared/core/index.ts";
import { endsOf, graphOf, linksOf } from "./support/graphs.ts";

describe("building the graph", () => {
  it("sorts rows and counts repeated and reversed pairs once", () => {
    const graph = graphOf(5, [
      [3, 1],
      [0, 3],
      [1, 3],
      [3, 0],
      [4, 3],
      [3, 1],
    ]);
    expect(graph.m).toBe(3);
    expect(Array.from(graph.offsets)).toEqual([0, 1, 2, 2, 5, 6]);
    expect(Array.from(graph.neighbours)).toEqual([3, 3, 0, 1, 4, 3]);
  });

  it("uses only the filled part of growing buffers", () => {
    const ends = endsOf(linksOf("01 12 00"));
    expect(buildGraph(3, ends, 2).m).toBe(2);
    expect(buildGraph(3, ends, 0).m).toBe(0);
  });

  it("holds nobody, and people without pairs", () => {
    expect(graphOf(0, [])).toMatchObject({ n: 0, m: 0 });
    expect(isolates(graphOf(3, []))).toBe(3);
  });

  it("leaves its input as it was", () => {
    const ends = endsOf(linksOf("21 10"));
    buildGraph(3, ends);
    expect([Array.from(ends.a), Array.from(ends.b)]).toEqual([
      [2, 1],
      [1, 0],
    ]);
  });

  it.each([
    ["a self pair", () => graphOf(3, [[1, 1]])],
    ["a person beyond the last", () => graphOf(3, [[1, 3]])],
    ["a negative person", () => graphOf(3, [[-1, 0]])],
    ["a fraction of a person", () => graphOf(2.5, [])],
    ["more tellings than there are", () => buildGraph(3, endsOf(linksOf("01")), 2)],
  ])("refuses %s", (_, call) => {
    expect(call).toThrow(RangeError);
  });
});

describe("connected groups", () => {
  // Source: methods C.6.1: size descending, then smallest person.
  it("are ordered by size, then by smallest person", () => {
    const { component, sizes } = components(graphOf(9, linksOf("15 67 78 23")));
    expect(Array.from(sizes)).toEqual([3, 2, 2, 1, 1]);
    expect(Array.from(component)).toEqual([3, 1, 2, 2, 4, 1, 0, 0, 0]);
  });

  it("survive a chain of 200,000 people", () => {
    const n = 200_000;
    const a = Int32Array.from({ length: n - 1 }, (_, k) => k);
    const b = Int32Array.from({ length: n - 1 }, (_, k) => k + 1);
    expect(Array.from(components(buildGraph(n, { a, b })).sizes)).toEqual([n]);
  });
});

describe("induced subgraph", () => {
  it("keeps the chosen people and the pairs among them", () => {
    const graph = graphOf(5, linksOf("01 02 12 23 34"));
    const { graph: part, original } = inducedSubgraph(graph, Uint8Array.of(1, 0, 1, 1, 0));
    expect(Array.from(original)).toEqual([0, 2, 3]);
    expect(part).toEqual(graphOf(3, linksOf("01 12")));
  });

  it("of everyone is the graph, of nobody is empty", () => {
    const graph = graphOf(3, linksOf("01 12"));
    expect(inducedSubgraph(graph, Uint8Array.of(1, 1, 1)).graph).toEqual(graph);
    expect(inducedSubgraph(graph, new Uint8Array(3)).graph).toEqual(graphOf(0, []));
  });
});

describe("pairs an interview could have told", () => {
  const graph = graphOf(5, linksOf("01 02 12 23 34"));

  it("count once, also between two interviewed people", () => {
    expect(countedPairs(graph, Uint8Array.of(1, 1, 0, 0, 0))).toBe(3);
    expect(countedPairs(graph, Uint8Array.of(0, 0, 0, 1, 0))).toBe(2);
    expect(countedPairs(graph, Uint8Array.of(1, 1, 1, 1, 1))).toBe(5);
    expect(countedPairs(graph, new Uint8Array(5))).toBe(0);
  });

  it("count at both ends in the mean degree of interviewed people", () => {
    expect(meanDegreeInterviewed(graph, Uint8Array.of(1, 1, 0, 0, 0)).value).toBe(2);
    expect(meanDegreeInterviewed(graph, new Uint8Array(5))).toEqual({
      value: null,
      reason: "no_one_interviewed",
    });
  });

  it("need one flag per person", () => {
    const short = new Uint8Array(4);
    expect(() => countedPairs(graph, short)).toThrow(RangeError);
    expect(() => meanDegreeInterviewed(graph, short)).toThrow(RangeError);
    expect(() => inducedSubgraph(graph, short)).toThrow(RangeError);
  });
});
