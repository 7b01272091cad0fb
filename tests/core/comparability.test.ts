import { describe, expect, it } from "vitest";
import {
  COMPARABILITY,
  type ComparisonKey,
  comparability,
  type ObservationDescription,
  threshold,
} from "../../shared/core/index.ts";

const TRACED: ObservationDescription = {
  n: 1000,
  interviewed: 100,
  complete: false,
  interviewedAtRandom: false,
  network: "everyone",
  presetWindow: true,
  coverageRequired: false,
  recall: 0.8,
  unresolvedShare: null,
};
const standings = (changes: Partial<ObservationDescription>) => {
  const { judgements } = comparability({ ...TRACED, ...changes });
  return Object.fromEntries(Object.entries(judgements).map(([key, one]) => [key, one.standing]));
};
const RANDOM_MIXING = [
  "degree_law",
  "largest_group",
  "transitivity",
  "degree_assortativity",
  "mixing_preserving",
] as const;

// Source: methods C.8.5, table and screen logic.
describe("comparability", () => {
  it("puts traced random mixing first on traced people and greys the rest with its reason", () => {
    const got = comparability(TRACED);
    expect(got).toMatchObject({ state: "traced", coverage: 0.1, firstBaseline: "traced_mixing" });
    expect(standings({})).toEqual({
      threshold: "show",
      mean_degree_interviewed: "refuse",
      mean_degree_recorded: "refuse",
      expected_giant_share: "grey",
      degree_law: "grey",
      largest_group: "grey",
      transitivity: "grey",
      degree_assortativity: "grey",
      mixing_preserving: "grey",
      degree_preserving: "refuse",
      degree_preserving_interviewed_end: "warn",
      traced_mixing: "show",
    });
    expect(got.judgements.transitivity).toEqual({
      standing: "grey",
      reasons: ["traced_rejects_random_mixing"],
      instead: "traced_mixing",
    });
    expect(got.judgements.degree_preserving).toEqual({
      standing: "refuse",
      reasons: ["keeps_truncated_degrees"],
      instead: "degree_preserving_interviewed_end",
    });
  });

  it("opens random mixing at 90 % coverage, and not a person below", () => {
    for (const [interviewed, first, standing] of [
      [899, "traced_mixing", "grey"],
      [900, "random_mixing", "show"],
    ] as const) {
      const got = comparability({ ...TRACED, interviewed });
      expect(got.firstBaseline).toBe(first);
      for (const key of RANDOM_MIXING) expect(got.judgements[key].standing).toBe(standing);
      expect(got.judgements.expected_giant_share.standing).toBe(standing);
    }
    expect(standings({ interviewed: 900 })).toMatchObject({
      degree_preserving: "show",
      traced_mixing: "show",
      mean_degree_recorded: "refuse",
    });
  });

  it("opens it among people interviewed at random, not on a record with people only named", () => {
    const sampled = { interviewedAtRandom: true, network: "interviewed" } as const;
    expect(comparability({ ...TRACED, ...sampled })).toMatchObject({
      state: "sampled",
      firstBaseline: "random_mixing",
    });
    for (const key of RANDOM_MIXING) expect(standings(sampled)[key]).toBe("show");

    const recorded = comparability({ ...TRACED, interviewedAtRandom: true });
    expect(recorded).toMatchObject({
      state: "sampled_with_named",
      firstBaseline: "traced_mixing",
      judgements: {
        degree_law: { standing: "grey", reasons: ["false_spike_at_one"] },
        largest_group: { standing: "grey", reasons: ["star_shaped_record"] },
      },
    });
  });

  it("never puts the mean degree of interviewed people against 1", () => {
    for (const changes of [{}, { interviewed: 1000 }, { complete: true }, { interviewed: 0 }]) {
      expect(standings(changes).mean_degree_interviewed).toBe("refuse");
    }
  });

  it("takes a complete file as it is", () => {
    const got = comparability({ ...TRACED, complete: true, interviewed: 0, recall: null });
    expect(got).toMatchObject({
      state: "complete",
      coverage: null,
      firstBaseline: "random_mixing",
      cautions: [],
      judgements: {
        threshold: { standing: "show", reasons: [] },
        mean_degree_recorded: { standing: "show" },
        traced_mixing: { standing: "refuse", reasons: ["no_interviews_to_trace"] },
      },
    });
  });

  it("refuses everything when nobody was interviewed", () => {
    const got = comparability({ ...TRACED, interviewed: 0 });
    expect(got).toMatchObject({ state: "unseen", coverage: 0, firstBaseline: null });
    for (const one of Object.values(got.judgements)) {
      expect(one).toEqual({ standing: "refuse", reasons: ["no_one_interviewed"], instead: null });
    }
    expect(comparability({ ...TRACED, n: 0, interviewed: 0 }).coverage).toBeNull();
  });

  it.each([
    [{}, "show", []],
    [{ recall: null }, "warn", ["recall_unknown"]],
    [{ presetWindow: false }, "grey", ["free_range"]],
    [{ interviewed: 29 }, "grey", ["too_few_people"]],
    [{ n: 29, interviewed: 29 }, "grey", ["too_few_people"]],
    [{ coverageRequired: true }, "grey", ["coverage_low"]],
    [{ coverageRequired: true, interviewed: 950 }, "show", []],
    [
      { interviewed: 9, presetWindow: false, recall: null },
      "grey",
      ["too_few_people", "free_range", "recall_unknown"],
    ],
  ] as const)("says of the threshold with %o: %s", (changes, standing, reasons) => {
    const { threshold: got } = comparability({ ...TRACED, ...changes }).judgements;
    expect(got).toEqual({ standing, reasons, instead: null });
  });

  it("greys the threshold exactly where the figure itself withholds its verdict", () => {
    for (const interviewed of [10, 29, 30, 500, 899, 900, 1000]) {
      for (const presetWindow of [true, false]) {
        for (const coverageRequired of [true, false]) {
          const seen = { ...TRACED, interviewed, presetWindow, coverageRequired };
          const { verdict } = threshold({
            ...seen,
            population: "interviewed",
            countedPairs: 40,
          });
          const grey = comparability(seen).judgements.threshold.standing === "grey";
          expect(grey).toBe(verdict === null);
        }
      }
    }
  });

  it("adds what must be printed beside every comparison", () => {
    const cautions = (changes: Partial<ObservationDescription>) =>
      comparability({ ...TRACED, ...changes }).cautions;
    expect(cautions({ recall: null, unresolvedShare: 0.2 })).toEqual([
      "coverage_partial",
      "recall_unknown",
      "group_exposures_open",
    ]);
    expect(cautions({ interviewed: 1000, unresolvedShare: 0 })).toEqual([]);
  });

  it("leads from whatever is not shown to something that is", () => {
    for (const [, row] of Object.entries(COMPARABILITY)) {
      for (const [state, { standing, instead, reason }] of Object.entries(row)) {
        expect(reason === null).toBe(standing === "show");
        if (instead === null) continue;
        const target = COMPARABILITY[instead as ComparisonKey][state as keyof typeof row];
        expect(["show", "warn"]).toContain(target.standing);
      }
    }
  });

  it.each([{ interviewed: 1001 }, { n: -1 }, { recall: 0 }, { unresolvedShare: 2 }])(
    "refuses %o",
    (changes) => {
      expect(() => comparability({ ...TRACED, ...changes })).toThrow(RangeError);
    },
  );
});
