import { buildGraph, type PairEnds } from "../graph/build-graph.ts";
import type { RandomStream } from "../random/random-stream.ts";

/**
 * The double-edge swap chain on simple graphs with given degrees. A proposal picks two pairs and one
 * of their two re-pairings at random; it is turned down when it would make a person their own
 * contact, repeat a pair, or (with `isInterviewed`) make a pair without an interviewed end, or when
 * it picked one pair twice. A proposal turned down counts as a step and leaves the graph as it is:
 * proposals are symmetric, so the chain settles on the uniform law.
 *
 * Restricted to pairs with an interviewed end the chain still reaches every such graph: people who
 * were not interviewed never stand side by side on an alternating ring, so one of the chords that
 * shorten it is always allowed. Tests check this against full enumeration.
 *
 * Since degrees never change, everybody keeps a row of fixed length; a place in a row knows the
 * place of the other end. Two random places are two pairs and a re-pairing at once, and whether a
 * pair is there already is seen in the shorter of two rows that have just been touched anyway.
 *
 * Cost: O(shorter row) a proposal, for rows met at random; 24 bytes a pair. Source: Maslov & Sneppen
 * 2002; Fosdick, Larremore, Nishimura & Ugander 2018, *Configuring random graph models with fixed
 * degree sequences*; methods C.7.3, C.8.5 (last row of its table).
 */
export class SwapChain {
  readonly #offsets: Int32Array;
  /** Contact at each place, and the place in the contact's row that holds this person. */
  readonly #contact: Int32Array;
  readonly #mate: Int32Array;
  readonly #startContact: Int32Array;
  readonly #startMate: Int32Array;
  readonly #isInterviewed: Uint8Array | null;
  readonly #ends: { readonly a: Int32Array; readonly b: Int32Array; readonly length: number };

  /**
   * @param n people
   * @param ends distinct pairs without self pairs; copied
   * @param length pairs to use
   * @param isInterviewed one flag per person, or null for the chain without that restriction
   * @throws RangeError for a repeated pair, a self pair, an end outside the people, or a pair without
   *   an interviewed end
   */
  constructor(n: number, ends: PairEnds, length: number, isInterviewed: Uint8Array | null) {
    const { m, offsets, neighbours } = buildGraph(n, ends, length);
    if (m !== length) throw new RangeError("a pair is there twice");
    if (isInterviewed && isInterviewed.length < n) {
      throw new RangeError("isInterviewed must hold one flag per person");
    }
    this.#offsets = offsets;
    this.#startContact = neighbours;
    this.#startMate = new Int32Array(2 * m);
    const cursor = offsets.slice(0, n);
    for (let u = 0; u < n; u++) {
      const end = offsets[u + 1]!;
      for (let s = offsets[u]!; s < end; s++) {
        const v = neighbours[s]!;
        if (isInterviewed && isInterviewed[u] === 0 && isInterviewed[v] === 0) {
          throw new RangeError(`pair ${u}, ${v} has no interviewed end`);
        }
        // Rows are ascending and people are met in ascending order: v's row fills in its order.
        this.#startMate[s] = cursor[v]!++;
      }
    }
    this.#contact = neighbours.slice();
    this.#mate = this.#startMate.slice();
    this.#isInterviewed = isInterviewed;
    this.#ends = { a: new Int32Array(m), b: new Int32Array(m), length: m };
  }

  /** Pairs in the graph. */
  get length(): number {
    return this.#ends.length;
  }

  /** Goes back to the graph it started from. */
  reset(): void {
    this.#contact.set(this.#startContact);
    this.#mate.set(this.#startMate);
  }

  /** The pairs as they stand now, lower end first; overwritten by the next call. */
  pairs(): PairEnds & { readonly length: number } {
    const { a, b } = this.#ends;
    const offsets = this.#offsets;
    const contact = this.#contact;
    let filled = 0;
    for (let u = 0; u + 1 < offsets.length; u++) {
      const end = offsets[u + 1]!;
      for (let s = offsets[u]!; s < end; s++) {
        const v = contact[s]!;
        if (u > v) continue;
        a[filled] = u;
        b[filled++] = v;
      }
    }
    return this.#ends;
  }

  /**
   * Makes proposals; with fewer than two pairs there is nothing to propose.
   * @returns how many were accepted
   */
  run(proposals: number, random: RandomStream): number {
    const offsets = this.#offsets;
    const contact = this.#contact;
    const mate = this.#mate;
    const flags = this.#isInterviewed;
    const places = contact.length;
    if (places < 4) return 0;
    let accepted = 0;
    for (let step = 0; step < proposals; step++) {
      const s = random.below(places);
      const t = random.below(places);
      const sMate = mate[s]!;
      const tMate = mate[t]!;
      // Pairs (a,b) and (c,d) are to become (a,d) and (c,b).
      const a = contact[sMate]!;
      const b = contact[s]!;
      const c = contact[tMate]!;
      const d = contact[t]!;
      if (a === d || b === c || s === t || s === tMate) continue;
      if (flags && ((flags[a] === 0 && flags[d] === 0) || (flags[b] === 0 && flags[c] === 0))) {
        continue;
      }
      if (isContact(offsets, contact, a, d) || isContact(offsets, contact, b, c)) continue;
      // Rows of a, d, b and c in turn; each keeps its person.
      contact[s] = d;
      contact[tMate] = a;
      contact[sMate] = c;
      contact[t] = b;
      mate[s] = tMate;
      mate[tMate] = s;
      mate[sMate] = t;
      mate[t] = sMate;
      accepted++;
    }
    return accepted;
  }
}

/** Whether two people are contacts, seen in the shorter of their rows. */
function isContact(offsets: Int32Array, contact: Int32Array, u: number, v: number): boolean {
  const uStart = offsets[u]!;
  const uEnd = offsets[u + 1]!;
  const vStart = offsets[v]!;
  const vEnd = offsets[v + 1]!;
  const inFirst = uEnd - uStart <= vEnd - vStart;
  const end = inFirst ? uEnd : vEnd;
  const sought = inFirst ? v : u;
  for (let k = inFirst ? uStart : vStart; k < end; k++) if (contact[k] === sought) return true;
  return false;
}
