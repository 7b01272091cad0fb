import { type CsvError, parse } from "csv-parse";
import type { ImportReading } from "../../../shared/contracts/imports.ts";
import type { FieldErrorCode } from "../../../shared/errors.ts";
import { HttpProblem, invalid } from "../../http/problem.ts";
import { fileText } from "./file-text.ts";
import { DELIMITERS, MAX_ROW_CHARACTERS } from "./read-headings.ts";

/** Data rows a file may hold. */
export const MAX_ROWS = 1_000_000;

/** A data row: the physical line on which it begins (the header is line 1) and its cells. */
export interface FileRow {
  line: number;
  /** Raw cells in the order of the expected columns, "" where the file has no such column. */
  cells: string[];
  /** True when the row has too few cells, or more than the header with something in them. */
  ragged: boolean;
}

interface Parsed {
  record: string[];
  info: { lines: number };
}

const blank = (cell: string | undefined) => cell === undefined || cell.trim() === "";

/** Line breaks inside quoted cells tell how far above its last line a row begins. */
function innerLines(cells: readonly string[]): number {
  let count = 0;
  for (const cell of cells) {
    for (let at = cell.indexOf("\n"); at >= 0; at = cell.indexOf("\n", at + 1)) count += 1;
  }
  return count;
}

const PARSER_CODES: Record<string, FieldErrorCode> = {
  CSV_QUOTE_NOT_CLOSED: "unclosed_quote",
  CSV_MAX_RECORD_SIZE: "row_too_long",
  INVALID_OPENING_QUOTE: "stray_quote",
  CSV_INVALID_CLOSING_QUOTE: "stray_quote",
};

function readFault(error: unknown, line: number): Error {
  if (error instanceof HttpProblem) return error;
  const code = PARSER_CODES[(error as Partial<CsvError>).code ?? ""];
  // The parser's own message repeats what it read, so it goes no further.
  return invalid({ path: `file.line.${line}`, code: code ?? "not_csv" });
}

/**
 * Reads the rows of a file as planned: any line ends, quoted cells. Blank lines are skipped. A row of
 * the wrong length is given as ragged; blank surplus cells are nothing. Work is cut into slices, so
 * other requests go on meanwhile.
 *
 * @param bytes content of the file
 * @param expected our columns, in the order in which cells are wanted
 * @param reading how the file is read, from `planReading`
 * @throws HttpProblem 422 when the file as a whole cannot be read; paths are `file` and
 * `file.line.N`, never a value
 */
export async function* readRows(
  bytes: Buffer,
  expected: readonly string[],
  reading: ImportReading,
): AsyncGenerator<FileRow> {
  const parser = parse({
    delimiter: DELIMITERS[reading.delimiter],
    quote: '"',
    record_delimiter: "\n",
    bom: true,
    info: true,
    relax_column_count: true,
    skip_empty_lines: true,
    max_record_size: MAX_ROW_CHARACTERS,
  });
  const places = expected.map((name) => reading.columns.findIndex(({ column }) => column === name));
  const width = reading.columns.length;
  let heading = true;
  let rows = 0;
  let lastLine = 0;
  const source = fileText(bytes, reading);
  let fault: unknown;
  const feeding = feed(source, parser).catch((error: unknown) => {
    fault = error;
    parser.destroy(error as Error);
  });
  try {
    for await (const { record, info } of parser as AsyncIterable<Parsed>) {
      lastLine = info.lines;
      if (record.every(blank)) continue;
      if (heading) {
        heading = false;
        continue;
      }
      rows += 1;
      if (rows > MAX_ROWS) throw invalid({ path: "file", code: "too_many_rows" });
      const ragged = record.length < width || !record.slice(width).every(blank);
      const cells = places.map((at) => record[at] ?? "");
      yield { line: info.lines - innerLines(record), cells, ragged };
    }
  } catch (error) {
    throw readFault(fault ?? error, lastLine + 1);
  } finally {
    parser.destroy();
    await feeding;
  }
  if (rows === 0) throw invalid({ path: "file", code: "empty_file" });
}

async function feed(source: AsyncIterable<string>, parser: ReturnType<typeof parse>) {
  for await (const text of source) {
    if (parser.destroyed) return;
    if (!parser.write(text)) {
      await new Promise<void>((resolve) => {
        const done = () => {
          parser.off("drain", done);
          parser.off("close", done);
          resolve();
        };
        parser.once("drain", done);
        parser.once("close", done);
      });
    }
  }
  parser.end();
}
