import type { PairEnds } from "../graph/build-graph.ts";
import type { RandomStream } from "../random/random-stream.ts";

/**
 * A random network as a sampler hands it out: people 0 … people − 1 and distinct pairs, the first
 * `length` entries of `a` and `b`. It lives in the sampler's buffers and is overwritten by the next
 * draw; copy what must last.
 */
export type SampledNetwork = PairEnds & {
  readonly people: number;
  readonly length: number;
  /** One flag per person (at least `people` of them); null = everyone was interviewed. */
  readonly isInterviewed: Uint8Array | null;
};

/** Draws one random network after another. It depends on nothing but the stream it is given. */
export interface Sampler {
  sample(random: RandomStream): SampledNetwork;
}

/** Pairs in arrays that grow: the part of a sampled network that a sampler writes. */
export class PairBuffer {
  a: Int32Array;
  b: Int32Array;
  length = 0;

  /** @param capacity pairs to hold before the arrays grow */
  constructor(capacity: number) {
    this.a = new Int32Array(Math.max(16, capacity));
    this.b = new Int32Array(Math.max(16, capacity));
  }

  /** Appends a pair. */
  push(u: number, v: number): void {
    if (this.length === this.a.length) {
      const a = new Int32Array(2 * this.length);
      const b = new Int32Array(2 * this.length);
      a.set(this.a);
      b.set(this.b);
      this.a = a;
      this.b = b;
    }
    this.a[this.length] = u;
    this.b[this.length++] = v;
  }
}

/** @throws RangeError unless `value` is a whole number from 0 to the most people an index holds */
export function checkPeople(value: number): void {
  if (!Number.isSafeInteger(value) || value < 0 || value > 2147483647) {
    throw new RangeError("people must be a whole number from 0 to 2^31 - 1");
  }
}
