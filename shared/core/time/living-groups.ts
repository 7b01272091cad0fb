import { UnionFind } from "../graph/union-find.ts";

/** What happened to a group of at least two people. Ids outlive the people they came from. */
export type GroupEvent = {
  readonly kind: "birth" | "merge" | "split" | "end";
  /** The group that goes on (of a split: what it was); a birth's own id. */
  readonly group: number;
  /** The group absorbed (merge) or split off (split); null otherwise. */
  readonly other: number | null;
  /** People in `group` afterwards, and of `other` (merge: before it; split: after it). */
  readonly size: number;
  readonly otherSize: number;
};

/**
 * The oldest member (lowest number) of everyone's group. A union–find of its own, with the older root
 * always on top, without the checks of the growable one: it runs over all pairs at once.
 */
function oldestMembers(people: number, a: Int32Array, b: Int32Array, count: number): Int32Array {
  const parent = Int32Array.from({ length: people }, (_, u) => u);
  for (let k = 0; k < count; k++) {
    let [u, v] = [a[k]!, b[k]!];
    while (u !== v) {
      if (u < v) {
        // Halve the younger end's path, or hang its root below.
        if (parent[v] === v) parent[v] = u;
        const above = parent[v]!;
        parent[v] = parent[above]!;
        v = above;
      } else {
        if (parent[u] === u) parent[u] = v;
        const above = parent[u]!;
        parent[u] = parent[above]!;
        u = above;
      }
    }
  }
  // Parents are older, so one pass in order of age settles everyone.
  for (let u = 0; u < people; u++) parent[u] = parent[parent[u]!]!;
  return parent;
}

/**
 * Groups that keep their identity while people and pairs come and go. A person enters as a group of
 * one and gives it an id. When groups join, the larger part keeps its id (tie:
 * the one with the oldest member); when one falls apart, its largest part does, and the others get
 * new ids that nobody had before.
 *
 * Cost: near-constant per person and pair; a withdrawal rebuilds everything, O(n + m). Source:
 * methods C.11 (union–find cannot delete).
 */
export class LivingGroups {
  #sets = new UnionFind();
  /** Id of the group whose root is this person. */
  #ids: number[] = [];
  #nextId: number;
  #largest = 0;

  /** @param firstId ids from here on go to groups that split off; entering ones lie below */
  constructor(firstId: number) {
    this.#nextId = firstId;
  }

  get people(): number {
    return this.#sets.length;
  }

  get groups(): number {
    return this.#sets.groups;
  }

  /** People in the largest group; 0 without people. */
  get largest(): number {
    return this.#largest;
  }

  /** Lets one person in as group `id` and returns their place of entry: 0, 1, 2, … */
  enter(id: number): number {
    const place = this.#sets.add();
    this.#ids.push(id);
    if (this.#largest === 0) this.#largest = 1;
    return place;
  }

  /** Id of the group a person is in. */
  idOf(place: number): number {
    return this.#ids[this.#sets.root(place)]!;
  }

  size(place: number): number {
    return this.#sets.size(place);
  }

  /**
   * Joins two people.
   * @returns what came of it: nothing new, a person joining a group, or an event
   */
  join(a: number, b: number): "within" | "join" | GroupEvent {
    const [sizeA, sizeB] = [this.#sets.size(a), this.#sets.size(b)];
    const { merged, winner, loser } = this.#sets.union(a, b);
    if (!merged) return "within";
    const size = sizeA + sizeB;
    if (size > this.#largest) this.#largest = size;
    const group = this.#ids[winner]!;
    if (size === 2) return { kind: "birth", group, other: null, size, otherSize: 0 };
    if (sizeA === 1 || sizeB === 1) return "join";
    const otherSize = Math.min(sizeA, sizeB);
    return { kind: "merge", group, other: this.#ids[loser]!, size, otherSize };
  }

  /**
   * Starts again from the pairs that still stand, after some were withdrawn.
   * @param count how many of the pairs `a[k]`, `b[k]` (places of entry) stand
   * @returns the groups that fell apart: a split for each part of two or more that got a new id,
   *   an end for each group of which only single people are left
   */
  rebuild(a: Int32Array, b: Int32Array, count: number): GroupEvent[] {
    const people = this.#sets.length;
    const old = this.#sets;
    const next = new UnionFind(people);
    const oldest = oldestMembers(people, a, b, count);
    // Of equal parts the older wins, so the root of each part stays its oldest member.
    for (let u = 0; u < people; u++) if (oldest[u] !== u) next.union(oldest[u]!, u);

    // The largest part of each old group keeps its id (tie: the one met first, by oldest member).
    const sizes = new Int32Array(people);
    for (const root of oldest) sizes[root]!++;
    const oldRoot = new Int32Array(people);
    const heir = new Int32Array(people).fill(-1);
    let largest = 0;
    for (let root = 0; root < people; root++) {
      if (oldest[root] !== root) continue;
      oldRoot[root] = old.root(root);
      if (sizes[root]! > largest) largest = sizes[root]!;
      const held = heir[oldRoot[root]!]!;
      if (held < 0 || sizes[root]! > sizes[held]!) heir[oldRoot[root]!] = root;
    }
    const ids = new Array<number>(people).fill(-1);
    const events: GroupEvent[] = [];
    for (let root = 0; root < people; root++) {
      if (oldest[root] !== root) continue;
      const from = oldRoot[root]!;
      const group = this.#ids[from]!;
      const size = sizes[root]!;
      if (heir[from] === root) {
        ids[root] = group;
        if (size === 1 && old.size(from) > 1) {
          events.push({ kind: "end", group, other: null, size: 1, otherSize: 0 });
        }
        continue;
      }
      const other = this.#nextId++;
      ids[root] = other;
      if (size > 1) {
        const left = sizes[heir[from]!]!;
        events.push({ kind: "split", group, other, size: left, otherSize: size });
      }
    }
    this.#sets = next;
    this.#ids = ids;
    this.#largest = largest;
    return events;
  }
}
