import { describe, expect, it } from "vitest";
import {
  createStream,
  type ReplicatePlan,
  replicateRange,
  type Statistic,
  tracedDesign,
  tracedSampler,
} from "../../shared/core/index.ts";
import { endsOf } from "./support/graphs.ts";
import { chiLimit, meanOf, tally } from "./support/null-models.ts";

const STATISTICS: Statistic[] = [
  "meanDegree",
  "degreeVariance",
  "largestGroup",
  "groups",
  "people",
  "degreeAssortativity",
  "pairs",
];

// Source: methods C.7.6, own simulation of 3000 replicates, mean (SE): c_e, mean degree of
// interviewed people, its variance, largest group, groups, people recorded, assortativity.
const TABLE = [
  {
    n: 1000,
    c: 0.9,
    i: 50,
    sigma: 1,
    q: 1,
    rows: [
      [0.904, 0.0024],
      [1.7, 0.0041],
      [0.98, 0.004],
      [27.57, 0.24],
      [9.15, 0.09],
      [53.17, 0.05],
      [-0.221, 0.0023],
    ],
  },
  {
    n: 1000,
    c: 1,
    i: 50,
    sigma: 0.8,
    q: 1,
    rows: [
      [0.999, 0.0026],
      [1.724, 0.0032],
      [1.139, 0.005],
      [24.91, 0.18],
      [12.52, 0.06],
      [61.17, 0.11],
      [-0.216, 0.0022],
    ],
  },
  {
    n: 1000,
    c: 2,
    i: 50,
    sigma: 0.8,
    q: 1,
    rows: [
      [1.999, 0.0037],
      [2.751, 0.0038],
      [2.093, 0.009],
      [64.47, 0.36],
      [8.92, 0.05],
      [105.4, 0.17],
      [-0.34, 0.0015],
    ],
  },
  {
    n: 1000,
    c: 2,
    i: 100,
    sigma: 0.5,
    q: 0.7,
    rows: [
      [1.423, 0.0022],
      [1.903, 0.0024],
      [1.632, 0.005],
      [38.23, 0.32],
      [41.29, 0.1],
      [176.13, 0.2],
      [-0.237, 0.0014],
    ],
  },
  {
    n: 10_000,
    c: 1.5,
    i: 200,
    sigma: 0.9,
    q: 1,
    rows: [
      [1.501, 0.0016],
      [2.383, 0.0016],
      [1.576, 0.003],
      [182.06, 0.98],
      [20.27, 0.08],
      [316.79, 0.31],
      [-0.271, 0.001],
    ],
  },
] as const;
const NAMES = ["c_e", "mean degree", "variance", "largest", "groups", "people", "assortativity"];

describe("traced random mixing", () => {
  it.each(TABLE)("n $n, c $c, i $i, σ $sigma, q $q", ({ n, c, i, sigma, q, rows }) => {
    const plan: ReplicatePlan = {
      seed: 76,
      model: {
        kind: "traced",
        design: {
          population: n,
          interviews: i,
          pairProbability: c / (n - 1),
          recall: q,
          tracedShare: sigma,
        },
      },
      statistics: STATISTICS,
      degreeBins: 0,
      sizeBins: 0,
      attribute: null,
    };
    const columns: number[][] = STATISTICS.map(() => []);
    replicateRange(plan, 0, 1200, (_, row) => {
      for (const [at, value] of row.entries()) columns[at]?.push(value);
      return true;
    });
    const pairs = columns.pop() ?? [];
    const eligible = (i * (i - 1)) / 2 + i * (n - i);
    const all = [pairs.map((m) => ((n - 1) * m) / eligible), ...columns];
    rows.forEach(([mean, se], at) => {
      const own = meanOf(all[at] ?? []);
      // The table is rounded to its last digit.
      const rounding = Math.abs(mean) < 10 ? 0.0005 : 0.005;
      const limit = 4 * Math.hypot(own.se, se) + rounding;
      expect(Math.abs(own.mean - mean), NAMES[at]).toBeLessThan(limit);
    });
  });

  const design = {
    population: 5,
    interviews: 5,
    pairProbability: 0.4,
    recall: 1,
    tracedShare: 0.7,
  };

  it("with everybody interviewed and perfect recall is G(n,p) under other numbers", () => {
    // Exact: the number of pairs is binomial(10, 0.4), and the degrees of the first are too.
    const draws = 20_000;
    const byPairs = new Array<number>(11).fill(0);
    for (const [key, count] of tally(tracedSampler(design), draws, 77)) {
      const m = key === "" ? 0 : key.split(" ").length;
      byPairs[m] = (byPairs[m] ?? 0) + count;
    }
    const choose = [1, 10, 45, 120, 210, 252, 210, 120, 45, 10, 1];
    let chi = 0;
    choose.forEach((ways, m) => {
      const expected = draws * ways * 0.4 ** m * 0.6 ** (10 - m);
      chi += ((byPairs[m] ?? 0) - expected) ** 2 / expected;
    });
    expect(chi).toBeLessThan(chiLimit(10));
  });

  it("names a pair of two interviewed people with 1 − (1 − q)²", () => {
    const sampler = tracedSampler({ ...design, recall: 0.6 });
    const found = Array.from(
      { length: 6000 },
      (_, k) => sampler.sample(createStream(78, k)).length,
    );
    const { mean, se } = meanOf(found);
    expect(Math.abs(mean - 10 * 0.4 * (1 - 0.4 ** 2))).toBeLessThan(4 * se);
  });

  it("has the exact means of interviews chosen at random", () => {
    // Source: methods C.8.1, first and second row (exact), σ = 0.
    for (const [q, pairs, people] of [
      [1, 475.225225225, 455.080779655],
      [0.7, 337.86036036, 366.3927716],
    ] as const) {
      const sampler = tracedSampler({
        population: 1000,
        interviews: 100,
        pairProbability: 5 / 999,
        recall: q,
        tracedShare: 0,
      });
      const m: number[] = [];
      const n: number[] = [];
      for (let k = 0; k < 1000; k++) {
        const network = sampler.sample(createStream(79, k));
        m.push(network.length);
        n.push(network.people);
      }
      for (const [values, exact] of [
        [m, pairs],
        [n, people],
      ] as const) {
        const { mean, se } = meanOf(values);
        expect(Math.abs(mean - exact)).toBeLessThan(4 * se);
      }
    }
  });

  it("records distinct pairs, each with an interviewed end, and marks exactly the interviewed", () => {
    const sampler = tracedSampler({
      ...design,
      population: 300,
      interviews: 40,
      pairProbability: 0.01,
      recall: 0.8,
    });
    for (let k = 0; k < 50; k++) {
      const { people, a, b, length, isInterviewed } = sampler.sample(createStream(80, k));
      const flags = isInterviewed?.subarray(0, people) ?? new Uint8Array();
      expect(flags.reduce((sum, flag) => sum + flag, 0)).toBe(40);
      const keys = new Set<string>();
      for (let p = 0; p < length; p++) {
        const [u = -1, v = -1] = [a[p], b[p]];
        expect(u !== v && Math.max(u, v) < people).toBe(true);
        expect((flags[u] ?? 0) + (flags[v] ?? 0)).toBeGreaterThan(0);
        keys.add(`${Math.min(u, v)}-${Math.max(u, v)}`);
      }
      expect(keys.size).toBe(length);
    }
  });

  it("copes with nobody, nothing and everything", () => {
    const none = tracedSampler({ ...design, interviews: 0 }).sample(createStream(0, 0));
    expect([none.people, none.length]).toEqual([0, 0]);
    const empty = tracedSampler({ ...design, pairProbability: 0 }).sample(createStream(0, 0));
    expect([empty.people, empty.length]).toEqual([5, 0]);
    const full = tracedSampler({ ...design, interviews: 2, pairProbability: 1 });
    const { people, length } = full.sample(createStream(0, 0));
    expect([people, length]).toEqual([5, 7]);
    expect(() => tracedSampler({ ...design, recall: 1.1 })).toThrow(/recall/);
    expect(() => tracedSampler({ ...design, interviews: 6 })).toThrow(/interviews/);
  });
});

describe("tracedDesign", () => {
  const record = {
    population: 1000,
    people: 6,
    order: Int32Array.of(0, 1, 3, 5),
    tellings: endsOf([
      [0, 1],
      [0, 2],
      [1, 0],
      [3, 4],
      [2, 4],
    ]),
    directed: true,
    recall: null,
  };

  it("reads i, p and σ by hand", () => {
    // Pairs with an interviewed end: 0-1, 0-2, 3-4. Person 0 comes while nobody is named; person 1
    // was named; persons 3 and 5 were not while 2 (and 4) waited: σ = 1/3.
    expect(tracedDesign(record)).toEqual({
      population: 1000,
      interviews: 4,
      pairProbability: 3 / (6 + 4 * 996),
      recall: 1,
      tracedShare: 1 / 3,
    });
  });

  it("takes a telling without direction as the earlier end's", () => {
    const tellings = endsOf([
      [1, 0],
      [2, 0],
      [4, 3],
    ]);
    expect(tracedDesign({ ...record, tellings, directed: true })?.tracedShare).toBe(0);
    expect(tracedDesign({ ...record, tellings, directed: false })?.tracedShare).toBe(1 / 3);
  });

  it("corrects p for recall", () => {
    const { pairProbability } = tracedDesign({ ...record, recall: 0.7 }) ?? { pairProbability: 0 };
    expect(pairProbability).toBeCloseTo(3 / (6 * 0.91 + 4 * 996 * 0.7), 14);
  });

  it("recovers σ from what it simulates", () => {
    // Nearly everybody traced while anyone waits; uniform choices hit a waiting person rarely.
    const sampler = tracedSampler({
      population: 5000,
      interviews: 60,
      pairProbability: 3 / 4999,
      recall: 1,
      tracedShare: 0.6,
    });
    const shares: number[] = [];
    for (let k = 0; k < 200; k++) {
      const { people, a, b, length, isInterviewed } = sampler.sample(createStream(81, k));
      // Recorded people are numbered as they come on record, so a pair's first end names the second
      // and the order of interviews is that of the first pairs they name.
      const order: number[] = [];
      for (let p = 0; p < length; p++) if (!order.includes(a[p] ?? -1)) order.push(a[p] ?? -1);
      for (let u = 0; u < people; u++) {
        if (isInterviewed?.[u] === 1 && !order.includes(u)) order.push(u);
      }
      const design = tracedDesign({
        population: 5000,
        people,
        order: Int32Array.from(order),
        tellings: { a: a.slice(0, length), b: b.slice(0, length) },
        directed: true,
        recall: 1,
      });
      shares.push(design?.tracedShare ?? 0);
    }
    // People who name nobody are put last here, which blurs the order a little.
    expect(Math.abs(meanOf(shares).mean - 0.6)).toBeLessThan(0.05);
  });

  it("has nothing to say without interviews, and refuses what cannot be", () => {
    expect(tracedDesign({ ...record, order: new Int32Array(0) })).toBeNull();
    expect(() => tracedDesign({ ...record, population: 5 })).toThrow(RangeError);
    expect(() => tracedDesign({ ...record, order: Int32Array.of(0, 0) })).toThrow(/twice/);
    expect(() => tracedDesign({ ...record, order: Int32Array.of(6) })).toThrow(/nobody/);
    expect(() => tracedDesign({ ...record, recall: 0 })).toThrow(/recall/);
    const self = endsOf([[1, 1]]);
    expect(() => tracedDesign({ ...record, tellings: self })).toThrow(/same person/);
  });
});
