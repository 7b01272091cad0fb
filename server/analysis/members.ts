/**
 * Who belongs together, as rings: each person points at the next of their group, the last at the
 * first. Two rings are joined by crossing two pointers, so a group can be walked without a list
 * per group.
 */
export class Members {
  #next = new Int32Array(64);
  #length = 0;

  /** Adds one person as a ring of their own. */
  add(): void {
    if (this.#length === this.#next.length) {
      const next = new Int32Array(2 * this.#length);
      next.set(this.#next);
      this.#next = next;
    }
    this.#next[this.#length] = this.#length++;
  }

  /** Joins two different rings. */
  join(a: number, b: number): void {
    const after = this.#next[a] as number;
    this.#next[a] = this.#next[b] as number;
    this.#next[b] = after;
  }

  /** Everyone of a person's ring. */
  of(person: number): number[] {
    const out = [person];
    for (let at = this.#next[person] as number; at !== person; at = this.#next[at] as number) {
      out.push(at);
    }
    return out;
  }

  /** Makes each of these people a ring of their own. */
  separate(people: readonly number[]): void {
    for (const person of people) this.#next[person] = person;
  }
}
