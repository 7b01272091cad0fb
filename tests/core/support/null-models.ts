import {
  createStream,
  type PairEnds,
  type RandomStream,
  type SampledNetwork,
  type Sampler,
} from "../../../shared/core/index.ts";
import { endsOf, type Links } from "./graphs.ts";

/** A stream that hands out given numbers and counts how many were used. */
export function fedStream(numbers: readonly number[]): RandomStream & { used: number } {
  const stream = {
    used: 0,
    next() {
      const number = numbers[stream.used++];
      if (number === undefined) throw new Error("more numbers were drawn than were fed");
      return number;
    },
    below: (n: number) => Math.floor(stream.next() * n),
    fillBelow(n: number, out: Int32Array, from: number, to: number) {
      for (let k = from; k < to; k++) out[k] = stream.below(n);
    },
  };
  return stream;
}

/** A fixed network as samplers hand theirs out. */
export const networkOf = (
  people: number,
  links: Links,
  isInterviewed: Uint8Array | null = null,
): SampledNetwork => ({ ...endsOf(links), people, length: links.length, isInterviewed });

/** The pairs of a sampled network, each lower end first, in order: one text for each graph. */
export function keyOf({ a, b, length }: PairEnds & { readonly length: number }): string {
  const pairs = Array.from({ length }, (_, k) => {
    const u = a[k] ?? -1;
    const v = b[k] ?? -1;
    return u < v ? `${u}-${v}` : `${v}-${u}`;
  });
  return pairs.sort().join(" ");
}

/** How often each graph came up in `draws` draws, each from a stream of its own. */
export function tally(sampler: Sampler, draws: number, seed: number): Map<string, number> {
  const counts = new Map<string, number>();
  for (let i = 0; i < draws; i++) {
    const key = keyOf(sampler.sample(createStream(seed, i)));
    counts.set(key, (counts.get(key) ?? 0) + 1);
  }
  return counts;
}

/** χ² of counts against equal chances over `outcomes` outcomes. */
export function chiSquared(counts: Map<string, number>, outcomes: number): number {
  const draws = [...counts.values()].reduce((sum, count) => sum + count, 0);
  const expected = draws / outcomes;
  let total = (outcomes - counts.size) * expected;
  for (const count of counts.values()) total += (count - expected) ** 2 / expected;
  return total;
}

/**
 * A value that χ² with `df` degrees of freedom exceeds about once in 30,000 runs (4 SE of the
 * normal law through the cube root; Wilson & Hilferty 1931).
 */
export const chiLimit = (df: number): number =>
  df * (1 - 2 / (9 * df) + 4 * Math.sqrt(2 / (9 * df))) ** 3;

/** Mean and its standard error. */
export function meanOf(values: ArrayLike<number>): { mean: number; se: number; sd: number } {
  let sum = 0;
  for (let k = 0; k < values.length; k++) sum += values[k] ?? 0;
  const mean = sum / values.length;
  let squares = 0;
  for (let k = 0; k < values.length; k++) squares += ((values[k] ?? 0) - mean) ** 2;
  const sd = Math.sqrt(squares / (values.length - 1));
  return { mean, sd, se: sd / Math.sqrt(values.length) };
}

/** Every graph on n people as its links: 2^(n(n − 1)/2) of them. */
export function* everyGraph(n: number): Generator<Links> {
  const pairs = Array.from({ length: n }, (_, v) => v).flatMap((v) =>
    Array.from({ length: v }, (_, u) => [u, v] as const),
  );
  for (let mask = 0; mask < 2 ** pairs.length; mask++) {
    yield pairs.filter((_, k) => (mask >>> k) % 2 === 1);
  }
}

/** Pairs of each person. */
export function degreesOf(n: number, links: Links): number[] {
  const degrees = new Array<number>(n).fill(0);
  for (const [u, v] of links) {
    degrees[u] = (degrees[u] ?? 0) + 1;
    degrees[v] = (degrees[v] ?? 0) + 1;
  }
  return degrees;
}
