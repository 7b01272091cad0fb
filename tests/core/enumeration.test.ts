import { describe, expect, it } from "vitest";
import { components, isolates, triangles } from "../../shared/core/index.ts";
import { graphOf, type Links } from "./support/graphs.ts";

const ALL_PAIRS: Links = [0, 1, 2, 3, 4].flatMap((a) =>
  [0, 1, 2, 3, 4].filter((b) => b > a).map((b) => [a, b] as const),
);

// Means over all graphs with m pairs, as [numerator, denominator].
// Source: methods C.3.1, complete enumeration in rational arithmetic (exact).
const TABLE = [
  {
    m: 0,
    graphs: 1,
    groups: [5, 1],
    largest: [1, 1],
    connected: [0, 1],
    alone: [5, 1],
    tri: [0, 1],
  },
  {
    m: 1,
    graphs: 10,
    groups: [4, 1],
    largest: [2, 1],
    connected: [0, 1],
    alone: [3, 1],
    tri: [0, 1],
  },
  {
    m: 2,
    graphs: 45,
    groups: [3, 1],
    largest: [8, 3],
    connected: [0, 1],
    alone: [5, 3],
    tri: [0, 1],
  },
  {
    m: 3,
    graphs: 120,
    groups: [25, 12],
    largest: [11, 3],
    connected: [0, 1],
    alone: [5, 6],
    tri: [1, 12],
  },
  {
    m: 4,
    graphs: 210,
    groups: [59, 42],
    largest: [191, 42],
    connected: [25, 42],
    alone: [5, 14],
    tri: [1, 3],
  },
  {
    m: 5,
    graphs: 252,
    groups: [47, 42],
    largest: [205, 42],
    connected: [37, 42],
    alone: [5, 42],
    tri: [5, 6],
  },
  {
    m: 6,
    graphs: 210,
    groups: [43, 42],
    largest: [209, 42],
    connected: [41, 42],
    alone: [1, 42],
    tri: [5, 3],
  },
  {
    m: 7,
    graphs: 120,
    groups: [1, 1],
    largest: [5, 1],
    connected: [1, 1],
    alone: [0, 1],
    tri: [35, 12],
  },
  {
    m: 8,
    graphs: 45,
    groups: [1, 1],
    largest: [5, 1],
    connected: [1, 1],
    alone: [0, 1],
    tri: [14, 3],
  },
  {
    m: 9,
    graphs: 10,
    groups: [1, 1],
    largest: [5, 1],
    connected: [1, 1],
    alone: [0, 1],
    tri: [7, 1],
  },
  {
    m: 10,
    graphs: 1,
    groups: [1, 1],
    largest: [5, 1],
    connected: [1, 1],
    alone: [0, 1],
    tri: [10, 1],
  },
] as const;

describe("all 1024 graphs on five people", () => {
  const totals = TABLE.map(() => ({
    graphs: 0,
    groups: 0,
    largest: 0,
    connected: 0,
    alone: 0,
    tri: 0,
  }));
  for (let mask = 0; mask < 1024; mask++) {
    const links = ALL_PAIRS.filter((_, bit) => (mask >> bit) & 1);
    const graph = graphOf(5, links);
    const { sizes } = components(graph);
    const total = totals[links.length];
    if (!total) throw new Error("more pairs than five people can have");
    total.graphs++;
    total.groups += sizes.length;
    total.largest += sizes[0] ?? 0;
    total.connected += sizes.length === 1 ? 1 : 0;
    total.alone += isolates(graph);
    total.tri += triangles(graph);
  }

  it.each(TABLE)("$m pairs: exact means", (row) => {
    const total = totals[row.m];
    expect(total?.graphs).toBe(row.graphs);
    for (const key of ["groups", "largest", "connected", "alone", "tri"] as const) {
      const [numerator, denominator] = row[key];
      // Integers on both sides: the comparison is exact.
      expect((total?.[key] ?? -1) * denominator, key).toBe(row.graphs * numerator);
    }
  });
});
