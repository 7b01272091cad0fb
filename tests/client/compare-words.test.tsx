// @vitest-environment jsdom
import { describe, expect, it } from "vitest";
import { compareRunAnswer } from "../../shared/contracts/compare.ts";
import { COMPARABILITY, COMPARISON_KEYS } from "../../shared/core/index.ts";
import { comparisonReason, comparisonWords } from "../../src/features/compare/comparison-words.ts";
import { curvePoints, outsideWords } from "../../src/features/compare/plots/curve-data.ts";
import { histogramTable } from "../../src/features/compare/plots/histogram-data.ts";
import { plotCsv } from "../../src/features/compare/plots/plot-csv.ts";
import { plotSvg } from "../../src/features/compare/plots/plot-svg.ts";
import {
  formatP,
  replicateSentence,
  verdictWords,
} from "../../src/features/compare/run-verdict.ts";
import { figureOf, resultOf, runOf } from "./support/compare-answers.ts";

describe("words and figures of a comparison", () => {
  it("has words of its own for every comparison and every reason of the table", () => {
    for (const key of COMPARISON_KEYS) {
      expect(comparisonWords[key].length).toBeGreaterThan(20);
      for (const { reason } of Object.values(COMPARABILITY[key])) {
        if (reason) expect(comparisonReason(reason)).not.toMatch(/no reason|could not be worked/);
      }
    }
  });

  it("reads r of N back from p (methods C.7.4: 0 of 999, 49 of 999)", () => {
    expect(replicateSentence(figureOf([1, 0, 2], 0), 999)).toContain("0 of 999");
    expect(replicateSentence(figureOf([1, 0, 2], 49), 999)).toBe(
      "49 of 999 random networks had a value as high: p = 0.05.",
    );
    const low = figureOf([1, 0, 2], 990);
    expect(replicateSentence(low, 999)).toContain("9 of 999 random networks had a value as low");
    const some = figureOf([1, 0, 2], 0, { pUpper: 1 / 990, undefinedReplicates: 10 });
    expect(replicateSentence(some, 999)).toContain("0 of 989");
    expect(replicateSentence(some, 999)).toContain("In 10 more it had no value");
    // Methods C.7.4: 12 of 199 gives 0.065.
    expect(formatP(13 / 200)).toBe("0.07");
  });

  it("keeps greyed baselines out of the verdict", () => {
    const result = resultOf("traced");
    const [measure] = result.measures.filter(({ statistic }) => statistic === "transitivity");
    if (!measure) throw new Error("no transitivity");
    expect(verdictWords(measure, result)).toContain("random mixing seen the same way");
    const unseen = {
      ...result,
      baselines: result.baselines.map((one) => ({ ...one, standing: "grey" as const })),
    };
    expect(verdictWords(measure, unseen)).toContain("no baseline may be held against this network");
    expect(verdictWords({ ...measure, observed: null, reason: "no_two_paths" }, result)).toBe(
      "no value: nobody here has two contact pairs",
    );
  });

  it("turns to the next baseline where invented people have no attributes", () => {
    const result = resultOf("traced");
    const measure = {
      statistic: "ei" as const,
      observed: 0.5,
      reason: null,
      monotone: "either" as const,
      baselines: { degreePreservingInterviewedEnd: figureOf([0.1, 0, 0.2], 400) },
    };
    expect(verdictWords(measure, result)).toBe(
      "not told apart from networks with the same numbers of pairs",
    );
  });

  it("marks the bin of the network on record, also outside of all random networks", () => {
    const histogram = { from: 0, to: 10, counts: [1, 2, 3, 4, 5] };
    const places = (observed: number) =>
      histogramTable(histogram, observed).rows.map((row) => row[3]);
    expect(places(10)).toEqual(["", "", "", "", "here"]);
    expect(places(4)).toEqual(["", "", "here", "", ""]);
    expect(places(-1)).toEqual(["here", "", "", "", "", ""]);
  });

  it("cuts a curve after its last entry and finds where it leaves the envelope", () => {
    const points = curvePoints(resultOf().degrees, "gnm", 0);
    expect(points).toHaveLength(18);
    expect(outsideWords(points, "pairs")).toContain("at 16, 17 pairs");
    expect(
      curvePoints({ observed: [3, 1, 0, 0], baselines: {} }, null, 1).map(({ at }) => at),
    ).toEqual([1, 2]);
  });

  it("saves figures that no spreadsheet runs, with minus signs kept", () => {
    expect(
      plotCsv({
        head: ["a", "b"],
        rows: [
          ["=1+1", -0.5],
          ["x", null],
        ],
      }),
    ).toBe(`"a","b"\r\n"'=1+1",-0.5\r\n"x",""\r\n`);
  });

  it("saves a drawing with its colours inside, without classes or style sheets", () => {
    document.documentElement.style.setProperty("--paper", "#fbfaf6");
    const space = "http://www.w3.org/2000/svg";
    const svg = document.createElementNS(space, "svg");
    svg.setAttribute("width", "300");
    svg.setAttribute("height", "120");
    const line = document.createElementNS(space, "path");
    line.setAttribute("class", "hairline");
    line.style.setProperty("stroke", "rgb(1, 2, 3)");
    svg.append(line);
    document.body.append(svg);
    const text = plotSvg(svg, "People < groups");
    svg.remove();
    expect(text).toContain('viewBox="0 0 300 120"');
    expect(text).toContain("<title>People &lt; groups</title>");
    expect(text).toContain('stroke="rgb(1, 2, 3)"');
    expect(text).not.toMatch(/class=|style=/);
  });

  it("is tested on answers that keep to the contract", () => {
    for (const state of ["complete", "traced"] as const) {
      expect(compareRunAnswer.safeParse(runOf({ result: resultOf(state) })).success).toBe(true);
    }
  });
});
