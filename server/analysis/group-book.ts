import { CONTACT_CODE, type GraphStore, isCaseCode } from "./graph-store.ts";
import { GrowingTable } from "./growing-table.ts";

/** One connected group of two people or more. */
export type LiveGroup = {
  /** Stays the same while the group lives: the record id of the person it was founded by. */
  readonly id: string;
  /** Number of that person. */
  readonly founder: number;
  readonly size: number;
  /** Confirmed, probable and suspected cases. */
  readonly cases: number;
  /** People classified as contacts; the rest is not classified or not a case. */
  readonly contacts: number;
  /** Size of the largest group that any of its people belonged to at the instant growth counts from. */
  readonly past: number;
};

type Entry = {
  id: string | null;
  founder: number;
  member: number;
  size: number;
  cases: number;
  contacts: number;
  past: number;
  // Identity of the strongest part that this entry had at the start of a step.
  step: number;
  partSize: number;
};

type Part = { readonly root: number; readonly person: number };

/** Counts and identity of live groups, by the root that stands for them in the union–find. */
export class GroupBook {
  readonly #store: GraphStore;
  readonly #membersOf: (person: number) => number[];
  readonly #people = new GrowingTable({ code: "uint8", past: "int32" });
  #entries = new Map<number, Entry>();
  readonly #ids = new Set<string>();
  #nameless: Entry[] = [];
  #step = 0;
  #sorted: readonly LiveGroup[] | null = null;

  constructor(store: GraphStore, membersOf: (person: number) => number[]) {
    this.#store = store;
    this.#membersOf = membersOf;
  }

  addPerson(): void {
    const code = this.#store.people.columns.classification[this.#people.length] as number;
    this.#people.push({ code, past: 0 });
  }

  get(root: number): LiveGroup | undefined {
    return this.#entries.get(root) as LiveGroup | undefined;
  }

  list(): readonly LiveGroup[] {
    this.#sorted ??= ([...this.#entries.values()] as LiveGroup[]).sort(
      (x, y) => y.size - x.size || x.founder - y.founder,
    );
    return this.#sorted;
  }

  /** Takes over each person's past group size. */
  countFrom(sizes: Int32Array): void {
    this.#people.columns.past.set(sizes);
    for (const entry of this.#entries.values()) {
      entry.past = 0;
      for (const person of this.#membersOf(entry.member)) {
        entry.past = Math.max(entry.past, sizes[person] ?? 0);
      }
    }
  }

  /** Follows a change of a person's classification. */
  recount(person: number, root: number): void {
    const code = this.#store.people.columns.classification[person] as number;
    const before = this.#people.columns.code[person] as number;
    this.#people.columns.code[person] = code;
    const entry = this.#entries.get(root);
    if (!entry) return;
    entry.cases += Number(isCaseCode(code)) - Number(isCaseCode(before));
    entry.contacts += Number(code === CONTACT_CODE) - Number(before === CONTACT_CODE);
  }

  startStep(): void {
    this.#step++;
    this.#sorted = null;
  }

  /** Groups founded in the step get their ids once all of its pairs are in. */
  endStep(): void {
    for (const entry of this.#nameless) {
      if (entry.id === null && entry.size > 1) entry.id = this.#freeId(entry);
    }
    this.#nameless = [];
  }

  /** Joins two groups, either of which may be a person alone; `winner` is one of the two roots. */
  merge(one: Part, other: Part, winner: number): void {
    const x = this.#at(one);
    const y = this.#at(other);
    const keeps =
      x.partSize > y.partSize || (x.partSize === y.partSize && x.founder < y.founder) ? x : y;
    const gives = keeps === x ? y : x;
    if (gives.id !== null) this.#ids.delete(gives.id);
    keeps.size += gives.size;
    keeps.cases += gives.cases;
    keeps.contacts += gives.contacts;
    keeps.past = Math.max(keeps.past, gives.past);
    // An absorbed founder must not be named later.
    gives.size = 0;
    this.#entries.delete(one.root);
    this.#entries.delete(other.root);
    this.#entries.set(winner, keeps);
  }

  /** Puts the parts of a group that was taken apart in its place: root → people. */
  split(root: number, parts: ReadonlyMap<number, number[]>): void {
    this.startStep();
    const old = this.#entries.get(root);
    this.#entries.delete(root);
    let keeper: Entry | null = null;
    for (const [partRoot, people] of parts) {
      if (people.length < 2) continue;
      const entry = this.#count(people);
      this.#entries.set(partRoot, entry);
      this.#nameless.push(entry);
      const stronger =
        keeper === null ||
        entry.size > keeper.size ||
        (entry.size === keeper.size && entry.founder < keeper.founder);
      if (stronger) keeper = entry;
    }
    if (keeper && old) {
      keeper.id = old.id;
      keeper.founder = old.founder;
    } else if (old?.id) this.#ids.delete(old.id);
    this.endStep();
  }

  /** Roots have got other numbers. */
  rename(newRoot: (root: number) => number): void {
    this.#entries = new Map([...this.#entries].map(([root, entry]) => [newRoot(root), entry]));
  }

  #count(people: readonly number[]): Entry {
    const { code, past } = this.#people.columns;
    const member = people[0] as number;
    const out: Entry = {
      id: null,
      founder: member,
      member,
      size: people.length,
      cases: 0,
      contacts: 0,
      past: 0,
      step: this.#step,
      partSize: 1,
    };
    for (const person of people) {
      out.founder = Math.min(out.founder, person);
      if (isCaseCode(code[person] as number)) out.cases++;
      if (code[person] === CONTACT_CODE) out.contacts++;
      out.past = Math.max(out.past, past[person] as number);
    }
    return out;
  }

  #at(part: Part): Entry {
    const known = this.#entries.get(part.root);
    if (!known) {
      const entry = this.#count([part.person]);
      this.#nameless.push(entry);
      return entry;
    }
    if (known.step !== this.#step) {
      known.step = this.#step;
      known.partSize = known.size;
    }
    return known;
  }

  /** The founder's record id; after splits it may stand for another group, then the next member's. */
  #freeId(entry: Entry): string {
    const founderId = this.#store.personIds[entry.founder] as string;
    const ids = this.#ids.has(founderId)
      ? this.#membersOf(entry.member)
          .sort((x, y) => x - y)
          .map((person) => this.#store.personIds[person] as string)
      : [founderId];
    let id = ids.find((candidate) => !this.#ids.has(candidate));
    for (let turn = 2; id === undefined; turn++) {
      const candidate = `${founderId}-${turn}`;
      if (!this.#ids.has(candidate)) id = candidate;
    }
    this.#ids.add(id);
    return id;
  }
}
