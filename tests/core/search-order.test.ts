import { describe, expect, it } from "vitest";
import { foldLeaves, searchOrder } from "../../shared/core/index.ts";
import { contactSets, graphOf, linksOf, randomLinks } from "./support/graphs.ts";

describe("search order", () => {
  it("is the same graph with other numbers, rows sorted", () => {
    const n = 60;
    const links = randomLinks(n, 0.04, 8);
    const { graph, original } = searchOrder(graphOf(n, links));
    expect(Array.from(original).sort((a, b) => a - b)).toEqual(
      Array.from({ length: n }, (_, u) => u),
    );
    const contacts = contactSets(n, links);
    for (let x = 0; x < n; x++) {
      const row = Array.from(graph.neighbours.slice(graph.offsets[x], graph.offsets[x + 1]));
      expect(row).toEqual([...row].sort((a, b) => a - b));
      expect(new Set(row.map((y) => original[y]))).toEqual(contacts[original[x] ?? -1]);
    }
  });

  it("starts with the person with most pairs, then by distance from them", () => {
    const { original } = searchOrder(graphOf(7, linksOf("01 12 23 24 56")));
    expect(Array.from(original)).toEqual([2, 1, 3, 4, 0, 5, 6]);
  });
});

describe("folding", () => {
  // Two triangles joined by a pair, one person hanging from the second, one alone: H7 of the sheet.
  it("takes a hanging person into their neighbour", () => {
    const folded = foldLeaves(graphOf(8, linksOf("01 02 12 23 34 35 45 56")));
    expect(Array.from(folded.folded)).toEqual([0, 0, 0, 0, 0, 0, 1, 0]);
    expect(Array.from(folded.standIn)).toEqual([0, 1, 2, 3, 4, 5, 5, 7]);
    expect(Array.from(folded.weight)).toEqual([1, 1, 1, 1, 1, 2, 1, 1]);
    // Between 6 and the five others of their group.
    expect(Array.from(folded.throughTrees)).toEqual([0, 0, 0, 0, 0, 5, 0, 0]);
  });

  it("leaves one person of a tree, who stands for all", () => {
    const folded = foldLeaves(graphOf(5, linksOf("01 12 23 34")));
    expect(folded.folded.reduce((sum, flag) => sum + flag, 0)).toBe(4);
    expect(new Set(folded.standIn).size).toBe(1);
    expect(folded.weight[folded.standIn[0] ?? -1]).toBe(5);
    expect(Array.from(folded.throughTrees)).toEqual([0, 3, 4, 3, 0]);
  });
});
