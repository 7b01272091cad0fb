export type CsvValue = string | number | null;

/** A spreadsheet would read a text that starts so as a formula. */
const formula = /^[=+\-@\t\r]/;

/**
 * Rows as CSV text by RFC 4180, decimal point, blank for null; text that a spreadsheet could run
 * as a formula gets an apostrophe in front.
 */
export function toCsv(head: readonly string[], rows: readonly (readonly CsvValue[])[]): string {
  return [head, ...rows].map((row) => `${row.map(cell).join(",")}\r\n`).join("");
}

function cell(value: CsvValue): string {
  if (value === null) return "";
  if (typeof value === "number") return Number.isFinite(value) ? String(value) : "";
  const safe = formula.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
