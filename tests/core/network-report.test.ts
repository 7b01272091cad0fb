import { describe, expect, it } from "vitest";
import { networkReport, type ReportOptions } from "../../shared/core/index.ts";
import { graphOf, linksOf, randomLinks } from "./support/graphs.ts";

const OPTIONS: ReportOptions = { declaredPopulation: null, presetWindow: true, recall: null };

describe("network report", () => {
  const graph = graphOf(6, linksOf("01 02 12 23 34"));
  const interviewed = Uint8Array.of(1, 1, 1, 0, 0, 0);

  it("describes everyone by default and reads the threshold from interviews", () => {
    const report = networkReport(graph, interviewed, OPTIONS);
    expect(report).toMatchObject({ people: 6, pairs: 5, componentSizes: [5, 1], isolates: 1 });
    // X = C(3,2) + 3·3 = 12 pairs, 4 of them told: c = 5 · 4/12, by the formula of the box at C.8.
    expect(report.threshold.pairsPerPerson).toBeCloseTo(5 / 3, 14);
    expect(report.threshold).toMatchObject({ population: "interviewed", n: 6, interviewed: 3 });
  });

  it("describes the interviewed people alone, with the same threshold", () => {
    const report = networkReport(graph, interviewed, { ...OPTIONS, describe: "interviewed" });
    expect(report).toMatchObject({ people: 3, pairs: 3, transitivity: 1, isolates: 0 });
    expect(report.threshold).toEqual(networkReport(graph, interviewed, OPTIONS).threshold);
  });

  it("takes a declared population for the threshold only", () => {
    const report = networkReport(graph, null, { ...OPTIONS, declaredPopulation: 1000 });
    expect(report).toMatchObject({ people: 6, meanDegree: 5 / 3 });
    expect(report.threshold).toMatchObject({ population: "complete", n: 1000 });
    expect(report.threshold.pairsPerPerson).toBeCloseTo(0.01, 15);
  });

  it("withholds the verdict below 90 % coverage when asked to", () => {
    const big = graphOf(60, randomLinks(60, 0.2, 5));
    const flags = Uint8Array.from({ length: 60 }, (_, k) => (k < 40 ? 1 : 0));
    const open = networkReport(big, flags, OPTIONS);
    const strict = networkReport(big, flags, { ...OPTIONS, coverageRequired: true });
    expect(open.threshold.verdict).toBe("above");
    expect(strict.threshold).toEqual({ ...open.threshold, verdict: null });
    expect(strict.reasons).toEqual({ "threshold.verdict": "coverage_low" });
  });

  it("survives JSON: no NaN, no undefined, no typed array", () => {
    const report = networkReport(graph, interviewed, OPTIONS);
    expect(JSON.parse(JSON.stringify(report))).toEqual(report);
  });

  it("refuses a declared population smaller than the people on record, and stray flags", () => {
    const small = { ...OPTIONS, declaredPopulation: 5 };
    expect(() => networkReport(graph, null, small)).toThrow(RangeError);
    expect(() => networkReport(graph, new Uint8Array(5), OPTIONS)).toThrow(RangeError);
  });
});
