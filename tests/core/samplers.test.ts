import { describe, expect, it } from "vitest";
import {
  buildGraph,
  components,
  createStream,
  gnmSampler,
  gnpSampler,
  pairAt,
  triangles,
} from "../../shared/core/index.ts";
import { chiLimit, chiSquared, fedStream, keyOf, meanOf, tally } from "./support/null-models.ts";

describe("pairAt", () => {
  it("numbers the pairs 0, 1, 2, … without a gap", () => {
    const out: [number, number] = [0, 0];
    let index = 0;
    for (let v = 1; v < 60; v++) {
      for (let u = 0; u < v; u++) {
        pairAt(index++, out);
        expect(out).toEqual([u, v]);
      }
    }
  });

  it("is exact at the ends of rows up to ten million people", () => {
    const out: [number, number] = [0, 0];
    for (const v of [46341, 65536, 94906266 >>> 1, 1_000_000, 9_999_999]) {
      const first = (v * (v - 1)) / 2;
      pairAt(first, out);
      expect(out).toEqual([0, v]);
      pairAt(first - 1, out);
      expect(out).toEqual([v - 2, v - 1]);
    }
  });
});

describe("G(n,p)", () => {
  it("jumps as traced by hand", () => {
    // Source: methods C.7.1 (exact): skips 0, 1, 6, 0, 3, 1.
    const stream = fedStream([0.1, 0.5, 0.9, 0.2, 0.7, 0.4]);
    const { a, b, length } = gnpSampler(6, 0.3).sample(stream);
    expect(Array.from({ length }, (_, k) => [a[k], b[k]])).toEqual([
      [1, 0],
      [2, 1],
      [4, 3],
      [5, 0],
      [5, 4],
    ]);
    expect(stream.used).toBe(6);
  });

  it("draws nothing at p = 0 and everything at p = 1, using no number", () => {
    for (const n of [1, 2, 7]) {
      expect(gnpSampler(n, 0).sample(fedStream([])).length).toBe(0);
      expect(gnpSampler(n, 1).sample(fedStream([])).length).toBe((n * (n - 1)) / 2);
    }
  });

  it("gives each of the 64 graphs on four people its probability", () => {
    const p = 0.3;
    const draws = 20_000;
    const counts = tally(gnpSampler(4, p), draws, 11);
    expect(counts.size).toBe(64);
    let chi = 0;
    for (const [key, count] of counts) {
      const m = key === "" ? 0 : key.split(" ").length;
      const expected = draws * p ** m * (1 - p) ** (6 - m);
      chi += (count - expected) ** 2 / expected;
    }
    expect(chi).toBeLessThan(chiLimit(63));
  });

  it("has the exact mean numbers of triangles and isolates", () => {
    // Source: methods C.3.3 and C.3.1 for n 34, p = 78/561; 4 SE of the simulation.
    const sampler = gnpSampler(34, 78 / 561);
    const found: number[] = [];
    const alone: number[] = [];
    for (let i = 0; i < 4000; i++) {
      const { people, length, a, b } = sampler.sample(createStream(12, i));
      const graph = buildGraph(people, { a, b }, length);
      found.push(triangles(graph));
      alone.push(components(graph).sizes.filter((size) => size === 1).length);
    }
    const three = meanOf(found);
    expect(Math.abs(three.mean - 16.08373130487)).toBeLessThan(4 * three.se);
    const isolates = meanOf(alone);
    expect(Math.abs(isolates.mean - 0.243197894333)).toBeLessThan(4 * isolates.se);
  });

  it("refuses what is no probability", () => {
    for (const p of [-0.1, 1.1, Number.NaN]) expect(() => gnpSampler(5, p)).toThrow(RangeError);
    for (const n of [-1, 1.5, 2 ** 31]) expect(() => gnpSampler(n, 0.5)).toThrow(RangeError);
  });
});

describe("G(n,m)", () => {
  // Source: methods C.3.1, complete enumeration of the graphs on five people (exact):
  // graphs, E[groups], E[largest], P(connected), E[isolates], E[triangles].
  const TABLE = [
    [0, 1, 5, 1, 0, 5, 0],
    [1, 10, 4, 2, 0, 3, 0],
    [2, 45, 3, 8 / 3, 0, 5 / 3, 0],
    [3, 120, 25 / 12, 11 / 3, 0, 5 / 6, 1 / 12],
    [4, 210, 59 / 42, 191 / 42, 25 / 42, 5 / 14, 1 / 3],
    [5, 252, 47 / 42, 205 / 42, 37 / 42, 5 / 42, 5 / 6],
    [6, 210, 43 / 42, 209 / 42, 41 / 42, 1 / 42, 5 / 3],
    [7, 120, 1, 5, 1, 0, 35 / 12],
    [8, 45, 1, 5, 1, 0, 14 / 3],
    [9, 10, 1, 5, 1, 0, 7],
    [10, 1, 1, 5, 1, 0, 10],
  ] as const;

  it.each(TABLE)("m = %i: each of the %i graphs on five people alike", (m, graphs, ...exact) => {
    const draws = 40 * graphs;
    const counts = tally(gnmSampler(5, m), draws, 20 + m);
    expect(counts.size).toBe(graphs);
    if (graphs > 1) expect(chiSquared(counts, graphs)).toBeLessThan(chiLimit(graphs - 1));

    const rows = Array.from({ length: 600 }, (_, i) => {
      const { a, b, length } = gnmSampler(5, m).sample(createStream(40 + m, i));
      expect(length).toBe(m);
      const graph = buildGraph(5, { a, b }, length);
      const { sizes } = components(graph);
      const [largest = 0] = sizes;
      const alone = sizes.filter((size) => size === 1).length;
      return [sizes.length, largest, sizes.length === 1 ? 1 : 0, alone, triangles(graph)];
    });
    exact.forEach((value, at) => {
      const { mean, se } = meanOf(rows.map((row) => row[at] ?? 0));
      expect(Math.abs(mean - value)).toBeLessThanOrEqual(4 * se + 1e-12);
    });
  });

  it("has the exact mean numbers of triangles and 2-paths", () => {
    // Source: methods C.3.3, n 34, m 78 and n 77, m 254; 4 SE of the simulation.
    for (const [n, m, three, two] of [
      [34, 78, 15.553488372093, 343.2],
      [77, 254, 47.335999158161, 1647.74358974359],
    ] as const) {
      const sampler = gnmSampler(n, m);
      const found: number[] = [];
      const paths: number[] = [];
      for (let i = 0; i < 2000; i++) {
        const { a, b, length } = sampler.sample(createStream(13, i));
        const { offsets, neighbours } = buildGraph(n, { a, b }, length);
        found.push(triangles({ n, m, offsets, neighbours }));
        let sum = 0;
        for (let u = 0; u < n; u++) {
          const degree = (offsets[u + 1] ?? 0) - (offsets[u] ?? 0);
          sum += (degree * (degree - 1)) / 2;
        }
        paths.push(sum);
      }
      const t = meanOf(found);
      const w = meanOf(paths);
      expect(Math.abs(t.mean - three)).toBeLessThan(4 * t.se);
      expect(Math.abs(w.mean - two)).toBeLessThan(4 * w.se);
    }
  });

  it("draws distinct pairs of a million people", () => {
    const { a, b, length } = gnmSampler(1_000_000, 50_000).sample(createStream(14, 0));
    expect(buildGraph(1_000_000, { a, b }, length).m).toBe(50_000);
    // Ends run over everybody: the mean of 100,000 of them has an SE of 913.
    const { mean } = meanOf([...a.subarray(0, length), ...b.subarray(0, length)]);
    expect(Math.abs(mean - 499_999.5)).toBeLessThan(4 * 913);
  });

  it("gives the same graph for the same stream, whatever was drawn before", () => {
    const used = gnmSampler(50, 70);
    for (let i = 0; i < 5; i++) used.sample(createStream(1, i));
    const again = keyOf(used.sample(createStream(1, 3)));
    expect(keyOf(gnmSampler(50, 70).sample(createStream(1, 3)))).toBe(again);
  });

  it("refuses more pairs than there are", () => {
    expect(() => gnmSampler(5, 11)).toThrow(/10 possible pairs/);
    expect(() => gnmSampler(1, 1)).toThrow(RangeError);
    expect(() => gnmSampler(5, 1.5)).toThrow(RangeError);
    expect(gnmSampler(0, 0).sample(createStream(0, 0)).length).toBe(0);
  });
});
