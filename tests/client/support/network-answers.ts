import type { NetworkGraph, NetworkSummary } from "../../../shared/contracts/network.ts";

type Threshold = NetworkSummary["threshold"];

/** A report on invented figures: 214 of 1,036 people interviewed, a verdict above the threshold. */
export function summaryOf(
  changes: Partial<Omit<NetworkSummary, "threshold">> & { threshold?: Partial<Threshold> } = {},
): NetworkSummary {
  const { threshold, ...rest } = changes;
  return {
    people: 214,
    pairs: 120,
    meanDegree: 1.1215,
    density: 0.005265,
    componentSizes: [60, 20, 7, 2, 2, ...Array.from({ length: 123 }, () => 1)],
    isolates: 123,
    degreeCounts: [123, 40, 30, 21],
    transitivity: 0.192,
    largestShare: 60 / 214,
    threshold: {
      population: "interviewed",
      n: 1036,
      interviewed: 214,
      pairsPerPerson: 1.52,
      pairsPerPersonInterval: [1.28, 1.78],
      criticalHalfWidth: 0.0988,
      expectedGiantShare: 0.594,
      verdict: "above",
      openVerdicts: [],
      ...threshold,
    },
    reasons: {},
    population: "interviewed",
    n: 1036,
    from: "2026-05-15",
    to: "2026-05-27",
    asOf: "2026-05-27",
    cutOff: "2026-05-27T18:00:00.000Z",
    graphVersion: 1482,
    window: "preset",
    interviewed: 214,
    coverage: 214 / 1036,
    meanDegreeInterviewed: 2.4,
    undated: 9,
    unresolvedGroupExposures: 12,
    trail: [
      { day: "2026-05-25", pairsPerPerson: null },
      { day: "2026-05-26", pairsPerPerson: 1.44 },
      { day: "2026-05-27", pairsPerPerson: 1.52 },
    ],
    ...rest,
  };
}

const uuid = (digit: string) =>
  `${digit.repeat(8)}-${digit.repeat(4)}-4${digit.repeat(3)}-8${digit.repeat(3)}-${digit.repeat(12)}`;

export const ids = {
  large: uuid("a"),
  small: uuid("b"),
  one: uuid("1"),
  two: uuid("2"),
  three: uuid("3"),
  investigation: uuid("c"),
};

/** Three people of one group in a row, all of the classes of marks, and one person alone. */
export function graphOf(changes: Partial<NetworkGraph> = {}): NetworkGraph {
  const node = (id: string, studyNumber: string, classification: string | null, x: number) => ({
    id,
    studyNumber,
    classification,
    becameCase: false,
    group: ids.large,
    groupRank: 0,
    size: 1,
    x,
    y: 0,
  });
  return {
    graphVersion: 1482,
    cutOff: "2026-05-27T18:00:00.000Z",
    level: "people",
    nodes: [
      node(ids.two, "S-10", "contact", 40),
      node(ids.one, "S-9", "confirmed", 0),
      { ...node(ids.three, "S-2", null, 80), group: ids.three, groupRank: 1 },
    ],
    pairs: [{ id: "pair-0", source: ids.one, target: ids.two }],
    ...changes,
  };
}
