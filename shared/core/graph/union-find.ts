/** What a union did. `winner` is the root that remains; `loser` the root that was absorbed. */
export type UnionResult = {
  /** False when both people were in one group already; then `winner === loser`. */
  readonly merged: boolean;
  readonly winner: number;
  readonly loser: number;
};

function grown(array: Int32Array, capacity: number): Int32Array {
  const next = new Int32Array(capacity);
  next.set(array);
  return next;
}

/**
 * Growable union–find over people numbered 0, 1, 2, … in order of entry. It follows a group as
 * people and pairs are added; it cannot undo, so a withdrawal means a rebuild of what it touched.
 *
 * Identity of a group: the larger part keeps its root; of two equal parts the one with the oldest
 * member (lowest number) does.
 *
 * Cost: union by size with path halving, near-constant per step (inverse Ackermann); 12 bytes a
 * person. Source: Tarjan 1975, *Efficiency of a good but not linear set union algorithm*; methods
 * C.11 (which part keeps the identity).
 */
export class UnionFind {
  #parent: Int32Array;
  #size: Int32Array;
  #oldest: Int32Array;
  #length = 0;
  #groups = 0;

  /** @param people how many separate people to start with */
  constructor(people = 0) {
    if (!Number.isSafeInteger(people) || people < 0) {
      throw new RangeError("people must be a whole number >= 0");
    }
    const capacity = Math.max(16, people);
    this.#parent = new Int32Array(capacity);
    this.#size = new Int32Array(capacity);
    this.#oldest = new Int32Array(capacity);
    for (let k = 0; k < people; k++) this.add();
  }

  /** People so far. */
  get length(): number {
    return this.#length;
  }

  /** Groups so far; a person with no pair is a group of one. */
  get groups(): number {
    return this.#groups;
  }

  /** Adds one person as a group of their own and returns their number. */
  add(): number {
    const person = this.#length;
    if (person === this.#parent.length) {
      const capacity = 2 * person;
      this.#parent = grown(this.#parent, capacity);
      this.#size = grown(this.#size, capacity);
      this.#oldest = grown(this.#oldest, capacity);
    }
    this.#parent[person] = person;
    this.#size[person] = 1;
    this.#oldest[person] = person;
    this.#length++;
    this.#groups++;
    return person;
  }

  /**
   * The person who stands for the group of `person`.
   * @throws RangeError for a person never added
   */
  root(person: number): number {
    if (!Number.isSafeInteger(person) || person < 0 || person >= this.#length) {
      throw new RangeError(`person ${person} was never added`);
    }
    const parent = this.#parent;
    let at = person;
    while (parent[at] !== at) {
      const skip = parent[parent[at]!]!;
      parent[at] = skip;
      at = skip;
    }
    return at;
  }

  /** People in the group of `person`, themselves included. */
  size(person: number): number {
    return this.#size[this.root(person)]!;
  }

  /** The lowest number in the group of `person`: its first member to be entered. */
  oldest(person: number): number {
    return this.#oldest[this.root(person)]!;
  }

  /** Joins the groups of two people. Joining a person with themselves changes nothing. */
  union(a: number, b: number): UnionResult {
    const first = this.root(a);
    const second = this.root(b);
    if (first === second) return { merged: false, winner: first, loser: first };
    const difference = this.#size[first]! - this.#size[second]!;
    const firstWins =
      difference > 0 || (difference === 0 && this.#oldest[first]! < this.#oldest[second]!);
    const winner = firstWins ? first : second;
    const loser = firstWins ? second : first;
    this.#parent[loser] = winner;
    this.#size[winner]! += this.#size[loser]!;
    this.#oldest[winner] = Math.min(this.#oldest[winner]!, this.#oldest[loser]!);
    this.#groups--;
    return { merged: true, winner, loser };
  }
}
