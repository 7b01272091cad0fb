import { HAND_GRAPHS, type HandGraph } from "./hand-graphs.ts";

/** What a hand graph is made of beyond its sizes. */
export type HandStructure = HandGraph & {
  /** Average local clustering: fewer than two contacts as 0, and left out. */
  readonly averages: readonly [zeros: number, twoOrMore: number];
  /** null: 0/0. */
  readonly degreeAssortativity: number | null;
  readonly cores: readonly number[];
  readonly articulation: readonly number[];
  readonly bridges: readonly (readonly [number, number])[];
  /** Highest modularity of any partition. */
  readonly bestModularity: number;
};

// Source: methods D.3, exact by hand, cross-checked with networkx 2.8.8 and igraph 0.10.2.
const STRUCTURE: readonly Omit<HandStructure, keyof HandGraph>[] = [
  {
    averages: [0, 0],
    degreeAssortativity: -1 / 2,
    cores: [1, 1, 1, 1],
    articulation: [1, 2],
    bridges: [
      [0, 1],
      [1, 2],
      [2, 3],
    ],
    bestModularity: 1 / 6,
  },
  {
    averages: [7 / 12, 7 / 9],
    degreeAssortativity: -5 / 7,
    cores: [2, 2, 2, 1],
    articulation: [2],
    bridges: [[2, 3]],
    bestModularity: 0,
  },
  {
    averages: [1 / 2, 1],
    degreeAssortativity: 1,
    cores: [2, 2, 2, 1, 1, 0],
    articulation: [],
    bridges: [[3, 4]],
    bestModularity: 3 / 8,
  },
  {
    averages: [7 / 9, 7 / 9],
    degreeAssortativity: -1 / 6,
    cores: [2, 2, 2, 2, 2, 2],
    articulation: [2, 3],
    bridges: [[2, 3]],
    bestModularity: 5 / 14,
  },
  {
    averages: [0, 0],
    degreeAssortativity: -1,
    cores: [1, 1, 1, 1, 1, 1],
    articulation: [0],
    bridges: [
      [0, 1],
      [0, 2],
      [0, 3],
      [0, 4],
      [0, 5],
    ],
    bestModularity: 0,
  },
  {
    averages: [3 / 8, 3 / 8],
    degreeAssortativity: null,
    cores: [2, 2, 2, 2, 2, 2, 2, 2],
    articulation: [],
    bridges: [],
    bestModularity: 15 / 32,
  },
  {
    averages: [1 / 2, 2 / 3],
    degreeAssortativity: -1 / 3,
    cores: [2, 2, 2, 2, 2, 2, 1, 0],
    articulation: [2, 3, 5],
    bridges: [
      [2, 3],
      [5, 6],
    ],
    bestModularity: 47 / 128,
  },
];

export const HAND_STRUCTURES: readonly HandStructure[] = HAND_GRAPHS.map((graph, k) => {
  const structure = STRUCTURE[k];
  if (!structure) throw new Error(`no structure for ${graph.name}`);
  return { ...graph, ...structure };
});
