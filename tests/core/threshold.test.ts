import { describe, expect, it } from "vitest";
import {
  density,
  meanDegree,
  regionsMet,
  type ThresholdInput,
  threshold,
  verdictOf,
} from "../../shared/core/index.ts";

const complete = (n: number, m: number, more: Partial<ThresholdInput> = {}) =>
  threshold({
    population: "complete",
    n,
    interviewed: n,
    countedPairs: m,
    presetWindow: true,
    coverageRequired: false,
    recall: null,
    ...more,
  });

const traced = (n: number, i: number, pairs: number, more: Partial<ThresholdInput> = {}) =>
  complete(n, pairs, { population: "interviewed", interviewed: i, ...more });

// Source: methods C.1.1, exact.
it("mean degree decides, not density: n 4, m 2 has density 1/3 > 1/4 but c exactly 1", () => {
  expect(density(4, 2).value).toBeCloseTo(1 / 3, 15);
  expect(density(4, 2).value).toBeGreaterThan(1 / 4);
  expect(meanDegree(4, 2).value).toBe(1);
  expect(complete(4, 2).expectedGiantShare).toBe(0);
});

describe("complete networks", () => {
  // Source: methods C.2.3 (Wilson limits computed with scipy 1.10.1); verdicts and what stays open
  // from C.2.4. n 1000, m 500 is given there to six digits.
  it.each([
    [34, 78, 4.588235294118, 3.724189049823, 5.614304183473, 12, "above", []],
    [
      50,
      20,
      0.8,
      0.519080019784,
      1.229096253725,
      12,
      "not_distinguishable",
      ["below", "inside_window"],
    ],
    [
      100,
      50,
      1,
      0.759385317366,
      1.315833380831,
      12,
      "not_distinguishable",
      ["below", "inside_window", "above"],
    ],
    [
      100,
      60,
      1.2,
      0.933464634455,
      1.541443883544,
      12,
      "not_distinguishable",
      ["inside_window", "above"],
    ],
    [
      200,
      80,
      0.8,
      0.643080182666,
      0.995018190092,
      12,
      "not_distinguishable",
      ["below", "inside_window"],
    ],
    [10, 0, 0, 0, 0.707864388596, 12, null, []],
    [1000, 500, 1, 0.916142, 1.091526, 6, "inside_window", []],
  ] as const)("n %i, m %i", (n, m, c, lower, upper, digits, verdict, open) => {
    const answer = complete(n, m);
    expect(answer.pairsPerPerson).toBeCloseTo(c, 11);
    expect(answer.pairsPerPersonInterval?.[0]).toBeCloseTo(lower, digits - 1);
    expect(answer.pairsPerPersonInterval?.[1]).toBeCloseTo(upper, digits - 1);
    expect(answer.verdict).toBe(verdict);
    expect(answer.openVerdicts).toEqual(open);
    expect(answer.interviewed).toBe(n);
  });

  // Source: methods C.2.3, column "window".
  it.each([
    [34, 0.691321, 1.308679],
    [50, 0.728558, 1.271442],
    [100, 0.784557, 1.215443],
    [200, 0.829002, 1.170998],
    [10, 0.535841, 1.464159],
  ])("critical window of n %i", (n, lower, upper) => {
    const w = complete(n, 0).criticalHalfWidth ?? Number.NaN;
    expect(1 - w).toBeCloseTo(lower, 6);
    expect(1 + w).toBeCloseTo(upper, 6);
  });

  it("m = 0 has a lower limit of exactly 0", () => {
    expect(complete(10, 0).pairsPerPersonInterval?.[0]).toBe(0);
  });

  it("needs no recall estimate to lie below", () => {
    expect(complete(1000, 100).verdict).toBe("below");
  });

  it("has a verdict from 30 people on", () => {
    expect(complete(29, 100)).toMatchObject({
      verdict: null,
      reasons: { verdict: "too_few_people" },
    });
    expect(complete(30, 100)).toMatchObject({ verdict: "above", reasons: {} });
  });

  it("has numbers but no verdict over a free date range", () => {
    expect(complete(1000, 5000, { presetWindow: false })).toMatchObject({
      pairsPerPerson: 10,
      verdict: null,
      reasons: { verdict: "free_range" },
    });
  });
});

describe("interviewed people", () => {
  // Source: methods, box at the head of C.8 (Wilson limits computed with scipy 1.10.1).
  it("i 100, n 1000, 475 pairs", () => {
    const answer = traced(1000, 100, 475);
    expect(answer.pairsPerPerson).toBeCloseTo(4.997630331754, 11);
    expect(answer.pairsPerPersonInterval?.[0]).toBeCloseTo(4.568890972301, 11);
    expect(answer.pairsPerPersonInterval?.[1]).toBeCloseTo(5.466380931629, 11);
    expect(answer).toMatchObject({ n: 1000, interviewed: 100, verdict: "above", reasons: {} });
  });

  it("with everyone interviewed gives the complete figures", () => {
    const everyone = traced(200, 200, 80);
    const whole = complete(200, 80);
    expect(everyone.pairsPerPerson).toBe(whole.pairsPerPerson);
    expect(everyone.pairsPerPersonInterval).toEqual(whole.pairsPerPersonInterval);
  });

  // Source: methods C.8.1, E[m_obs] of n 1000, c 5, i 100, q 0.7, exact: correction recovers c.
  it("corrects for recall", () => {
    const told = 337.86036036;
    const answer = traced(1000, 100, 338, { recall: 0.7 });
    expect(((answer.pairsPerPersonRecallCorrected ?? 0) * told) / 338).toBeCloseTo(5, 8);
    expect(answer.recall).toBe(0.7);
  });

  it("is never below without a recall estimate, and everything stays open", () => {
    expect(traced(1000, 500, 100)).toMatchObject({
      verdict: "not_distinguishable",
      openVerdicts: ["below", "inside_window", "above"],
      reasons: { verdict: "recall_unknown" },
    });
    expect(traced(1000, 500, 100)).not.toHaveProperty("recall");
  });

  it("is below with recall high enough, and not with recall too low to tell", () => {
    expect(traced(1000, 500, 100, { recall: 0.9 })).toMatchObject({
      verdict: "below",
      reasons: {},
    });
    expect(traced(1000, 500, 100, { recall: 0.1 })).toMatchObject({
      verdict: "not_distinguishable",
      reasons: { verdict: "recall_low" },
    });
  });

  // c_e 0.2666, upper limit 0.324; q 0.30 lifts that limit to 0.876, q 0.28 to 0.934; w = 0.1.
  it("turns exactly where the corrected upper limit enters the window", () => {
    expect(traced(1000, 500, 100, { recall: 0.3 }).verdict).toBe("below");
    expect(traced(1000, 500, 100, { recall: 0.28 })).toMatchObject({
      verdict: "not_distinguishable",
      openVerdicts: ["below", "inside_window"],
      reasons: { verdict: "recall_low" },
    });
  });

  it("leaves everything above the lower limit open while recall is unknown", () => {
    // The bare interval meets "below" and the window only.
    const bare = complete(200, 80);
    expect(bare.openVerdicts).toEqual(["below", "inside_window"]);
    expect(traced(200, 200, 80).openVerdicts).toEqual(["below", "inside_window", "above"]);
  });

  it("has a verdict from 30 interviewed people on", () => {
    expect(traced(1000, 29, 400)).toMatchObject({
      verdict: null,
      reasons: { verdict: "too_few_people" },
    });
    expect(traced(1000, 30, 400).verdict).toBe("above");
  });

  it("has no verdict below 90 % coverage where coverage is required", () => {
    const required = { coverageRequired: true };
    expect(traced(1000, 899, 4000, required)).toMatchObject({
      verdict: null,
      reasons: { verdict: "coverage_low" },
    });
    expect(traced(1000, 900, 4000, required).verdict).toBe("above");
  });

  it("without an interview has no figure", () => {
    expect(traced(50, 0, 0)).toMatchObject({
      pairsPerPerson: null,
      pairsPerPersonInterval: null,
      expectedGiantShare: null,
      reasons: { pairsPerPerson: "no_one_interviewed", verdict: "too_few_people" },
    });
  });
});

describe("boundary", () => {
  it.each([
    ["more interviewed than people", () => traced(10, 11, 0)],
    ["more pairs than possible", () => complete(4, 7)],
    ["a pair nobody could have told", () => traced(10, 0, 1)],
    ["a fraction of a person", () => complete(3.5, 1)],
    ["recall 0", () => traced(100, 50, 10, { recall: 0 })],
    ["recall above 1", () => traced(100, 50, 10, { recall: 1.1 })],
  ])("refuses %s", (_, call) => {
    expect(call).toThrow(RangeError);
  });

  // Source: methods C.2.4: regions (−∞, 1 − w), [1 − w, 1 + w], (1 + w, ∞).
  it("counts the ends of the window to the window", () => {
    expect(verdictOf([0.75, 1.25], 0.25)).toBe("inside_window");
    expect(verdictOf([0.5, 0.75], 0.25)).toBe("not_distinguishable");
    expect(verdictOf([0.5, 0.7], 0.25)).toBe("below");
    expect(verdictOf([1.25, 2], 0.25)).toBe("not_distinguishable");
    expect(regionsMet([0.5, 2], 0.25)).toEqual(["below", "inside_window", "above"]);
  });
});
