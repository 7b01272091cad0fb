import { describe, expect, it } from "vitest";
import {
  addSampledChunks,
  betweenness,
  betweennessPlan,
  closeness,
  createStream,
  drawPeople,
  drawSources,
  type Estimate,
  pathFigures,
  SOURCE_CHUNKS,
  sampledBetweenness,
  sampledBetweennessChunk,
  sampledCloseness,
  sampledPathFigures,
} from "../../shared/core/index.ts";
import { graphOf, randomLinks } from "./support/graphs.ts";

const N = 160;
const SOURCES = 40;
const REPLICATES = 600;
// Sparse enough for isolates, small groups and hanging trees.
const graph = graphOf(N, randomLinks(N, 0.018, 5));

const mean = (values: readonly number[]) =>
  values.reduce((sum, value) => sum + value, 0) / values.length;
const variance = (values: readonly number[]) => {
  const middle = mean(values);
  return values.reduce((sum, value) => sum + (value - middle) ** 2, 0) / (values.length - 1);
};

/**
 * The estimates lie around the exact value (within 4 standard errors of their mean) and the error
 * they name is the one they have (the spread of 600 values is known to ± 12 % at 2 of its own
 * standard errors when they are near normal; twice that is allowed).
 */
function expectHonest(estimates: readonly Estimate[], exact: number, bias = 0): void {
  const values = estimates.map(({ value }) => value);
  const spread = variance(values);
  const error = Math.sqrt(spread / values.length);
  expect(Math.abs(mean(values) - exact)).toBeLessThan(4 * error + bias);
  const named = mean(estimates.map(({ standardError }) => standardError ** 2));
  expect(named / spread).toBeGreaterThan(0.76);
  expect(named / spread).toBeLessThan(1.24);
}

const replicate = <T>(draw: (k: number) => T): T[] =>
  Array.from({ length: REPLICATES }, (_, k) => draw(k));

// Source: own simulation; unbiased by the theory of simple random sampling.
describe("estimates from 40 of 160 people", () => {
  it("path figures", () => {
    const exact = pathFigures(graph);
    const drawn = replicate((k) => sampledPathFigures(graph, SOURCES, createStream(11, k)));
    const of = (name: "meanPath" | "efficiency") =>
      drawn.flatMap((figures) => figures[name].value ?? []);
    expect(of("meanPath").length).toBe(REPLICATES);
    expectHonest(of("efficiency"), exact.efficiency.value ?? Number.NaN);
    // A ratio is biased by about its variance; that is far below one standard error here.
    expectHonest(of("meanPath"), exact.meanPath.value ?? Number.NaN, 0.005);
    for (const figures of drawn) {
      expect(figures.reachableShare.value).toBeCloseTo(exact.reachableShare.value ?? -1, 14);
      expect(figures.diameterAtLeast.value).toBeLessThanOrEqual(exact.diameter.value ?? 0);
      expect(figures.sources).toBe(SOURCES);
    }
    const met = drawn.filter((figures) => figures.diameterAtLeast.value === exact.diameter.value);
    expect(met.length).toBeGreaterThan(REPLICATES / 2);
  });

  it("betweenness of those with most, and of those known exactly", () => {
    const exact = betweenness(graph);
    const drawn = replicate((k) => sampledBetweenness(graph, SOURCES, createStream(12, k)));
    const ranked = Array.from(exact.keys()).sort((u, v) => (exact[v] ?? 0) - (exact[u] ?? 0));
    for (const u of ranked.slice(0, 6)) {
      expectHonest(
        drawn.map(({ value, standardError }) => ({
          value: value[u] ?? Number.NaN,
          standardError: standardError[u] ?? Number.NaN,
        })),
        exact[u] ?? Number.NaN,
      );
    }
    // Folded people need no estimate.
    const { coreOf, original } = betweennessPlan(graph);
    const folded = Array.from(coreOf.keys()).filter((u) => !original.includes(u));
    expect(folded.length).toBeGreaterThan(20);
    for (const u of folded) {
      expect(drawn[0]?.value[u]).toBe(exact[u]);
      expect(drawn[0]?.standardError[u]).toBe(0);
    }
  });

  it("harmonic closeness", () => {
    const exact = closeness(graph).harmonic.value ?? new Float64Array();
    const drawn = replicate((k) => sampledCloseness(graph, SOURCES, createStream(13, k)).value);
    const ranked = Array.from(exact.keys()).sort((u, v) => (exact[v] ?? 0) - (exact[u] ?? 0));
    for (const u of [...ranked.slice(0, 3), ...ranked.slice(60, 63)]) {
      expectHonest(
        drawn.map((answer) => ({
          value: answer?.value[u] ?? Number.NaN,
          standardError: answer?.standardError[u] ?? Number.NaN,
        })),
        exact[u] ?? Number.NaN,
      );
    }
  });
});

describe("drawing", () => {
  it("takes each person once, ascending, and everyone when asked for more", () => {
    const people = Array.from(drawPeople(50, 20, createStream(1, 0)));
    expect(new Set(people).size).toBe(20);
    expect([...people].sort((a, b) => a - b)).toEqual(people);
    expect(Array.from(drawPeople(3, 20, createStream(1, 0)))).toEqual([0, 1, 2]);
  });

  it("gives each of the 10 pairs of 5 people alike", () => {
    const counts = new Map<string, number>();
    for (let k = 0; k < 5000; k++) {
      const key = drawPeople(5, 2, createStream(3, k)).join();
      counts.set(key, (counts.get(key) ?? 0) + 1);
    }
    // 500 expected of each, standard error sqrt(5000 · 0.1 · 0.9) = 21.2.
    expect(counts.size).toBe(10);
    for (const count of counts.values()) expect(Math.abs(count - 500)).toBeLessThan(4 * 21.3);
  });

  it("is repeatable, and the same for any number of workers", () => {
    const once = sampledBetweenness(graph, SOURCES, createStream(7, 1));
    expect(sampledBetweenness(graph, SOURCES, createStream(7, 1))).toEqual(once);
    expect(sampledBetweenness(graph, SOURCES, createStream(7, 2))).not.toEqual(once);
    const plan = betweennessPlan(graph);
    const drawn = drawSources(plan, SOURCES, createStream(7, 1));
    const backwards = Array.from({ length: SOURCE_CHUNKS }, (_, k) =>
      sampledBetweennessChunk(plan, drawn, SOURCE_CHUNKS - 1 - k),
    );
    expect(addSampledChunks(plan, drawn, backwards.reverse())).toEqual(once);
  });

  it("refuses fewer than two sources", () => {
    for (const sources of [1, 0, -1, 2.5, Number.NaN]) {
      expect(() => sampledPathFigures(graph, sources, createStream(1, 0))).toThrow(RangeError);
      expect(() => sampledBetweenness(graph, sources, createStream(1, 0))).toThrow(RangeError);
      expect(() => sampledCloseness(graph, sources, createStream(1, 0))).toThrow(RangeError);
    }
  });

  it("says so when nobody drawn has a contact", () => {
    const lonely = graphOf(400, [[0, 1]]);
    expect(sampledPathFigures(lonely, 2, createStream(1, 0))).toMatchObject({
      meanPath: { value: null, reason: "sample_too_small" },
      diameterAtLeast: { value: null, reason: "sample_too_small" },
    });
  });
});
