import { type Links, linksOf } from "./graphs.ts";

/** A graph small enough to work out by hand, with its exact values as fractions. */
export type HandGraph = {
  readonly name: string;
  readonly n: number;
  readonly links: Links;
  readonly c: number;
  readonly density: number;
  readonly groups: readonly number[];
  readonly sumOfSquares: number;
  readonly triangles: number;
  readonly twoPaths: number;
  readonly transitivity: number;
};

/** Source: methods D.3, worked by hand and cross-checked with networkx 2.8.8 and igraph 0.10.2. */
export const HAND_GRAPHS: readonly HandGraph[] = [
  {
    name: "H1 path",
    n: 4,
    links: linksOf("01 12 23"),
    c: 3 / 2,
    density: 1 / 2,
    groups: [4],
    sumOfSquares: 10,
    triangles: 0,
    twoPaths: 2,
    transitivity: 0,
  },
  {
    name: "H2 paw",
    n: 4,
    links: linksOf("01 02 12 23"),
    c: 2,
    density: 2 / 3,
    groups: [4],
    sumOfSquares: 18,
    triangles: 1,
    twoPaths: 5,
    transitivity: 3 / 5,
  },
  {
    name: "H3 triangle, pair, isolate",
    n: 6,
    links: linksOf("01 02 12 34"),
    c: 4 / 3,
    density: 4 / 15,
    groups: [3, 2, 1],
    sumOfSquares: 14,
    triangles: 1,
    twoPaths: 3,
    transitivity: 1,
  },
  {
    name: "H4 two triangles, bridge",
    n: 6,
    links: linksOf("01 02 12 23 34 35 45"),
    c: 7 / 3,
    density: 7 / 15,
    groups: [6],
    sumOfSquares: 34,
    triangles: 2,
    twoPaths: 10,
    transitivity: 3 / 5,
  },
  {
    name: "H5 star",
    n: 6,
    links: linksOf("01 02 03 04 05"),
    c: 5 / 3,
    density: 1 / 3,
    groups: [6],
    sumOfSquares: 30,
    triangles: 0,
    twoPaths: 10,
    transitivity: 0,
  },
  {
    name: "H6 ring of five, triangle",
    n: 8,
    links: linksOf("01 12 23 34 04 56 67 57"),
    c: 2,
    density: 2 / 7,
    groups: [5, 3],
    sumOfSquares: 32,
    triangles: 1,
    twoPaths: 8,
    transitivity: 3 / 8,
  },
  {
    name: "H7 household and work",
    n: 8,
    links: linksOf("01 02 12 23 34 35 45 56"),
    c: 2,
    density: 2 / 7,
    groups: [7, 1],
    sumOfSquares: 40,
    triangles: 2,
    twoPaths: 12,
    transitivity: 1 / 2,
  },
];
