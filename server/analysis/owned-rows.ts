import { type ColumnKind, type ColumnsOf, GrowingTable, type RowOf } from "./growing-table.ts";

type Dated = Record<string, ColumnKind> & { recordedAt: "float64" };

/** Where a row's `recordedAt` stands for "no longer there": no instant is as late. */
export const GONE = Number.POSITIVE_INFINITY;

/**
 * Rows that belong to an owner (a person, a pair), kept as a chain per owner, so that all rows of
 * one owner can be replaced without looking at anybody else's. Rows that fall away stay in the
 * columns with `recordedAt` = `GONE`, which no cut-off reaches.
 */
export class OwnedRows<const S extends Dated> {
  readonly #rows: GrowingTable<S>;
  readonly #links = new GrowingTable({ next: "int32" });
  readonly #heads = new GrowingTable({ head: "int32" });
  readonly #owner: keyof S & string;

  /** @param owner name of the column that holds the owner's number */
  constructor(spec: S, owner: keyof S & string) {
    this.#rows = new GrowingTable(spec);
    this.#owner = owner;
  }

  get length(): number {
    return this.#rows.length;
  }

  get columns(): ColumnsOf<S> {
    return this.#rows.columns;
  }

  #headOf(owner: number): number {
    while (this.#heads.length <= owner) this.#heads.push({ head: -1 });
    return this.#heads.columns.head[owner] ?? -1;
  }

  /** Adds a row to its owner's chain. */
  add(row: RowOf<S>): void {
    const owner = row[this.#owner] as number;
    const head = this.#headOf(owner);
    const at = this.#rows.push(row);
    this.#links.push({ next: head });
    this.#heads.set(owner, { head: at });
  }

  /** Numbers of an owner's rows, those gone included. */
  *of(owner: number): Generator<number> {
    for (let at = this.#headOf(owner); at >= 0; at = this.#links.columns.next[at] ?? -1) yield at;
  }

  /** Puts `rows` in the place of all the owner has; the places are used again. */
  replace(owner: number, rows: readonly RowOf<S>[]): void {
    const places = [...this.of(owner)];
    rows.forEach((row, k) => {
      const at = places[k];
      if (at === undefined) this.add(row);
      else this.#rows.set(at, row);
    });
    const { recordedAt } = this.#rows.columns as ColumnsOf<{ recordedAt: "float64" }>;
    for (const at of places.slice(rows.length)) recordedAt[at] = GONE;
  }

  shared(): ColumnsOf<S> {
    return this.#rows.shared();
  }
}
