/** What the command adds to the network report, in the order of output. */
export const ADDED_NAMES = [
  "excessDegreeRatio",
  "dispersion",
  "meanPath",
  "diameter",
  "reachableShare",
  "efficiency",
  "averageClustering",
  "degreeAssortativity",
  "articulationPeople",
  "bridges",
  "coreNumbers",
  "betweenness",
  "harmonicCloseness",
  "communities",
  "attribute",
  "baselines",
] as const;

export type AddedName = (typeof ADDED_NAMES)[number];

/** Names of the network report, which is printed always. */
const REPORT_NAMES = [
  "people",
  "pairs",
  "meanDegree",
  "density",
  "componentSizes",
  "isolates",
  "degreeCounts",
  "transitivity",
  "largestShare",
  "threshold",
];

/** One word for what is worked out together, as `bench:core` has them. */
const TOGETHER: Record<string, readonly AddedName[]> = {
  components: [],
  clustering: ["averageClustering"],
  cores: ["coreNumbers"],
  articulation: ["articulationPeople", "bridges"],
  assortativity: ["degreeAssortativity"],
  paths: ["meanPath", "diameter", "reachableShare", "efficiency"],
  closeness: ["harmonicCloseness"],
  baseline: ["baselines"],
};

/**
 * The figures asked for by a list of names.
 * @throws Error whose message is one line for the caller
 */
export function namesOf(list: string): ReadonlySet<AddedName> {
  const chosen = new Set<AddedName>();
  for (const name of list.split(",").map((part) => part.trim())) {
    const added = ADDED_NAMES.find((known) => known === name);
    if (added) chosen.add(added);
    else if (Object.hasOwn(TOGETHER, name)) for (const one of TOGETHER[name] ?? []) chosen.add(one);
    else if (!REPORT_NAMES.includes(name)) {
      throw new Error(`--only: no figure is called "${name.slice(0, 40)}"`);
    }
  }
  return chosen;
}
