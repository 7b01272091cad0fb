import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  components,
  connectedProbability,
  connectivityLimit,
  connectivityOffset,
  distanceEstimates,
  expectedIsolatesGnm,
  expectedIsolatesGnp,
  expectedTrianglesGnm,
  expectedTrianglesGnp,
  expectedTwoPathsGnm,
  expectedTwoPathsGnp,
  isolates,
  lnConnectedProbability,
  triangles,
  twoPaths,
} from "../../shared/core/index.ts";
import { graphOf, linksOf } from "./support/graphs.ts";

/** p = (ln n + x)/n. */
const at = (n: number, x: number) => (Math.log(n) + x) / n;

/** Gilbert's recursion in fractions of whole numbers, p = top/64: exact, and slow. */
function gilbert(n: number, top: number): number {
  const missed = BigInt(64 - top);
  const whole = 64n;
  // connected[k] times 64^(k(k − 1)/2) is a whole number.
  const connected: bigint[] = [0n, 1n];
  const pairs = (k: number) => BigInt((k * (k - 1)) / 2);
  for (let k = 2; k <= n; k++) {
    let sum = whole ** pairs(k);
    let choose = 1n;
    for (let j = 1; j < k; j++) {
      const rest = whole ** (pairs(k) - pairs(j) - BigInt(j * (k - j)));
      sum -= choose * (connected[j] ?? 0n) * missed ** BigInt(j * (k - j)) * rest;
      choose = (choose * BigInt(k - j)) / BigInt(j);
    }
    connected.push(sum);
  }
  const scale = 10n ** 60n;
  const share = ((connected[n] ?? 0n) * scale) / whole ** pairs(n);
  return Number(share) / 1e60;
}

describe("exact probability of one group", () => {
  // Source: methods C.3.1, exact.
  it.each([
    [2, 0.5],
    [3, 0.5],
    [4, 0.59375],
    [5, 0.7109375],
    [6, 0.81494140625],
  ])("n %i, p ½", (n, expected) => {
    expect(connectedProbability(n, 0.5).value).toBeCloseTo(expected, 14);
  });

  // Source: methods C.3.1, computed with mpmath 1.2.1 at 60 digits.
  it.each([
    [10, 0, 0.230258509299, 0.347761855599, 0.367879441171, 0.948645758474],
    [10, 2, 0.430258509299, 0.937315001155, 0.873423018493, 0.0632558401006],
    [50, 0, 0.0782404601086, 0.392558053153, 0.367879441171, 0.923069535906],
    [50, 1, 0.0982404601086, 0.728564337738, 0.692200627555, 0.315076878273],
    [100, -1, 0.0360517018599, 0.0686160486222, 0.0659880358453, 2.63827675569],
    [100, 0, 0.0460517018599, 0.388619409846, 0.367879441171, 0.939634421559],
    [100, 1, 0.0560517018599, 0.717645984567, 0.692200627555, 0.331033977987],
    [100, 2, 0.0660517018599, 0.890978759885, 0.873423018493, 0.115334880724],
  ])("n %i, x %d", (n, x, p, exact, limit, alone) => {
    expect(at(n, x)).toBeCloseTo(p, 12);
    expect(connectivityOffset(n, at(n, x))).toBeCloseTo(x, 12);
    expect(connectedProbability(n, at(n, x)).value).toBeCloseTo(exact, 11);
    expect(connectivityLimit(x)).toBeCloseTo(limit, 11);
    expect(expectedIsolatesGnp(n, at(n, x))).toBeCloseTo(alone, 10);
  });

  it("keeps its digits where differences lose them", () => {
    // Source: Gilbert's recursion with mpmath 1.2.1 at 80 digits; in doubles it gives 5.6e-11.
    const tiny = connectedProbability(40, at(40, -3)).value ?? 0;
    expect(tiny / 2.871658162759471e-13).toBeCloseTo(1, 12);
    // The same for n = 100, c = 2; n = 30, c = ½; n = 150, c = 3, as logarithms.
    expect(lnConnectedProbability(100, 2 / 99).value).toBeCloseTo(-14.28962592263818, 11);
    expect(lnConnectedProbability(30, 0.5 / 29).value).toBeCloseTo(-28.28236312106807, 11);
    expect(lnConnectedProbability(150, 3 / 149).value).toBeCloseTo(-7.437352006402114, 11);
  });

  it("agrees with Gilbert's recursion in whole numbers", () => {
    for (const [n, top] of [
      [3, 1],
      [7, 3],
      [12, 20],
      [12, 63],
      [18, 8],
      [25, 5],
    ] as const) {
      const expected = gilbert(n, top);
      const got = connectedProbability(n, top / 64).value ?? 0;
      expect(got / expected).toBeCloseTo(1, 12);
    }
  });

  it("is the number of trees times p^(n − 1) where p is tiny", () => {
    // Source: Cayley 1889: n^(n − 2) trees on n labelled people.
    const p = 1e-12;
    const expected = 48 * Math.log(50) + 49 * Math.log(p);
    expect(lnConnectedProbability(50, p).value).toBeCloseTo(expected, 8);
  });

  it("rises with p, and with large n follows the limit", () => {
    let last = Number.NEGATIVE_INFINITY;
    for (let p = 0.001; p < 1; p += 0.037) {
      const now = lnConnectedProbability(60, p).value ?? 0;
      expect(now).toBeGreaterThanOrEqual(last - 1e-13);
      last = now;
    }
    expect(connectedProbability(3000, at(3000, 1)).value).toBeCloseTo(connectivityLimit(1), 2);
    expect(connectedProbability(1000, 0.9).value).toBeCloseTo(1, 12);
  });

  it("knows the ends and refuses what cannot be", () => {
    expect(connectedProbability(0, 0.3)).toEqual({ value: null, reason: "no_people" });
    expect([connectedProbability(1, 0).value, connectedProbability(5, 1).value]).toEqual([1, 1]);
    expect(connectedProbability(5, 0).value).toBe(0);
    expect(lnConnectedProbability(5, 0).value).toBe(Number.NEGATIVE_INFINITY);
    expect(lnConnectedProbability(10_001, 0.001).reason).toBe("too_many_people");
    expect(() => lnConnectedProbability(5, 1.5)).toThrow(RangeError);
    expect(() => lnConnectedProbability(2.5, 0.5)).toThrow(RangeError);
  });
});

describe("expected isolates", () => {
  it("in both models", () => {
    // Source: methods C.3.1, computed with mpmath 1.2.1 at 60 digits.
    expect(expectedIsolatesGnm(34, 78)).toBeCloseTo(0.207519628142, 11);
    expect(expectedIsolatesGnp(34, 78 / 561)).toBeCloseTo(0.243197894333, 11);
    expect(expectedIsolatesGnm(10, 9)).toBeCloseTo(1.062369627913, 11);
    expect(expectedIsolatesGnp(100, 2 / 99)).toBeCloseTo(13.259203227103, 11);
  });

  it("at the ends", () => {
    expect([expectedIsolatesGnp(0, 0.5), expectedIsolatesGnp(1, 0.5)]).toEqual([0, 1]);
    expect([expectedIsolatesGnm(0, 0), expectedIsolatesGnm(1, 0)]).toEqual([0, 1]);
    expect([expectedIsolatesGnm(6, 0), expectedIsolatesGnm(4, 6)]).toEqual([6, 0]);
    expect([expectedIsolatesGnp(6, 0), expectedIsolatesGnp(6, 1)]).toEqual([6, 0]);
    expect(() => expectedIsolatesGnm(3, 4)).toThrow(RangeError);
  });
});

describe("all 1024 graphs on five people", () => {
  const PAIRS = linksOf("01 02 03 04 12 13 14 23 24 34");
  const sums = Array.from({ length: 11 }, () => ({
    graphs: 0,
    alone: 0,
    three: 0,
    two: 0,
    one: 0,
  }));
  for (let mask = 0; mask < 1024; mask++) {
    const links = PAIRS.filter((_pair, k) => (mask >> k) & 1);
    const graph = graphOf(5, links);
    const sum = sums[links.length];
    if (!sum) continue;
    sum.graphs++;
    sum.alone += isolates(graph);
    sum.three += triangles(graph);
    sum.two += twoPaths(graph);
    if (components(graph).sizes.length === 1) sum.one++;
  }

  it("have the expected isolates, triangles and 2-paths for every m", () => {
    sums.forEach(({ graphs, alone, three, two }, m) => {
      expect(expectedIsolatesGnm(5, m)).toBeCloseTo(alone / graphs, 13);
      expect(expectedTrianglesGnm(5, m)).toBeCloseTo(three / graphs, 13);
      expect(expectedTwoPathsGnm(5, m)).toBeCloseTo(two / graphs, 12);
    });
  });

  it("have the probabilities and expectations of independent pairs", () => {
    for (const p of [0.1, 0.37, 0.8]) {
      const mean = (value: (sum: (typeof sums)[number]) => number) =>
        sums.reduce((total, sum, m) => total + value(sum) * p ** m * (1 - p) ** (10 - m), 0);
      expect(connectedProbability(5, p).value).toBeCloseTo(
        mean(({ one }) => one),
        13,
      );
      expect(expectedIsolatesGnp(5, p)).toBeCloseTo(
        mean(({ alone }) => alone),
        13,
      );
      expect(expectedTrianglesGnp(5, p)).toBeCloseTo(
        mean(({ three }) => three),
        13,
      );
      expect(expectedTwoPathsGnp(5, p)).toBeCloseTo(
        mean(({ two }) => two),
        12,
      );
    }
  });
});

describe("expected triangles and 2-paths", () => {
  // Source: methods C.3.3, computed with scipy 1.10.1.
  it.each([
    [34, 78, 16.08373130487, 15.553488372093, 343.2],
    [77, 254, 47.851164915956, 47.335999158161, 1647.74358974359],
  ])("n %i, m %i", (n, m, independent, fixed, paths) => {
    expect(expectedTrianglesGnp(n, (2 * m) / (n * (n - 1)))).toBeCloseTo(independent, 10);
    expect(expectedTrianglesGnm(n, m)).toBeCloseTo(fixed, 10);
    expect(expectedTwoPathsGnm(n, m)).toBeCloseTo(paths, 9);
  });

  it("are 0 for fewer than three people or too few pairs", () => {
    expect([expectedTrianglesGnm(2, 1), expectedTwoPathsGnm(2, 1)]).toEqual([0, 0]);
    expect([expectedTrianglesGnm(9, 2), expectedTwoPathsGnm(9, 1)]).toEqual([0, 0]);
    expect(() => expectedTrianglesGnm(3, -1)).toThrow(RangeError);
  });
});

describe("distance estimates", () => {
  // Source: methods C.3.2.
  it.each([
    [34, 156 / 34, 2.314651119622, 2.435775257185],
    [77, 508 / 77, 2.302358943786, 2.496415762746],
    [100, 4, 3.321928094887, 3.405555006249],
    [1000, 6, 3.855291626815, 4.033141430422],
    [10000, 10, 4, 4.249318421865],
  ])("n %i, c %d", (n, c, simple, fronczak) => {
    const estimates = distanceEstimates(n, c);
    expect(estimates.simple.value).toBeCloseTo(simple, 11);
    expect(estimates.fronczak.value).toBeCloseTo(fronczak, 11);
  });

  it("are undefined up to c = 1 and without two people", () => {
    const why = (n: number, c: number) => distanceEstimates(n, c).fronczak.reason;
    expect([why(50, 1), why(50, 0.3), why(1, 2), why(0, 2)]).toEqual([
      "not_above_threshold",
      "not_above_threshold",
      "one_person",
      "no_people",
    ]);
  });

  it("grow with people and fall with pairs", () => {
    const count = fc.integer({ min: 3, max: 100_000 });
    fc.assert(
      fc.property(count, fc.double({ min: 1.2, max: 50, noNaN: true }), (n, c) => {
        const now = distanceEstimates(n, c).simple.value ?? 0;
        expect(distanceEstimates(n + 1, c).simple.value ?? 0).toBeGreaterThan(now);
        expect(distanceEstimates(n, c * 1.1).simple.value ?? 0).toBeLessThan(now);
      }),
      { seed: 32, numRuns: 100 },
    );
  });
});
