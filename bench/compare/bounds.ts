import type { CoreName } from "../core/core-measures.ts";

/** What has to hold on the graph of one size. A ratio is ours ÷ theirs; with `least`, theirs ÷ ours. */
export type Bound = {
  readonly people: number;
  readonly words: string;
  readonly names: readonly CoreName[];
  /** Another library, the core itself on one core, or a plain limit. */
  readonly against: "igraph" | "networkx" | "core" | "seconds" | "megabytes" | "modularity";
  readonly most: number;
  readonly least?: number;
  readonly workers?: "all";
  /** Compared as a rate: theirs ÷ ours. */
  readonly isRate?: true;
};

const REPORT: readonly CoreName[] = [
  "build",
  "components",
  "clustering",
  "cores",
  "articulation",
  "assortativity",
];
const igraph = (
  people: number,
  words: string,
  names: readonly CoreName[],
  most: number,
): Bound => ({
  people,
  words,
  names,
  against: "igraph",
  most,
});

const [SMALL, MIDDLE, LARGE, HUGE] = [5_000, 10_000, 100_000, 1_000_000];

export const BOUNDS: readonly Bound[] = [
  igraph(SMALL, "mean path with diameter (`paths`)", ["paths"], 0.1),
  igraph(SMALL, "`betweenness`, one core", ["betweenness"], 1),
  { ...igraph(SMALL, "`betweenness`, a thread per core", ["betweenness"], 0.6), workers: "all" },
  {
    ...igraph(MIDDLE, "`baseline`, rate per core", ["baseline"], 0),
    least: 4,
    isRate: true,
  },
  {
    people: MIDDLE,
    words: "`baseline`, a thread per core against one",
    names: ["baseline"],
    against: "core",
    most: 0,
    least: 1.7,
    workers: "all",
  },
  igraph(LARGE, "`components`", ["components"], 0.6),
  igraph(LARGE, "`clustering`", ["clustering"], 0.6),
  igraph(LARGE, "`cores`", ["cores"], 1),
  igraph(LARGE, "`articulation`", ["articulation"], 0.4),
  igraph(LARGE, "`communities`, one start", ["communities"], 0.3),
  {
    people: LARGE,
    words: "… modularity below igraph's multilevel by",
    names: ["communities"],
    against: "modularity",
    most: 0.005,
  },
  igraph(LARGE, "whole report", REPORT, 0.5),
  {
    people: LARGE,
    words: "whole report, times faster than networkx",
    names: REPORT,
    against: "networkx",
    most: 0,
    least: 30,
  },
  { people: HUGE, words: "whole report, s", names: REPORT, against: "seconds", most: 10 },
  { people: HUGE, words: "most memory, MB", names: REPORT, against: "megabytes", most: 1500 },
];
