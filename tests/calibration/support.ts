import { expect } from "vitest";
import {
  createStream,
  monteCarloP,
  observedRow,
  type PairEnds,
  type ReplicatePlan,
  rankEnvelope,
  replicateRange,
  rowWidth,
  type SampledNetwork,
  type Statistic,
} from "../../shared/core/index.ts";

export const LEVELS = [0.01, 0.05, 0.1, 0.2] as const;
export const REPLICATES = 199;

/** A copy of what a sampler drew. */
export const kept = ({ a, b, length }: SampledNetwork): PairEnds => ({
  a: a.slice(0, length),
  b: b.slice(0, length),
});

/** Columns of a plan's replicates, and the rows of the degree curve one after another. */
function columnsOf(plan: ReplicatePlan) {
  const count = plan.statistics.length;
  const table = new Float64Array(REPLICATES * rowWidth(plan));
  const curves = new Float64Array(REPLICATES * plan.degreeBins);
  replicateRange(plan, 0, REPLICATES, (replicate, row) => {
    table.set(row, replicate * row.length);
    curves.set(row.subarray(count, count + plan.degreeBins), replicate * plan.degreeBins);
    return true;
  });
  const width = rowWidth(plan);
  const column = (at: number) =>
    Float64Array.from({ length: REPLICATES }, (_, k) => table[k * width + at] ?? 0);
  return { column, curves };
}

/** p-values of data sets that the null model is true of, by figure and side. */
export class PValues {
  readonly #found = new Map<string, number[]>();

  #add(name: string, p: number): void {
    const list = this.#found.get(name) ?? [];
    list.push(p);
    this.#found.set(name, list);
  }

  /** Tests one data set. */
  test(observed: SampledNetwork, plan: ReplicatePlan, sides: "each" | "both" = "each"): void {
    const row = observedRow(plan, observed);
    const { column, curves } = columnsOf(plan);
    plan.statistics.forEach((name: Statistic, at) => {
      const p = monteCarloP(row[at] ?? Number.NaN, column(at));
      if (p === null) return;
      this.#add(`${name}, two-sided`, p.twoSided);
      if (sides === "both") return;
      this.#add(`${name}, upper`, p.upper);
      this.#add(`${name}, lower`, p.lower);
    });
    if (plan.degreeBins === 0) return;
    const start = plan.statistics.length;
    const curve = row.subarray(start, start + plan.degreeBins);
    this.#add("degree curve, global", rankEnvelope(curve, curves).p);
  }

  /** Share of data sets with p <= level. */
  share(name: string, level: number): number {
    const list = this.#found.get(name) ?? [];
    return list.filter((p) => p <= level + 1e-12).length / list.length;
  }

  /** Expects P(p <= α) <= α + 4 SE at every level, for every figure. */
  expectHonest(): void {
    const offending: string[] = [];
    for (const [name, list] of this.#found) {
      for (const level of LEVELS) {
        const share = this.share(name, level);
        const limit = level + 4 * Math.sqrt((level * (1 - level)) / list.length);
        if (share > limit) offending.push(`${name}: ${share} > ${limit} at ${level}`);
      }
    }
    expect(this.#found.size).toBeGreaterThan(0);
    expect(offending).toEqual([]);
  }
}

/** What explicit interviews on a whole network would have recorded. */
export type Traced = {
  readonly network: SampledNetwork;
  readonly order: Int32Array;
  readonly tellings: PairEnds;
};

/**
 * Interviews on a whole G(n,p), drawn pair by pair beforehand: written apart from the sampler under
 * test, which never builds the network. People on record are renumbered as they come on record.
 */
export function traceWholeNetwork(
  n: number,
  c: number,
  interviews: number,
  tracedShare: number,
  recall: number,
  seed: number,
  set: number,
): Traced {
  const random = createStream(seed, set);
  const contacts: number[][] = Array.from({ length: n }, () => []);
  for (let v = 1; v < n; v++) {
    for (let u = 0; u < v; u++) {
      if (random.next() >= c / (n - 1)) continue;
      contacts[u]?.push(v);
      contacts[v]?.push(u);
    }
  }
  const number = new Map<number, number>();
  const put = (person: number) => {
    const known = number.get(person);
    if (known !== undefined) return known;
    number.set(person, number.size);
    return number.size - 1;
  };
  const interviewed = new Set<number>();
  const waiting = new Set<number>();
  const order: number[] = [];
  const tellings: [number, number][] = [];
  for (let at = 0; at < interviews; at++) {
    let pool = Array.from({ length: n }, (_, u) => u).filter((u) => !interviewed.has(u));
    if (waiting.size > 0 && random.next() < tracedShare) pool = [...waiting];
    const person = pool[random.below(pool.length)] ?? 0;
    interviewed.add(person);
    waiting.delete(person);
    order.push(put(person));
    for (const contact of contacts[person] ?? []) {
      if (random.next() >= recall) continue;
      tellings.push([put(person), put(contact)]);
      if (!interviewed.has(contact)) waiting.add(contact);
    }
  }
  const seen = new Set<string>();
  const distinct = tellings.filter(([u, v]) => {
    const key = `${Math.min(u, v)}-${Math.max(u, v)}`;
    return seen.size < seen.add(key).size;
  });
  const ends = (pairs: [number, number][]): PairEnds => ({
    a: Int32Array.from(pairs, ([u]) => u),
    b: Int32Array.from(pairs, ([, v]) => v),
  });
  const isInterviewed = new Uint8Array(number.size);
  for (const person of order) isInterviewed[person] = 1;
  return {
    network: { ...ends(distinct), people: number.size, length: distinct.length, isInterviewed },
    order: Int32Array.from(order),
    tellings: ends(tellings),
  };
}
