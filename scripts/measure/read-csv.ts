import { type CsvErrorCode, parse } from "csv-parse/sync";
import type { FieldErrorCode } from "../../shared/errors.ts";

/** One bad cell: physical line (the header is line 1), column, code. Values are never echoed. */
export type BadRow = {
  readonly line: number;
  readonly column: string;
  readonly code: FieldErrorCode;
};

export type CsvRow = {
  /** Physical line on which the row begins. */
  readonly line: number;
  /** Trimmed cell of a column; "" when the file has no such column. */
  readonly get: (column: string) => string;
};

export type CsvTable = {
  readonly columns: ReadonlySet<string>;
  readonly rows: readonly CsvRow[];
  readonly bad: readonly BadRow[];
};

type ParsedRow = { record: string[]; info: { lines: number } };

function faulty(line: number, column: string, code: FieldErrorCode): CsvTable {
  return { columns: new Set(), rows: [], bad: [{ line, column, code }] };
}

/** Line breaks inside quoted cells; they tell how far above its last line a row begins. */
function innerLines(cells: readonly string[]): number {
  let count = 0;
  for (const cell of cells) count += cell.split("\n").length - 1;
  return count;
}

function headerFaults(header: readonly string[], line: number): BadRow[] {
  const repeated = new Set(header.filter((name, at) => name && header.indexOf(name) !== at));
  return [...repeated].map((column) => ({ line, column, code: "duplicate_column" }));
}

/** csv-parse names the line in its error; a file that ends inside quotes has an own code. */
function parseFault(error: unknown): CsvTable {
  const { code, lines } = error as { code?: CsvErrorCode; lines?: number };
  return faulty(lines ?? 1, "row", code === "CSV_QUOTE_NOT_CLOSED" ? "unclosed_quote" : "not_csv");
}

/**
 * Reads a comma-separated file: UTF-8 with or without byte-order mark, any line ends, quoted
 * cells. Blank lines are skipped. A row with a wrong number of cells is a bad row; a row whose
 * surplus cells are all blank is not.
 *
 * @param bytes content of the file
 * @param required columns the file must have
 */
export function readCsv(bytes: Uint8Array, required: readonly string[]): CsvTable {
  let text: string;
  try {
    text = new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch {
    return faulty(1, "row", "encoding");
  }
  let parsed: ParsedRow[];
  try {
    // A file edited on two systems mixes line ends; csv-parse would count some of them twice.
    parsed = parse(text.replace(/\r\n?/g, "\n"), {
      bom: true,
      info: true,
      record_delimiter: "\n",
      relax_column_count: true,
      skip_empty_lines: true,
    }) as unknown as ParsedRow[];
  } catch (error) {
    return parseFault(error);
  }
  const first = parsed[0];
  if (!first) return faulty(1, "row", "empty_file");

  const header = first.record.map((name) => name.trim());
  const headerLine = first.info.lines - innerLines(first.record);
  const bad = headerFaults(header, headerLine);
  for (const column of required) {
    if (!header.includes(column)) bad.push({ line: headerLine, column, code: "required_column" });
  }
  if (bad.length > 0) return { columns: new Set(header), rows: [], bad };

  const at = new Map(header.map((name, index) => [name, index]));
  const rows: CsvRow[] = [];
  for (const { record, info } of parsed.slice(1)) {
    const line = info.lines - innerLines(record);
    if (record.every((cell) => cell.trim() === "")) continue;
    const surplus = record.slice(header.length).some((cell) => cell.trim() !== "");
    if (surplus || record.length < header.length) {
      bad.push({ line, column: "row", code: "ragged_row" });
      continue;
    }
    const get = (column: string) => record[at.get(column) ?? -1]?.trim() ?? "";
    rows.push({ line, get });
  }
  return { columns: new Set(header), rows, bad };
}
