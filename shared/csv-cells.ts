/**
 * First characters by which a spreadsheet takes a cell for a formula, or eats what comes after
 * (OWASP ASVS 5.0, 1.2.10), and the full-width forms that some of them read alike.
 */
const RISKY = new Set(["=", "+", "-", "@", "\t", "\r", "\0", "＝", "＋", "－", "＠"]);
const GUARD = "'";

/**
 * Puts an apostrophe before a cell that a spreadsheet would run as a formula, and before one that
 * begins with an apostrophe already, so that taking exactly one away is lossless.
 */
export function guardCell(value: string): string {
  const first = value.charAt(0);
  return first === GUARD || RISKY.has(first) ? GUARD + value : value;
}

/**
 * Takes away the apostrophe that `guardCell` put there: exactly one, and only before what would have
 * needed it, so that a name which begins with an apostrophe by itself stays whole.
 */
export function unguardCell(cell: string): string {
  if (cell.charAt(0) !== GUARD || cell.length < 2) return cell;
  const next = cell.charAt(1);
  return next === GUARD || RISKY.has(next) ? cell.slice(1) : cell;
}

/** One record of a CSV file (RFC 4180): every cell guarded and quoted, ended by CRLF. */
export function csvRecord(cells: readonly (string | null | undefined)[]): string {
  let line = "";
  for (const [at, cell] of cells.entries()) {
    const text = cell ? guardCell(cell).replaceAll('"', '""') : "";
    line += at === 0 ? `"${text}"` : `,"${text}"`;
  }
  return `${line}\r\n`;
}
