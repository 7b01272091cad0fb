function grown(array: Int32Array): Int32Array<ArrayBuffer> {
  const next = new Int32Array(2 * array.length);
  next.set(array);
  return next;
}

/** Pairs of each person, as chains that grow at the front; a pair once listed stays listed. */
export class Arcs {
  // Plain arrays: this is filled pair by pair whenever a graph is read whole.
  #heads = new Int32Array(64);
  #people = 0;
  #pair = new Int32Array(128);
  #other = new Int32Array(128);
  #next = new Int32Array(128);
  #length = 0;

  /** Adds a person without pairs. */
  addPerson(): void {
    if (this.#people === this.#heads.length) this.#heads = grown(this.#heads);
    this.#heads[this.#people++] = -1;
  }

  /** Lists a pair with both its people. */
  addPair(pair: number, a: number, b: number): void {
    this.#add(pair, a, b);
    this.#add(pair, b, a);
  }

  #add(pair: number, from: number, to: number): void {
    if (this.#length === this.#pair.length) {
      this.#pair = grown(this.#pair);
      this.#other = grown(this.#other);
      this.#next = grown(this.#next);
    }
    const at = this.#length++;
    this.#pair[at] = pair;
    this.#other[at] = to;
    this.#next[at] = this.#heads[from] as number;
    this.#heads[from] = at;
  }

  /** Calls `visit(pair, other person)` for each pair of a person. */
  each(person: number, visit: (pair: number, other: number) => void): void {
    let at = this.#heads[person] as number;
    for (; at >= 0; at = this.#next[at] as number) {
      visit(this.#pair[at] as number, this.#other[at] as number);
    }
  }
}
