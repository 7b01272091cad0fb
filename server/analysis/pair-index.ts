/**
 * Number of each unordered pair of people, by open addressing on the two person numbers: a `Map`
 * with composed keys would take several times the memory at some 300,000 pairs.
 */
export class PairIndex {
  #slots = new Int32Array(1024).fill(-1);
  #a = new Int32Array(512);
  #b = new Int32Array(512);
  #length = 0;

  /** Pairs so far. */
  get length(): number {
    return this.#length;
  }

  /** First ends (the lower person number), longer than `length`. */
  get a(): Int32Array {
    return this.#a;
  }

  /** Second ends (the higher person number), longer than `length`. */
  get b(): Int32Array {
    return this.#b;
  }

  #slotOf(low: number, high: number): number {
    const mask = this.#slots.length - 1;
    let slot = (Math.imul(low, 0x9e3779b1) ^ Math.imul(high, 0x85ebca6b)) & mask;
    slot = (slot ^ (slot >>> 7)) & mask;
    for (;;) {
      const pair = this.#slots[slot] as number;
      if (pair < 0 || (this.#a[pair] === low && this.#b[pair] === high)) return slot;
      slot = (slot + 1) & mask;
    }
  }

  #grow(): void {
    const a = new Int32Array(2 * this.#a.length);
    const b = new Int32Array(2 * this.#b.length);
    a.set(this.#a);
    b.set(this.#b);
    this.#a = a;
    this.#b = b;
    // Never more than half full, so chains stay short.
    this.#slots = new Int32Array(4 * a.length).fill(-1);
    for (let pair = 0; pair < this.#length; pair++) {
      this.#slots[this.#slotOf(a[pair] as number, b[pair] as number)] = pair;
    }
  }

  /** Number of a pair, or -1. */
  find(one: number, other: number): number {
    return this.#slots[this.#slotOf(Math.min(one, other), Math.max(one, other))] as number;
  }

  /** Number of a pair, made when new. */
  findOrAdd(one: number, other: number): number {
    const low = Math.min(one, other);
    const high = Math.max(one, other);
    let slot = this.#slotOf(low, high);
    const known = this.#slots[slot] as number;
    if (known >= 0) return known;
    if (this.#length === this.#a.length) {
      this.#grow();
      slot = this.#slotOf(low, high);
    }
    const pair = this.#length++;
    this.#a[pair] = low;
    this.#b[pair] = high;
    this.#slots[slot] = pair;
    return pair;
  }

  /** Copies of the ends on shared memory. */
  shared(): { a: Int32Array; b: Int32Array } {
    const copy = (source: Int32Array) => {
      const out = new Int32Array(new SharedArrayBuffer(4 * this.#length));
      out.set(source.subarray(0, this.#length));
      return out;
    };
    return { a: copy(this.#a), b: copy(this.#b) };
  }
}
