import type { PairEnds } from "../graph/build-graph.ts";
import type { RandomStream } from "../random/random-stream.ts";
import { PairSet } from "./pair-set.ts";

/**
 * The double-edge swap chain on simple graphs with given degrees. A proposal picks two different
 * pairs and one of their two re-pairings at random; it is turned down when it would make a person
 * their own contact, repeat a pair, or (with `isInterviewed`) make a pair without an interviewed
 * end. A proposal turned down counts as a step and leaves the graph as it is: proposals are
 * symmetric, so the chain settles on the uniform law.
 *
 * Restricted to pairs with an interviewed end the chain still reaches every such graph: people who
 * were not interviewed never stand side by side on an alternating ring, so one of the chords that
 * shorten it is always allowed. Tests check this against full enumeration.
 *
 * Cost: O(1) a proposal; 24 to 40 bytes a pair. Source: Maslov & Sneppen 2002; Fosdick, Larremore,
 * Nishimura & Ugander 2018, *Configuring random graph models with fixed degree sequences*; methods
 * C.7.3, C.8.5 (last row of its table).
 */
export class SwapChain {
  /** Ends of the pairs as they stand now. */
  readonly a: Int32Array;
  readonly b: Int32Array;
  readonly #startA: Int32Array;
  readonly #startB: Int32Array;
  readonly #start: PairSet;
  readonly #set: PairSet;
  readonly #isInterviewed: Uint8Array | null;

  /**
   * @param ends distinct pairs without self pairs; copied
   * @param length pairs to use
   * @param isInterviewed one flag per person, or null for the chain without that restriction
   * @throws RangeError for a repeated pair, a self pair, or a pair without an interviewed end
   */
  constructor(ends: PairEnds, length: number, isInterviewed: Uint8Array | null) {
    this.#startA = ends.a.slice(0, length);
    this.#startB = ends.b.slice(0, length);
    this.a = this.#startA.slice();
    this.b = this.#startB.slice();
    this.#isInterviewed = isInterviewed;
    this.#start = new PairSet(length);
    for (let k = 0; k < length; k++) {
      const u = this.#startA[k]!;
      const v = this.#startB[k]!;
      if (u === v) throw new RangeError(`pair ${k} names the same person twice`);
      if (!this.#start.add(u, v)) throw new RangeError(`pair ${k} is there twice`);
      if (isInterviewed && isInterviewed[u] === 0 && isInterviewed[v] === 0) {
        throw new RangeError(`pair ${k} has no interviewed end`);
      }
    }
    this.#set = new PairSet(length);
    this.#set.copyFrom(this.#start);
  }

  /** Pairs in the graph. */
  get length(): number {
    return this.a.length;
  }

  /** Goes back to the graph it started from. */
  reset(): void {
    this.a.set(this.#startA);
    this.b.set(this.#startB);
    this.#set.copyFrom(this.#start);
  }

  /**
   * Makes proposals; with fewer than two pairs there is nothing to propose.
   * @returns how many were accepted
   */
  run(proposals: number, random: RandomStream): number {
    const { a: endsA, b: endsB } = this;
    const set = this.#set;
    const flags = this.#isInterviewed;
    const m = endsA.length;
    if (m < 2) return 0;
    let accepted = 0;
    for (let step = 0; step < proposals; step++) {
      const i = random.below(m);
      const draw = random.below(2 * (m - 1));
      const half = draw >>> 1;
      const j = half < i ? half : half + 1;
      const a = endsA[i]!;
      const b = endsB[i]!;
      const flipped = (draw & 1) === 1;
      const c = flipped ? endsB[j]! : endsA[j]!;
      const d = flipped ? endsA[j]! : endsB[j]!;
      if (a === d || b === c) continue;
      if (flags && ((flags[a] === 0 && flags[d] === 0) || (flags[b] === 0 && flags[c] === 0))) {
        continue;
      }
      if (set.has(a, d) || set.has(b, c)) continue;
      set.delete(a, b);
      set.delete(c, d);
      set.add(a, d);
      set.add(b, c);
      endsB[i] = d;
      endsA[j] = c;
      endsB[j] = b;
      accepted++;
    }
    return accepted;
  }
}
