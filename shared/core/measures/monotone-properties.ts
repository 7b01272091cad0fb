/** What adding a pair among the same people can do: up (or keep), down (or keep), or either. */
export type Direction = "up" | "down" | "either";

/**
 * How narrow the range of p is in which a property appears, on the scale p/threshold. Every monotone
 * graph property is narrow in another sense too (width 1/ln n in p), the coarse ones included.
 */
export type Transition = "sharp" | "coarse";

export type MonotoneProperty = {
  /** Key of its words. */
  readonly key: string;
  /** What the property's number does when a pair is added; "up" for a property: once had, kept. */
  readonly direction: Exclude<Direction, "either">;
  /**
   * Pair probability p at which it appears among n people, null where it depends on more. `parameter`
   * is the k of a tree on k people or the ε of a group of ε·n people; others ignore it.
   */
  readonly threshold: ((n: number, parameter: number) => number) | null;
  readonly transition: Transition | null;
  /** Share of all people it seizes at once when it appears; null where it grows from nothing. */
  readonly jump: number | null;
};

const property = (
  key: string,
  transition: Transition | null,
  threshold: MonotoneProperty["threshold"],
  jump: number | null = null,
  direction: MonotoneProperty["direction"] = "up",
): MonotoneProperty => ({ key, direction, threshold, transition, jump });

/**
 * Properties that a further pair between people already on record can never take away.
 *
 * The thresholds name the order of p, save those of cores and of a group of εn people, which are
 * exact in the limit. A pair that also brings a new person is another matter: it may lower c, the
 * density and the largest share.
 *
 * Source: Bollobás & Thomason 1987; Friedgut & Kalai 1996, *Every monotone graph property has a sharp
 * threshold*; Friedgut 1999; cores: Pittel, Spencer & Wormald 1996; methods C.3.4.
 */
export const MONOTONE_PROPERTIES: readonly MonotoneProperty[] = [
  property("at_least_one_pair", "coarse", (n) => 1 / (n * n)),
  property("contains_tree", "coarse", (n, k) => n ** (-k / (k - 1))),
  property("contains_cycle", "coarse", (n) => 1 / n),
  property("contains_triangle", "coarse", (n) => 1 / n),
  property("contains_complete_four", "coarse", (n) => n ** (-2 / 3)),
  property("large_group", "sharp", (n, share) => -Math.log1p(-share) / (share * n)),
  property("three_core", "sharp", (n) => 3.35091887151 / n, 0.2676),
  property("four_core", "sharp", (n) => 5.14940274699 / n, 0.4381),
  property("five_core", "sharp", (n) => 6.79927548862 / n, 0.5384),
  property("no_isolate", "sharp", (n) => Math.log(n) / n),
  property("connected", "sharp", (n) => Math.log(n) / n),
  property("hamilton_cycle", "sharp", (n) => (Math.log(n) + Math.log(Math.log(n))) / n),
  property("diameter_at_most_two", "sharp", (n) => Math.sqrt((2 * Math.log(n)) / n)),
  property("largest_degree", null, null),
  property("triangle_count", null, null),
  property("largest_clique", null, null),
  property("person_reaches_person", null, null),
  property("distance_between_people", null, null, null, "down"),
];

/**
 * What recording one more pair between people already on record can do to each figure of the room.
 * "Either" figures may not be read as "more contact, more of it".
 *
 * Keys are those of the answers of the core. Closeness: each person's own value only rises; the
 * *order* of people by it may go either way. Source: methods C.3.4.
 */
export const MEASURE_DIRECTIONS = {
  pairs: "up",
  meanDegree: "up",
  density: "up",
  largestDegree: "up",
  largestGroup: "up",
  largestShare: "up",
  groupOfRandomPerson: "up",
  reachableShare: "up",
  efficiency: "up",
  harmonicCloseness: "up",
  coreNumbers: "up",
  triangles: "up",
  twoPaths: "up",
  groups: "down",
  isolates: "down",
  transitivity: "either",
  averageClustering: "either",
  degreeAssortativity: "either",
  attributeAssortativity: "either",
  coleman: "either",
  ei: "either",
  modularity: "either",
  communities: "either",
  bridges: "either",
  articulationPeople: "either",
  betweenness: "either",
  closenessOrder: "either",
  groupsOfOneSize: "either",
  secondGroup: "either",
  meanPath: "either",
  diameter: "either",
  dispersion: "either",
  excessDegreeRatio: "either",
} as const satisfies Readonly<Record<string, Direction>>;

/** A figure whose direction is known. */
export type DirectedMeasure = keyof typeof MEASURE_DIRECTIONS;
