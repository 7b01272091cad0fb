import { checkCount } from "./check-count.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/** Codes of a quasi-identifier (age band, sex, area, setting, week), one per row. */
export type CodeColumn = ArrayLike<number | string>;

export type Anonymity = {
  /** k, rows in the smallest class of rows that look alike. */
  readonly k: Measured;
  /** Distinct classes. */
  readonly classes: number;
  /** Rows in the class of each row, itself included. */
  readonly classSize: Int32Array;
  /** Fewest distinct outcomes in any class (ℓ-diversity); undefined without outcomes. */
  readonly diversity: Measured;
};

/** Numbers the classes of rows that agree in every column. */
function classesOf(
  rows: number,
  columns: readonly CodeColumn[],
): { of: Int32Array; count: number } {
  let of = new Int32Array(rows);
  let count = rows === 0 ? 0 : 1;
  for (const column of columns) {
    if (column.length !== rows) throw new RangeError("columns differ in length");
    const codes = new Map<number | string, number>();
    const seen = new Map<number, number>();
    const refined = new Int32Array(rows);
    for (let row = 0; row < rows; row++) {
      const value = column[row]!;
      let code = codes.get(value);
      if (code === undefined) {
        code = codes.size;
        codes.set(value, code);
      }
      const key = code * count + of[row]!;
      let label = seen.get(key);
      if (label === undefined) {
        label = seen.size;
        seen.set(key, label);
      }
      refined[row] = label;
    }
    of = refined;
    count = seen.size;
  }
  return { of, count };
}

/**
 * How many rows of a person table look alike in their quasi-identifiers, at worst.
 *
 * k-anonymity does not stop an outcome from being read off when all k rows share it; `diversity`
 * tells how many distinct outcomes the poorest class holds.
 *
 * @param rows number of rows
 * @param columns the quasi-identifiers; none at all makes one class of everyone
 * @param outcome what must not be read off, or null
 * @throws RangeError when a column does not hold one code per row
 *
 * Edge cases: no rows → undefined (`no_rows`). Cost: O(rows × columns). Source: Sweeney 2002,
 * *k-anonymity: a model for protecting privacy*; Machanavajjhala et al. 2007, *ℓ-diversity*;
 * methods C.12.2.
 */
export function kAnonymity(
  rows: number,
  columns: readonly CodeColumn[],
  outcome: CodeColumn | null = null,
): Anonymity {
  checkCount("rows", rows);
  const { of, count } = classesOf(rows, columns);
  const sizes = new Int32Array(count);
  for (const label of of) sizes[label]!++;
  const classSize = of.map((label) => sizes[label]!);
  let k: Measured = undefinedBecause("no_rows");
  if (rows > 0) k = defined(sizes.reduce((least, size) => Math.min(least, size), rows));
  return { k, classes: count, classSize, diversity: diversityOf(of, sizes, outcome) };
}

function diversityOf(of: Int32Array, sizes: Int32Array, outcome: CodeColumn | null): Measured {
  if (outcome === null) return undefinedBecause("no_values");
  if (outcome.length !== of.length) throw new RangeError("columns differ in length");
  if (of.length === 0) return undefinedBecause("no_rows");
  const outcomes = Array.from(sizes, () => new Set<number | string>());
  for (let row = 0; row < of.length; row++) outcomes[of[row]!]?.add(outcome[row]!);
  return defined(outcomes.reduce((least, set) => Math.min(least, set.size), of.length));
}
