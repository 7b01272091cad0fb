import { describe, expect, it } from "vitest";
import { mayCompareLargest, thresholdSentence } from "../../src/lib/threshold-sentence.ts";
import { summaryOf } from "./support/network-answers.ts";

// What may be said: methods C.2.4 and the box at the head of C.8.

const said = (summary: ReturnType<typeof summaryOf>, populationAtRisk: number | null = null) =>
  thresholdSentence(summary, { populationAtRisk });
const allWords = (words: ReturnType<typeof said>) => [words.sentence, ...words.notes].join(" ");

describe("threshold sentence", () => {
  it("names window length, days, and who was interviewed of whom", () => {
    const { sentence } = said(summaryOf());
    expect(sentence).toContain("one infectious window (13 days, May 15, 2026 to May 27, 2026)");
    expect(sentence).toContain("interviews with 214 of 1,036 people on record");
  });

  it("says above without a share while fewer than 90 % were interviewed", () => {
    const words = said(summaryOf());
    expect(words.sentence).toMatch(/^Above the threshold of 1 contact pair per person, /);
    expect(words.sentence).toContain("one connected group holding a large share of all people");
    expect(allWords(words)).not.toContain("59%");
    expect(words.notes).toContain("No recall estimate yet: the figure is a lower bound.");
  });

  it("gives the expected share beside the recorded one from 90 % coverage", () => {
    const words = said(summaryOf({ coverage: 0.9 }));
    expect(words.sentence).toContain("one connected group of about 59% of all people");
    expect(allWords(words)).toContain(
      "The largest recorded connected group holds 28%; random mixing would give about 59%.",
    );
  });

  it("never holds a recorded group against an expected share of 0", () => {
    const below = summaryOf({
      coverage: 1,
      threshold: { verdict: "below", expectedGiantShare: 0, pairsPerPerson: 0.5, recall: 0.9 },
    });
    expect(said(below).sentence).toMatch(/^Below the random-mixing threshold of 1 contact pair/);
    expect(allWords(said(below))).not.toContain("random mixing would give");
  });

  it("says that chance dominates inside the critical window", () => {
    const inside = summaryOf({ threshold: { verdict: "inside_window", pairsPerPerson: 1 } });
    expect(said(inside).sentence).toMatch(
      /^Inside the critical window \(0\.90–1\.10\), where group sizes are dominated by chance, /,
    );
  });

  it("names the verdicts that remain open, and why below is not said without recall", () => {
    const words = said(
      summaryOf({
        reasons: { "threshold.verdict": "recall_unknown" },
        threshold: {
          verdict: "not_distinguishable",
          pairsPerPerson: 0.6,
          openVerdicts: ["below", "inside_window", "above"],
        },
      }),
    );
    expect(words.sentence).toMatch(/^Not distinguishable from the threshold of 1 contact pair/);
    expect(words.notes).toEqual([
      "Still open: below it, inside the critical window or above it.",
      "“Below” is not said: without a recall estimate the figure is a lower bound.",
    ]);
  });

  it.each([
    ["too_few_people", "fewer than 30 interviewed (12 of 24)"],
    ["free_range", "any network passes 1 if the range is widened"],
    ["coverage_low", "fewer than 90 % of the people were interviewed"],
  ])("gives numbers only for %s", (reason, why) => {
    const words = said(
      summaryOf({
        reasons: { "threshold.verdict": reason },
        threshold: { verdict: null, n: 24, interviewed: 12 },
      }),
    );
    expect(words.sentence).toMatch(/^Numbers without a verdict, because /);
    expect(words.sentence).toContain(why);
    expect(allWords(words)).not.toMatch(/above the threshold|random-mixing threshold/i);
  });

  it("has no figure without interviews", () => {
    const none = summaryOf({
      reasons: { "threshold.pairsPerPerson": "no_one_interviewed" },
      threshold: { pairsPerPerson: null, pairsPerPersonInterval: null, verdict: null },
    });
    expect(said(none)).toEqual({
      sentence: "No figure can be given: nobody has been interviewed.",
      notes: [],
    });
  });

  it("shows the figure corrected for recall beside the figure", () => {
    const words = said(
      summaryOf({ threshold: { recall: 0.75, pairsPerPersonRecallCorrected: 2.016 } }),
    );
    expect(words.notes).toEqual([
      "Corrected for recall (estimated at 75%): 2.02 contact pairs per person.",
    ]);
  });

  it("tells declared people at risk, cases, and a complete network apart", () => {
    expect(said(summaryOf(), 1036).sentence).toContain("1,036 people at risk, as declared");
    expect(said(summaryOf({ population: "cases" })).sentence).toContain("of 1,036 cases");
    const complete = summaryOf({
      population: "all",
      from: null,
      to: null,
      coverage: 1,
      threshold: { population: "complete", n: 34, interviewed: 34, expectedGiantShare: 0.989 },
    });
    expect(said(complete).sentence).toContain(
      "all exposures, dated or not, in a network taken as complete (34 people)",
    );
    expect(mayCompareLargest(complete)).toBe(true);
    expect(mayCompareLargest(summaryOf({ coverage: null }))).toBe(false);
  });

  it("speaks of contact pairs and connected groups, never of nodes or infections", () => {
    const verdicts = ["below", "inside_window", "above", "not_distinguishable", null] as const;
    for (const verdict of verdicts) {
      const text = allWords(said(summaryOf({ coverage: 0.95, threshold: { verdict } })));
      expect(text).not.toMatch(/\b(nodes?|links?|degree|component|infection|outbreak)\b/i);
    }
  });
});
