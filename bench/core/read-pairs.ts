import { readNetwork } from "../../scripts/measure/read-network.ts";
import type { PairEnds } from "../../shared/core/index.ts";

export type PairsFile = { readonly n: number; readonly ends: PairEnds };

const [QUOTE, COMMA, NEWLINE] = [0x22, 0x2c, 0x0a];

/** A place per pair that grows. */
function grown(values: Int32Array): Int32Array {
  const larger = new Int32Array(2 * values.length);
  larger.set(values);
  return larger;
}

/** Start and end of the cell with number `column` in the line that lies in `from … to`. */
function cellAt(bytes: Buffer, from: number, to: number, column: number): string {
  let start = from;
  for (let k = 0; k < column; k++) {
    const comma = bytes.indexOf(COMMA, start);
    if (comma < 0 || comma >= to) return "";
    start = comma + 1;
  }
  const comma = bytes.indexOf(COMMA, start);
  return bytes.toString("utf8", start, comma < 0 || comma > to ? to : comma).trim();
}

/** Reads a file without quotes line by line; null when anything is out of the ordinary. */
function readPlain(bytes: Buffer): PairsFile | null {
  if (bytes.includes(QUOTE)) return null;
  const headerEnd = bytes.indexOf(NEWLINE);
  if (headerEnd < 0) return null;
  const header = bytes.toString("utf8", 0, headerEnd).replace(/^\ufeff/, "");
  const columns = header.split(",").map((name) => name.trim());
  const [first, second] = [columns.indexOf("ref_a"), columns.indexOf("ref_b")];
  if (first < 0 || second < 0 || new Set(columns).size < columns.length) return null;

  const numbers = new Map<string, number>();
  const numberOf = (ref: string) => {
    const known = numbers.get(ref);
    if (known !== undefined) return known;
    numbers.set(ref, numbers.size);
    return numbers.size - 1;
  };
  let a: Int32Array = new Int32Array(1024);
  let b: Int32Array = new Int32Array(1024);
  let length = 0;
  for (let at = headerEnd + 1; at < bytes.length; ) {
    const newline = bytes.indexOf(NEWLINE, at);
    const end = newline < 0 ? bytes.length : newline;
    const one = cellAt(bytes, at, end, first);
    const other = cellAt(bytes, at, end, second);
    const isBlank = one === "" && other === "" && bytes.toString("utf8", at, end).trim() === "";
    at = end + 1;
    if (isBlank) continue;
    if (one === "" || other === "" || one === other) return null;
    if (length === a.length) {
      a = grown(a);
      b = grown(b);
    }
    a[length] = numberOf(one);
    b[length++] = numberOf(other);
  }
  return { n: numbers.size, ends: { a: a.slice(0, length), b: b.slice(0, length) } };
}

/**
 * The pairs of a file, people numbered in order of appearance. Only the two references are read, in
 * little memory; a file with quotes or faults goes to the reader of `measure`.
 *
 * @throws Error that names the first bad row
 */
export function readPairs(bytes: Buffer): PairsFile {
  const plain = readPlain(bytes);
  if (plain) return plain;
  const { network, pairsFaults } = readNetwork(bytes, null);
  if (network) return network;
  const [bad] = pairsFaults;
  throw new Error(`line ${bad?.line}: ${bad?.column}: ${bad?.code}`);
}
