import type {
  Baseline,
  CompareMeasure,
  CompareRun,
  CompareRunItem,
} from "../../../shared/contracts/compare.ts";
import { COMPARABILITY, type ObservationState } from "../../../shared/core/index.ts";

export const runIds = {
  one: "0c9d4e1e-7a2f-4f55-9e0b-6a2f8b1c0d01",
  other: "0c9d4e1e-7a2f-4f55-9e0b-6a2f8b1c0d02",
  fresh: "0c9d4e1e-7a2f-4f55-9e0b-6a2f8b1c0d03",
} as const;

type Result = NonNullable<CompareRun["result"]>;
type Figure = NonNullable<CompareMeasure["baselines"][Baseline]>;

/** A run as the list tells it, on invented figures. */
export function itemOf(changes: Partial<CompareRunItem> = {}): CompareRunItem {
  return {
    id: runIds.one,
    name: "Week 22",
    state: "ready",
    progress: 1,
    reached: 999,
    replicates: 999,
    seed: 7,
    population: "all",
    window: "preset",
    from: "2026-05-15",
    to: "2026-05-27",
    attribute: "age_band",
    asOf: "2026-05-27T18:00:00.000Z",
    cutOff: "2026-05-27T18:00:00.000Z",
    graphVersion: 1482,
    coreVersion: "1.0.0",
    generator: "xoshiro128",
    people: 34,
    pairs: 78,
    by: "E. Epi",
    recordedAt: "2026-05-27T18:01:00.000Z",
    finishedAt: "2026-05-27T18:02:00.000Z",
    ...changes,
  };
}

export const listAnswer = (items: CompareRunItem[]) => ({
  items,
  total: items.length,
  page: 1,
  pageSize: 10,
});

/** A figure over 999 random networks: r of them as high, 999 − r as low or lower. */
export function figureOf(
  [mean, low, high]: [number, number, number],
  asHigh: number,
  changes: Partial<Figure> = {},
): Figure {
  const [pUpper, pLower] = [(asHigh + 1) / 1000, (999 - asHigh + 1) / 1000];
  const pTwoSided = Math.min(1, 2 * Math.min(pUpper, pLower));
  const reach = (high - low) * 0.7;
  return {
    mean,
    sd: (high - low) / 4,
    low,
    high,
    pUpper,
    pLower,
    pTwoSided,
    pHolm: Math.min(1, pTwoSided * 6),
    undefinedReplicates: 0,
    histogram: {
      from: mean - reach,
      to: mean + reach,
      counts: [3, 12, 40, 90, 160, 194, 180, 150, 90, 50, 22, 6, 2],
    },
    ...changes,
  };
}

/** Figures published for the karate club (4,000 replicates; methods C.7.5), as of 999 here. */
function karateMeasures(second: Baseline, first: Baseline): CompareMeasure[] {
  const measure = (
    statistic: CompareMeasure["statistic"],
    observed: number,
    monotone: CompareMeasure["monotone"],
    [mixing, kept]: [Figure, Figure],
  ): CompareMeasure => ({
    statistic,
    observed,
    reason: null,
    monotone,
    baselines: { [first]: mixing, [second]: kept },
  });
  const fixed = (value: number): Figure =>
    figureOf([value, value, value], 999, {
      sd: 0,
      pUpper: 1,
      pLower: 1,
      pTwoSided: 1,
      pHolm: 1,
      histogram: { from: value, to: value, counts: [999] },
    });
  return [
    measure("pairs", 78, "up", [fixed(78), fixed(78)]),
    measure("largestGroup", 34, "up", [figureOf([33.786, 33, 34], 780), fixed(34)]),
    measure("maxDegree", 17, "up", [figureOf([9.012, 7, 11], 0), fixed(17)]),
    measure("triangles", 45, "up", [figureOf([15.573, 9, 24], 0), figureOf([39.344, 30, 48], 129)]),
    measure("transitivity", 0.25568, "either", [
      figureOf([0.13567, 0.0769, 0.1963], 0),
      figureOf([0.22354, 0.1705, 0.2727], 129),
    ]),
    measure("degreeAssortativity", -0.47561, "either", [
      figureOf([-0.06788, -0.262, 0.131], 999),
      figureOf([-0.30184, -0.406, -0.219], 999),
    ]),
  ];
}

const karateDegrees = [0, 1, 11, 6, 6, 3, 2, 0, 0, 1, 1, 0, 1, 0, 0, 0, 1, 1];

/** A result on a network in one state of observation; traced ones come first through interviews. */
export function resultOf(state: ObservationState = "complete"): Result {
  const seenWhole = state === "complete" || state === "covered" || state === "sampled";
  const [first, second] = seenWhole
    ? (["gnm", "degreePreserving"] as const)
    : (["traced", "degreePreservingInterviewedEnd"] as const);
  const measures = karateMeasures(second, first);
  const grey = "traced_rejects_random_mixing";
  if (!seenWhole) {
    for (const each of measures) each.baselines.gnm = figureOf([0.1, 0.05, 0.2], 2);
  }
  const up = karateDegrees.map((count) => count + 3);
  const down = karateDegrees.map((count) => Math.max(0, count - 4));
  const wide = up.map((count) => count + 2);
  const band = {
    low: down,
    high: up.map((count, k) => (k === 17 ? 0 : count)),
    globalLow: down.map(() => 0),
    globalHigh: wide.map((count, k) => (k > 15 ? 0 : count)),
    p: 0.012,
    quickLook: false,
  };
  const law = karateDegrees.map((_count, k) => 34 * Math.exp(-((k - 4.6) ** 2) / 8) * 0.2);
  const sizes = Array.from({ length: 34 }, (_one, entry) => (entry === 33 ? 1 : 0));
  const sizeBand = {
    ...band,
    low: sizes.map(() => 0),
    high: sizes.map((n, k) => n + (k < 1 ? 2 : 0)),
  };
  return {
    seen: {
      state,
      n: seenWhole ? 34 : 1036,
      interviewed: seenWhole ? 34 : 214,
      coverage: state === "complete" ? null : seenWhole ? 1 : 214 / 1036,
      doubleNamedShare: seenWhole ? null : 0.6,
      recall: seenWhole ? null : 0.75,
      unresolvedGroupExposures: 3,
      undated: 2,
      cautions: seenWhole ? [] : ["coverage_partial", "group_exposures_open"],
    },
    comparisons: Object.entries(COMPARABILITY).map(([key, row]) => ({
      key: key as keyof typeof COMPARABILITY,
      standing: row[state].standing,
      reasons: row[state].reason ? [row[state].reason] : [],
      instead: row[state].instead,
    })),
    baselines: [
      ...(seenWhole
        ? [
            {
              baseline: "traced" as const,
              standing: "refuse" as const,
              reasons: ["no_interviews_to_trace"],
              drawn: false,
              parameters: {},
            },
          ]
        : []),
      { baseline: first, standing: "show", reasons: [], drawn: true, parameters: { p: 0.0014 } },
      ...(seenWhole
        ? []
        : [
            {
              baseline: "gnm" as const,
              standing: "grey" as const,
              reasons: [grey],
              drawn: true,
              parameters: {},
            },
          ]),
      {
        baseline: second,
        standing: seenWhole ? "show" : "warn",
        reasons: seenWhole ? [] : ["keeps_truncated_degrees"],
        drawn: true,
        parameters: { burnIn: 7800, thinning: 1560 },
      },
    ],
    measures,
    degrees: {
      observed: karateDegrees,
      binomial: law,
      poisson: law,
      baselines: { [first]: band, [second]: band },
    },
    sizes: {
      observed: sizes,
      baselines: {
        [first]: { ...sizeBand, globalLow: null, globalHigh: null, p: null, quickLook: true },
      },
    },
  };
}

/** A whole run; ready with a result by default. */
export function runOf(changes: Partial<CompareRun> = {}): CompareRun {
  return { ...itemOf(), failure: null, result: resultOf(), ...changes };
}
