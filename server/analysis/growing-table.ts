/** Element type of a column. */
export type ColumnKind = "int32" | "float64" | "uint8";
type ArrayOf<K extends ColumnKind> = K extends "int32"
  ? Int32Array
  : K extends "float64"
    ? Float64Array
    : Uint8Array;
export type ColumnsOf<S extends Record<string, ColumnKind>> = { [K in keyof S]: ArrayOf<S[K]> };
export type RowOf<S extends Record<string, ColumnKind>> = { [K in keyof S]: number };

const CONSTRUCTORS = { int32: Int32Array, float64: Float64Array, uint8: Uint8Array } as const;

/**
 * Columns of numbers that grow by doubling. Adding a row costs what the row holds, whatever is
 * stored already (amortised).
 */
export class GrowingTable<const S extends Record<string, ColumnKind>> {
  readonly #spec: S;
  readonly #names: (keyof S & string)[];
  #columns: ColumnsOf<S>;
  // The same columns by position: naming them one by one is too slow for some 300,000 rows.
  #list: (Int32Array | Float64Array | Uint8Array)[];
  #capacity: number;
  #length = 0;

  constructor(spec: S, capacity = 64) {
    this.#spec = spec;
    this.#names = Object.keys(spec);
    this.#capacity = capacity;
    this.#columns = this.#make(capacity, (bytes) => new ArrayBuffer(bytes));
    this.#list = this.#names.map((name) => this.#columns[name]);
  }

  #make(capacity: number, buffer: (bytes: number) => ArrayBufferLike): ColumnsOf<S> {
    const out: Record<string, unknown> = {};
    for (const name of this.#names) {
      const Kind = CONSTRUCTORS[this.#spec[name] as ColumnKind];
      out[name] = new Kind(buffer(capacity * Kind.BYTES_PER_ELEMENT) as ArrayBuffer, 0, capacity);
    }
    return out as ColumnsOf<S>;
  }

  /** Rows so far. */
  get length(): number {
    return this.#length;
  }

  /** The columns, longer than `length`; not to be kept, since growing replaces them. */
  get columns(): ColumnsOf<S> {
    return this.#columns;
  }

  /** Appends a row and returns its number. */
  push(row: RowOf<S>): number {
    if (this.#length === this.#capacity) {
      this.#capacity *= 2;
      const next = this.#make(this.#capacity, (bytes) => new ArrayBuffer(bytes));
      for (const name of this.#names) next[name].set(this.#columns[name]);
      this.#columns = next;
      this.#list = this.#names.map((name) => next[name]);
    }
    const at = this.#length++;
    this.set(at, row);
    return at;
  }

  /** Overwrites a row. */
  set(at: number, row: RowOf<S>): void {
    const list = this.#list;
    const names = this.#names;
    for (let k = 0; k < list.length; k++) {
      (list[k] as Float64Array)[at] = row[names[k] as keyof S];
    }
  }

  /** A copy of the rows so far on shared memory, for a worker to read while this table grows. */
  shared(): ColumnsOf<S> {
    const copy = this.#make(this.#length, (bytes) => new SharedArrayBuffer(bytes));
    for (const name of this.#names) copy[name].set(this.#columns[name].subarray(0, this.#length));
    return copy;
  }
}
