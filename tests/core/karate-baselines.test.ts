import { describe, expect, it } from "vitest";
import {
  observedRow,
  type ReplicatePlan,
  replicateRange,
  STATISTICS,
  type Statistic,
} from "../../shared/core/index.ts";
import { endsOf, type Links } from "./support/graphs.ts";
import { meanOf, networkOf } from "./support/null-models.ts";
import { karate } from "./support/published-networks.ts";

/** All figures of a network by name. */
function figures(n: number, links: Links, attribute: Int32Array | null = null, flags?: Uint8Array) {
  const choice = { statistics: STATISTICS, degreeBins: 0, sizeBins: 0, attribute };
  const row = observedRow(choice, networkOf(n, links, flags ?? null));
  return Object.fromEntries(STATISTICS.map((name, at) => [name, row[at] ?? 0])) as Record<
    Statistic,
    number
  >;
}

describe("karate club against its baselines", () => {
  // Source: methods C.7.5, own simulation of 4000 replicates: mean (SE), sd.
  const clubs = Int32Array.from({ length: 34 }, (_, u) =>
    [0, 1, 2, 3, 4, 5, 6, 7, 8, 10, 11, 12, 13, 16, 17, 19, 21].includes(u) ? 0 : 1,
  );
  const { n, links } = karate();
  const names: Statistic[] = [
    "transitivity",
    "triangles",
    "averageClustering",
    "degreeAssortativity",
    "largestGroup",
    "maxDegree",
    "attributeModularity",
  ];
  const gnm = [
    [0.13567, 0.00048],
    [15.573, 0.06],
    [0.13359, 0.00059],
    [-0.06788, 0.0016],
    [33.786, 0.0074],
    [9.012, 0.017],
    [-0.01737, 0.00085],
  ];
  const kept = [
    [0.22354, 0.00041],
    [39.344, 0.072],
    [0.35599, 0.00082],
    [-0.30184, 0.00077],
    [34, 0.002],
    [17, 0],
    [-0.01898, 0.00075],
  ];
  const runs = [
    { name: "G(n,m)", model: { kind: "gnm", n, m: 78 } as const, table: gnm },
    {
      name: "degrees kept",
      model: {
        kind: "degreePreserving",
        n,
        pairs: endsOf(links),
        isInterviewed: null,
        proposalsPerPair: 100,
      } as const,
      table: kept,
    },
  ];
  it.each(runs)("$name", ({ model, table }) => {
    const plan: ReplicatePlan = {
      seed: 75,
      model,
      statistics: names,
      degreeBins: 0,
      sizeBins: 0,
      attribute: clubs,
    };
    const columns: number[][] = names.map(() => []);
    replicateRange(plan, 0, 1000, (_, row) => {
      for (const [at, value] of row.entries()) columns[at]?.push(value);
      return true;
    });
    table.forEach(([mean = 0, se = 0], at) => {
      const own = meanOf(columns[at] ?? []);
      expect(Math.abs(own.mean - mean), names[at]).toBeLessThanOrEqual(4 * Math.hypot(own.se, se));
    });
  });

  it("is extreme against random mixing and ordinary once degrees are kept", () => {
    const upper = runs.map(({ model }) => {
      const plan: ReplicatePlan = {
        seed: 74,
        model,
        statistics: ["transitivity"],
        degreeBins: 0,
        sizeBins: 0,
        attribute: null,
      };
      let atLeast = 0;
      replicateRange(plan, 0, 999, (_, row) => {
        if ((row[0] ?? 0) >= 45 / 176) atLeast++;
        return true;
      });
      return (atLeast + 1) / 1000;
    });
    expect(upper[0]).toBeLessThan(0.005);
    // 4000 replicates gave 0.130; 4 SE of 999 and 4000 together are 0.048.
    expect(Math.abs((upper[1] ?? 0) - 0.13)).toBeLessThan(0.048);
  });

  it("observed values are those of the table", () => {
    const found = figures(n, links, clubs);
    expect(found.attributeModularity).toBeCloseTo(0.358234714004, 11);
    // Source: methods C.5.3 (networkx = igraph).
    expect(found.attributeAssortativity).toBeCloseTo(0.717530864198, 11);
    expect(found.ei).toBeCloseTo(-0.717948717949, 11);
    expect(found.maxDegree).toBe(17);
  });
});

describe("figures that need a graph", () => {
  // Source: methods C.7.5, own simulation of 4000 replicates: mean (SE).
  it.each([
    [
      "G(n,m)",
      { kind: "gnm", n: 34, m: 78 } as const,
      [
        [2.39593, 0.00078],
        [80.73, 0.27],
        [3.126, 0.005],
      ],
    ],
    [
      "degrees kept",
      {
        kind: "degreePreserving",
        n: 34,
        pairs: endsOf(karate().links),
        isInterviewed: null,
        proposalsPerPair: 100,
      } as const,
      [
        [2.24994, 0.00072],
        [172.63, 0.23],
        [3.741, 0.007],
      ],
    ],
  ])("of the karate club under %s", (_, model, table) => {
    const statistics: Statistic[] = ["meanPath", "maxBetweenness", "maxCore"];
    const plan = { seed: 73, model, statistics, degreeBins: 0, sizeBins: 0, attribute: null };
    const columns: number[][] = statistics.map(() => []);
    replicateRange(plan, 0, 400, (_replicate, row) => {
      for (const [at, value] of row.entries()) columns[at]?.push(value);
      return true;
    });
    table.forEach(([mean = 0, se = 0], at) => {
      const own = meanOf(columns[at] ?? []);
      expect(Math.abs(own.mean - mean), statistics[at]).toBeLessThan(4 * Math.hypot(own.se, se));
    });
  });
});
