import { HEAVY_STATISTICS, type HeavyStatistic, heavyStatistics } from "./heavy-statistics.ts";
import { PairGroups } from "./pair-groups.ts";
import { mixingFigures } from "./pair-mixing.ts";
import { PairTriangles } from "./pair-triangles.ts";
import type { SampledNetwork } from "./sampled-network.ts";

/**
 * Figures of one network that are always quick; `HEAVY_STATISTICS` are the others. Degrees are those of interviewed
 * people where the network was seen through interviews, else of everyone.
 *
 * - `people`, `pairs`: on record. `groups`, `largestGroup`, `isolates`: connected groups, people in
 *   the largest, people without a pair.
 * - `meanSmallGroup`: people per group outside one largest; `meanSmallGroupOfPerson`: size of the
 *   group of a random person outside it; undefined with one group. `sizeSquares`: Σs²/n, the size of
 *   the group of a random person.
 * - `meanDegree`, `degreeVariance` (divisor k − 1; undefined below two people), `maxDegree`.
 * - `triangles`, `transitivity`, `averageClustering` (people with fewer than two pairs count as
 *   zero), `degreeAssortativity`.
 * - `attributeAssortativity`, `ei`, `attributeModularity` (of the stated classes): pairs with a
 *   missing value are left out.
 */
export const STATISTICS = [
  "people",
  "pairs",
  "groups",
  "largestGroup",
  "isolates",
  "meanSmallGroup",
  "meanSmallGroupOfPerson",
  "sizeSquares",
  "meanDegree",
  "degreeVariance",
  "maxDegree",
  "triangles",
  "transitivity",
  "averageClustering",
  "degreeAssortativity",
  "attributeAssortativity",
  "ei",
  "attributeModularity",
] as const;

/** Name of a figure that is always quick. */
export type QuickStatistic = (typeof STATISTICS)[number];

/** Name of a figure. */
export type Statistic = (typeof STATISTICS)[number] | HeavyStatistic;

/** What is measured on every network. */
export type StatisticsChoice = {
  readonly statistics: readonly Statistic[];
  /** Length of the degree curve: people with 0, 1, … pairs, the last entry "that many or more". */
  readonly degreeBins: number;
  /** Length of the group curve: groups of 1, 2, … people, the last entry "that many or more". */
  readonly sizeBins: number;
  /** Class of each person, −1 = missing; null = none of the three mixing figures has a value. */
  readonly attribute: Int32Array | null;
};

const GROUPS = [
  "groups",
  "largestGroup",
  "meanSmallGroup",
  "meanSmallGroupOfPerson",
  "sizeSquares",
];
const MIXING = ["attributeAssortativity", "ei", "attributeModularity"];

/**
 * Measures networks one after another in the same arrays. A row holds the chosen statistics, then
 * the degree curve, then the group curve. Inside a row NaN stands for "undefined" (a Float64 column
 * has no other mark); `replicateSummary` turns it into null.
 *
 * @throws RangeError for curves of a negative or broken length
 *
 * Cost: O(n + m), with triangles O(n + m·√m). Source: methods C.1, C.2.1, C.5, C.7.6, C.10 (Σs²/n).
 */
export class ReplicateStatistics {
  readonly #choice: StatisticsChoice;
  readonly #groups = new PairGroups();
  readonly #triangles = new PairTriangles();
  #degrees = new Int32Array(0);
  readonly #values = new Map<Statistic, number>();
  readonly #wants: ReadonlySet<string>;

  constructor(choice: StatisticsChoice) {
    for (const bins of [choice.degreeBins, choice.sizeBins]) {
      if (!Number.isSafeInteger(bins) || bins < 0) throw new RangeError("bins: whole number >= 0");
    }
    this.#choice = choice;
    this.#wants = new Set(choice.statistics);
  }

  /** Length of a row. */
  get width(): number {
    return rowWidth(this.#choice);
  }

  #needs(names: readonly string[]): boolean {
    return names.some((name) => this.#wants.has(name));
  }

  /** Measures a network and writes its row into `out` from `offset` on. */
  measure(network: SampledNetwork, out: Float64Array, offset = 0): void {
    const { statistics, degreeBins, sizeBins, attribute } = this.#choice;
    const degreesAt = offset + statistics.length;
    out.fill(0, degreesAt, degreesAt + degreeBins + sizeBins);
    this.#measureDegrees(network, out, degreesAt);
    if (sizeBins > 0 || this.#needs(GROUPS)) {
      this.#measureGroups(network, out, degreesAt + degreeBins);
    }
    this.#measureTriangles(network);
    if (this.#wants.has("degreeAssortativity")) this.#measureAssortativity(network);
    if (attribute && this.#needs(MIXING)) {
      const figures = mixingFigures(network, attribute);
      this.#values.set("attributeAssortativity", figures.assortativity);
      this.#values.set("ei", figures.ei);
      this.#values.set("attributeModularity", figures.modularity);
    }
    if (this.#needs(HEAVY_STATISTICS)) {
      for (const [name, value] of heavyStatistics(network, this.#wants)) {
        this.#values.set(name, value);
      }
    }
    for (let at = 0; at < statistics.length; at++) {
      out[offset + at] = this.#values.get(statistics[at]!) ?? Number.NaN;
    }
  }

  #measureDegrees(network: SampledNetwork, out: Float64Array, at: number): void {
    const { a, b, length, people, isInterviewed } = network;
    if (this.#degrees.length < people) this.#degrees = new Int32Array(people);
    const degrees = this.#degrees.fill(0, 0, people);
    for (let k = 0; k < length; k++) {
      degrees[a[k]!]!++;
      degrees[b[k]!]!++;
    }
    const last = this.#choice.degreeBins - 1;
    let asked = 0;
    let sum = 0;
    let squares = 0;
    let most = 0;
    let alone = 0;
    for (let u = 0; u < people; u++) {
      const degree = degrees[u]!;
      if (degree === 0) alone++;
      if (isInterviewed && isInterviewed[u] === 0) continue;
      asked++;
      sum += degree;
      squares += degree * degree;
      if (degree > most) most = degree;
      if (last >= 0) out[at + (degree < last ? degree : last)]!++;
    }
    const values = this.#values;
    values.set("people", people);
    values.set("pairs", length);
    values.set("isolates", alone);
    values.set("meanDegree", asked === 0 ? Number.NaN : sum / asked);
    values.set(
      "degreeVariance",
      asked < 2 ? Number.NaN : (asked * squares - sum * sum) / (asked * (asked - 1)),
    );
    values.set("maxDegree", asked === 0 ? Number.NaN : most);
  }

  #measureGroups(network: SampledNetwork, out: Float64Array, at: number): void {
    const { people } = network;
    const found = this.#groups;
    found.find(network);
    const { groups, sizes } = found;
    const last = this.#choice.sizeBins - 1;
    let largest = 0;
    let squares = 0;
    for (let g = 0; g < groups; g++) {
      const size = sizes[g]!;
      squares += size * size;
      if (size > largest) largest = size;
      if (last >= 0) out[at + (size - 1 < last ? size - 1 : last)]!++;
    }
    const values = this.#values;
    values.set("groups", groups);
    values.set("largestGroup", largest);
    values.set("sizeSquares", people === 0 ? Number.NaN : squares / people);
    const others = people - largest;
    values.set("meanSmallGroup", groups < 2 ? Number.NaN : others / (groups - 1));
    values.set(
      "meanSmallGroupOfPerson",
      groups < 2 ? Number.NaN : (squares - largest * largest) / others,
    );
  }

  #measureTriangles(network: SampledNetwork): void {
    const local = this.#wants.has("averageClustering");
    if (!local && !this.#needs(["triangles", "transitivity"])) return;
    const degrees = this.#degrees;
    const triangles = this.#triangles.count(network, degrees, local);
    const at = this.#triangles.byPerson;
    let paths = 0;
    let clustering = 0;
    for (let u = 0; u < network.people; u++) {
      const choices = (degrees[u]! * (degrees[u]! - 1)) / 2;
      paths += choices;
      if (local && choices > 0) clustering += at[u]! / choices;
    }
    const { people } = network;
    this.#values.set("triangles", triangles);
    this.#values.set("transitivity", paths === 0 ? Number.NaN : (3 * triangles) / paths);
    this.#values.set("averageClustering", people === 0 ? Number.NaN : clustering / people);
  }

  /** Pearson correlation of the degrees at the two ends, from whole numbers until the last step. */
  #measureAssortativity({ a, b, length }: SampledNetwork): void {
    const degrees = this.#degrees;
    let products = 0;
    let sums = 0;
    let squares = 0;
    for (let k = 0; k < length; k++) {
      const x = degrees[a[k]!]!;
      const y = degrees[b[k]!]!;
      products += x * y;
      sums += x + y;
      squares += x * x + y * y;
    }
    const spread = 2 * length * squares - sums * sums;
    const shared = 4 * length * products - sums * sums;
    this.#values.set("degreeAssortativity", spread === 0 ? Number.NaN : shared / spread);
  }
}

/** Length of a replicate's row. */
export function rowWidth(choice: StatisticsChoice): number {
  return choice.statistics.length + choice.degreeBins + choice.sizeBins;
}
