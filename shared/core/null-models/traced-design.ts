import type { PairEnds } from "../graph/build-graph.ts";
import { PairSet } from "./pair-set.ts";
import type { TracedDesign } from "./traced-sampler.ts";

/** What a tracing design is read from. */
export type TracedRecord = {
  /** n: the declared population, else the people on record. */
  readonly population: number;
  /** People on record; those of `order` and `tellings` are numbered below it. */
  readonly people: number;
  /** Interviewed people in the order of their interviews. */
  readonly order: Int32Array;
  /** `a[k]` named `b[k]`; repeats do no harm. */
  readonly tellings: PairEnds;
  /** False when the record does not say which end named the other: then either may have. */
  readonly directed: boolean;
  /** q, or null where unknown. */
  readonly recall: number | null;
};

/**
 * Reads the inputs of `tracedSampler` from a record: i, p̂ = pairs with an interviewed end ÷ eligible
 * pairs (corrected for recall where that is known), q, and σ = share of interviewed people who had
 * been named before their own interview, leaving out those interviewed while nobody was waiting
 * named.
 *
 * Without a direction a pair of two interviewed people counts as named by the earlier of them.
 *
 * @returns null when nobody was interviewed or there is no eligible pair: nothing to simulate
 * @throws RangeError for a population below the people on record, a number outside the people, a
 *   person interviewed twice, a self pair, or a recall outside (0, 1]
 *
 * Edge cases: nobody ever waiting named → σ 0. p̂ is capped at 1. Cost: O(people + tellings). Source:
 * methods, box at the head of C.8, C.8.1 (eligible pairs with recall), C.7.6.
 */
export function tracedDesign(record: TracedRecord): TracedDesign | null {
  const { population, people, order, tellings, directed, recall } = record;
  if (population < people) throw new RangeError("population is smaller than the people on record");
  if (recall !== null && !(recall > 0 && recall <= 1)) throw new RangeError("recall: 0 to 1");
  const turn = new Int32Array(people).fill(-1);
  for (let at = 0; at < order.length; at++) {
    const person = order[at]!;
    if (!(person >= 0 && person < people)) throw new RangeError(`interview ${at} names nobody`);
    if (turn[person] !== -1) throw new RangeError(`person ${person} is interviewed twice`);
    turn[person] = at;
  }

  const pairs = new PairSet(tellings.a.length);
  /** Interview at which a person was first named; `order.length` = never. */
  const firstNamed = new Int32Array(people).fill(order.length);
  const tell = (from: number, to: number) => {
    const at = turn[from]!;
    if (at >= 0 && at < firstNamed[to]!) firstNamed[to] = at;
  };
  for (let k = 0; k < tellings.a.length; k++) {
    const from = tellings.a[k]!;
    const to = tellings.b[k]!;
    if (!(from >= 0 && from < people && to >= 0 && to < people)) {
      throw new RangeError(`telling ${k} names somebody outside the record`);
    }
    if (from === to) throw new RangeError(`telling ${k} names the same person twice`);
    if (turn[from]! < 0 && turn[to]! < 0) continue;
    pairs.add(from, to);
    tell(from, to);
    if (!directed) tell(to, from);
  }

  const i = order.length;
  const q = recall ?? 1;
  const both = (i * (i - 1)) / 2;
  const eligible = both * (1 - (1 - q) ** 2) + i * (population - i) * q;
  if (eligible === 0) return null;
  return {
    population,
    interviews: i,
    pairProbability: Math.min(1, pairs.size / eligible),
    recall: q,
    tracedShare: tracedShare(order, firstNamed),
  };
}

/** Share of people already named when interviewed, among those interviewed while anyone waited. */
function tracedShare(order: Int32Array, firstNamed: Int32Array): number {
  const i = order.length;
  // People who begin to wait after each interview; a person named at or after theirs never does.
  const begins = new Int32Array(i + 1);
  const turnOf = new Map<number, number>();
  for (let at = 0; at < i; at++) turnOf.set(order[at]!, at);
  for (let person = 0; person < firstNamed.length; person++) {
    const first = firstNamed[person]!;
    if (first < (turnOf.get(person) ?? i)) begins[first]!++;
  }
  let waiting = 0;
  let choices = 0;
  let traced = 0;
  for (let at = 0; at < i; at++) {
    const wasNamed = firstNamed[order[at]!]! < at;
    if (waiting > 0) {
      choices++;
      if (wasNamed) traced++;
    }
    if (wasNamed) waiting--;
    waiting += begins[at]!;
  }
  return choices === 0 ? 0 : traced / choices;
}
