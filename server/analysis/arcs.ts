import { GrowingTable } from "./growing-table.ts";

/** Pairs of each person, as chains that grow at the front; a pair once listed stays listed. */
export class Arcs {
  readonly #heads = new GrowingTable({ head: "int32" });
  readonly #arcs = new GrowingTable({ pair: "int32", other: "int32", next: "int32" });

  /** Adds a person without pairs. */
  addPerson(): void {
    this.#heads.push({ head: -1 });
  }

  /** Lists a pair with both its people. */
  addPair(pair: number, a: number, b: number): void {
    const { head } = this.#heads.columns;
    head[a] = this.#arcs.push({ pair, other: b, next: head[a] as number });
    head[b] = this.#arcs.push({ pair, other: a, next: head[b] as number });
  }

  /** Calls `visit(pair, other person)` for each pair of a person. */
  each(person: number, visit: (pair: number, other: number) => void): void {
    const { pair, other, next } = this.#arcs.columns;
    let at = this.#heads.columns.head[person] as number;
    for (; at >= 0; at = next[at] as number) visit(pair[at] as number, other[at] as number);
  }
}
