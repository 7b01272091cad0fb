import { setImmediate as turn } from "node:timers/promises";
import { UnionFind } from "../../shared/core/index.ts";
import { Arcs } from "./arcs.ts";
import type { Touched } from "./graph-step.ts";
import type { GraphStore } from "./graph-store.ts";
import { GroupBook, type LiveGroup } from "./group-book.ts";
import { GrowingTable } from "./growing-table.ts";
import { heldPairsByEntry } from "./held-pairs.ts";
import { Members } from "./members.ts";
import { pastSizes } from "./past-sizes.ts";

/** Union–find elements left over from rebuilds, per person, before they are thrown away. */
const MOST_ELEMENTS_PER_PERSON = 4;
/** Pairs handled between two turns of the event loop: some 10 ms. */
const SLICE = 20_000;

/**
 * The connected groups of an investigation's current record: union–find for what is added, a
 * rebuild of the touched groups for what is withdrawn.
 *
 * Each graph version is one step. In a step the largest of the parts that join keeps its id (tie:
 * the one founded by the person entered first), whatever the order of the pairs inside the step; of
 * the parts that a withdrawal leaves, the largest keeps it (tie likewise). A group is two people or
 * more. Source: methods C.11; Tarjan 1975.
 *
 * When built from a whole record the standing pairs are replayed by time of entry, so a restart
 * gives the same ids; a group whose identity once hung on a pair withdrawn since may get another.
 */
export class LiveGroups {
  readonly #store: GraphStore;
  readonly #book: GroupBook;
  readonly #people = new GrowingTable({ element: "int32", there: "uint8" });
  readonly #pairs = new GrowingTable({ held: "uint8" });
  readonly #members = new Members();
  readonly #arcs = new Arcs();
  #sets = new UnionFind();

  private constructor(store: GraphStore) {
    this.#store = store;
    this.#book = new GroupBook(store, (person) => this.#members.of(person));
  }

  /**
   * Reads the groups of a whole record, in slices, so that other work gets its turn in between. The
   * store must not change meanwhile.
   *
   * @param since instant (ms) that growth is counted from
   */
  static async read(store: GraphStore, since: number): Promise<LiveGroups> {
    const groups = new LiveGroups(store);
    groups.#addPeople();
    await turn();
    groups.since(since);
    await turn();
    const steps = heldPairsByEntry(store);
    let joined = 0;
    while (groups.#pairs.length < store.pairs.length) {
      groups.#listPairs(steps.held, SLICE);
      await turn();
    }
    for (const step of steps.batches()) {
      groups.#join(step);
      joined += step.length;
      if (joined < SLICE) continue;
      joined = 0;
      await turn();
    }
    return groups;
  }

  /** Counts growth from another instant (a new day). */
  since(instant: number): void {
    this.#book.countFrom(pastSizes(this.#store, instant));
  }

  /** Groups by size descending, then by founder; do not change them. */
  list(): readonly LiveGroup[] {
    return this.#book.list();
  }

  /** The group of a person, or undefined for a person with no pair. */
  groupOf(person: number): LiveGroup | undefined {
    return this.#book.get(this.#root(person));
  }

  /** Follows one step of the store: withdrawals first, then what was added. */
  apply(touched: Touched): void {
    this.#addPeople();
    const pairs = new Set(touched.pairs);
    for (const person of touched.people) {
      const there = this.#store.isOnRecord(person) ? 1 : 0;
      if (this.#people.columns.there[person] !== there) {
        this.#people.columns.there[person] = there;
        this.#arcs.each(person, (pair) => pairs.add(pair));
      }
      this.#book.recount(person, this.#root(person));
    }
    const added: number[] = [];
    const removed: number[] = [];
    this.#listPairs();
    const { held } = this.#pairs.columns;
    for (const pair of pairs) {
      const now = this.#store.isHeld(pair) ? 1 : 0;
      if (held[pair] === now) continue;
      held[pair] = now;
      (now ? added : removed).push(pair);
    }
    if (removed.length > 0) this.#rebuild(removed, new Set(added));
    this.#join(added);
  }

  #root(person: number): number {
    return this.#sets.root(this.#people.columns.element[person] as number);
  }

  #addPeople(): void {
    while (this.#people.length < this.#store.people.length) {
      const there = this.#store.isOnRecord(this.#people.length) ? 1 : 0;
      this.#people.push({ element: this.#sets.add(), there });
      this.#members.add();
      this.#arcs.addPerson();
      this.#book.addPerson();
    }
  }

  #listPairs(held?: Uint8Array, most = Number.POSITIVE_INFINITY): void {
    const { a, b } = this.#store.pairs;
    const end = Math.min(this.#store.pairs.length, this.#pairs.length + most);
    for (let pair = this.#pairs.length; pair < end; pair++) {
      this.#pairs.push({ held: held?.[pair] ?? 0 });
      this.#arcs.addPair(pair, a[pair] as number, b[pair] as number);
    }
  }

  #join(pairs: Iterable<number>): void {
    const { a, b } = this.#store.pairs;
    this.#book.startStep();
    for (const pair of pairs) this.#union(a[pair] as number, b[pair] as number, true);
    this.#book.endStep();
  }

  #union(one: number, other: number, booked: boolean): void {
    const { element } = this.#people.columns;
    const first = this.#root(one);
    const second = this.#root(other);
    if (first === second) return;
    const { winner } = this.#sets.union(element[one] as number, element[other] as number);
    if (booked)
      this.#book.merge({ root: first, person: one }, { root: second, person: other }, winner);
    this.#members.join(one, other);
  }

  /** Takes the groups of withdrawn pairs apart and joins them anew from the pairs that stand. */
  #rebuild(withdrawn: readonly number[], toCome: ReadonlySet<number>): void {
    const { a } = this.#store.pairs;
    const roots = new Map<number, number>();
    for (const pair of withdrawn) roots.set(this.#root(a[pair] as number), a[pair] as number);
    for (const [root, person] of roots) {
      const everyone = this.#members.of(person);
      this.#members.separate(everyone);
      const { element } = this.#people.columns;
      for (const member of everyone) element[member] = this.#sets.add();
      for (const member of everyone) {
        this.#arcs.each(member, (pair, other) => {
          if (member < other && this.#pairs.columns.held[pair] === 1 && !toCome.has(pair)) {
            this.#union(member, other, false);
          }
        });
      }
      const parts = new Map<number, number[]>();
      for (const member of everyone) {
        const part = parts.get(this.#root(member));
        if (part) part.push(member);
        else parts.set(this.#root(member), [member]);
      }
      this.#book.split(root, parts);
    }
    if (this.#sets.length > MOST_ELEMENTS_PER_PERSON * (this.#people.length + 64)) this.#compact();
  }

  /** Starts a new union–find with one element a person; groups stay as they are. */
  #compact(): void {
    const { element } = this.#people.columns;
    const old = this.#sets;
    const firstOfRoot = new Map<number, number>();
    const next = new UnionFind(this.#people.length);
    for (let person = 0; person < this.#people.length; person++) {
      const root = old.root(element[person] as number);
      const first = firstOfRoot.get(root);
      if (first === undefined) firstOfRoot.set(root, person);
      else next.union(first, person);
    }
    this.#sets = next;
    for (let person = 0; person < this.#people.length; person++) element[person] = person;
    this.#book.rename((root) => {
      const person = firstOfRoot.get(root);
      return person === undefined ? root : next.root(person);
    });
  }
}
