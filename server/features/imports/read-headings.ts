import type { CsvError } from "csv-parse";
import { parse } from "csv-parse/sync";
import type { ImportReading } from "../../../shared/contracts/imports.ts";
import type { FieldError } from "../../../shared/errors.ts";
import { invalid } from "../../http/problem.ts";
import { fileText, refuseOtherFormats, type TextForm, textForm } from "./file-text.ts";
import { type HeadingMatch, matchHeading } from "./match-heading.ts";
import { COLUMNS_OF, type ImportKind } from "./staged-row.ts";

/** Longest row in characters; a quotation mark that is never closed ends here at the latest. */
export const MAX_ROW_CHARACTERS = 256 * 1024;
/** Columns a file may have, those left out among them. */
export const MAX_COLUMNS = 256;
const LISTED_ERRORS = 50;

export const DELIMITERS = { comma: ",", semicolon: ";", tab: "\t" } as const;
type Delimiter = keyof typeof DELIMITERS;

/** What the first line of a file says of it. */
export interface Headings extends TextForm {
  delimiter: Delimiter;
  /** As written; in a file without headings this is somebody's data. */
  headings: string[];
}

/** The first line that holds more than separators, quoted line breaks and all. */
async function firstLine(bytes: Buffer, form: TextForm): Promise<{ text: string; line: number }> {
  let [text, line, at, start] = ["", 1, 0, 0];
  let quoted = false;
  for await (const slice of fileText(bytes, form)) {
    text += slice;
    for (; at < text.length; at++) {
      if (text[at] === '"') quoted = !quoted;
      if (text[at] !== "\n" || quoted) continue;
      const found = text.slice(start, at);
      if (/[^,;\t\s]/.test(found)) return { text: found, line };
      start = at + 1;
      line += 1;
    }
    if (text.length - start > MAX_ROW_CHARACTERS) {
      throw invalid({ path: `file.line.${line}`, code: "row_too_long" });
    }
  }
  const rest = text.slice(start);
  if (!/[^,;\t\s]/.test(rest)) throw invalid({ path: "file", code: "empty_file" });
  return { text: rest, line };
}

/** The separator that stands most often in a line outside quotation marks; commas where none does. */
function delimiterOf(line: string): Delimiter {
  const bare = line.replace(/"[^"]*"/g, "");
  let best: Delimiter = "comma";
  let most = 0;
  for (const name of Object.keys(DELIMITERS) as Delimiter[]) {
    const count = bare.split(DELIMITERS[name]).length - 1;
    if (count > most) [best, most] = [name, count];
  }
  return best;
}

/**
 * Reads encoding, separator and headings of a file; the rest of it is not looked at.
 *
 * @param bytes the file, or its beginning
 * @throws HttpProblem 422 when there is no readable first line; paths are `file`, `file.line.N` and
 * `file.columns`
 */
export async function readHeadings(bytes: Buffer): Promise<Headings> {
  refuseOtherFormats(bytes);
  const form = textForm(bytes);
  const { text, line } = await firstLine(bytes, form);
  const delimiter = delimiterOf(text);
  let headings: string[] | undefined;
  try {
    [headings] = parse(text, { delimiter: DELIMITERS[delimiter], quote: '"' }) as string[][];
  } catch (error) {
    const open = (error as Partial<CsvError>).code === "CSV_QUOTE_NOT_CLOSED";
    const code = open ? "unclosed_quote" : "stray_quote";
    throw invalid({ path: `file.line.${line}`, code });
  }
  if (!headings) throw invalid({ path: "file", code: "empty_file" });
  if (headings.some((name) => name.includes("\0"))) {
    throw invalid({ path: "file", code: "encoding" });
  }
  if (headings.length > MAX_COLUMNS) throw invalid({ path: "file.columns", code: "too_many" });
  return { ...form, delimiter, headings: headings.map((name) => name.trim()) };
}

/** What each heading is taken for; a column that two headings could be goes to the first. */
export function suggestColumns(kind: ImportKind, headings: readonly string[]): HeadingMatch[] {
  const found = headings.map((heading) => matchHeading(heading, COLUMNS_OF[kind].all));
  const exact = new Set(found.flatMap(({ how, column }) => (how === "exact" ? column : [])));
  const taken = new Set<string>();
  return found.map((match) => {
    const { column, how } = match;
    if (column === null) return match;
    if (taken.has(column) || (how === "alike" && exact.has(column))) {
      return { column: null, how: "unknown" };
    }
    taken.add(column);
    return match;
  });
}

/** Errors of headings taken as they are: unknown by place only, since they may be data. */
function plainErrors(kind: ImportKind, { headings, delimiter }: Headings): FieldError[] {
  const errors: FieldError[] = [];
  const seen = new Set<string>();
  headings.forEach((heading, at) => {
    const { column } = matchHeading(heading, COLUMNS_OF[kind].all);
    if (column === null) errors.push({ path: `file.columns.${at + 1}`, code: "unknown_column" });
    else if (seen.has(column))
      errors.push({ path: `file.columns.${column}`, code: "duplicate_column" });
    if (column !== null) seen.add(column);
  });
  const alone = headings.length === 1 && errors.length === 1 && delimiter === "comma";
  if (alone && headings[0]?.includes("|")) return [{ path: "file", code: "wrong_delimiter" }];
  return errors;
}

function chosenErrors(
  kind: ImportKind,
  chosen: readonly (string | null)[],
  { headings }: Headings,
): FieldError[] {
  if (chosen.length !== headings.length) return [{ path: "columns", code: "other_columns" }];
  const errors: FieldError[] = [];
  const seen = new Set<string>();
  chosen.forEach((column, at) => {
    if (column === null) return;
    const path = `columns.${at}`;
    if (!COLUMNS_OF[kind].all.includes(column)) errors.push({ path, code: "unknown_column" });
    else if (seen.has(column)) errors.push({ path, code: "duplicate_column" });
    seen.add(column);
  });
  return errors;
}

/**
 * How a file is to be read: encoding, separator, and which of our columns each of its columns is.
 *
 * @param chosen by position our column or null for one that is left out; without it the headings
 * decide, and one that is not known is an error
 * @throws HttpProblem 422; paths are `file`, `file.line.N`, `file.columns.N` and `columns.N`
 */
export async function planReading(
  bytes: Buffer,
  kind: ImportKind,
  chosen: readonly (string | null)[] | null = null,
): Promise<ImportReading> {
  const found = await readHeadings(bytes);
  const { encoding, mark, delimiter, headings } = found;
  const errors = chosen ? chosenErrors(kind, chosen, found) : plainErrors(kind, found);
  const suggested = suggestColumns(kind, headings);
  const columns = headings.map((_, at): ImportReading["columns"][number] => {
    const match = suggested[at] ?? { column: null, how: "unknown" };
    if (!chosen) {
      return { column: match.column, how: match.how === "unknown" ? "left_out" : match.how };
    }
    const column = chosen[at] ?? null;
    if (column === null) return { column, how: "left_out" };
    if (column !== match.column || match.how === "unknown") return { column, how: "chosen" };
    return { column, how: match.how };
  });
  if (errors[0]?.path !== "file" && errors[0]?.code !== "other_columns") {
    for (const column of COLUMNS_OF[kind].required) {
      if (!columns.some((one) => one.column === column)) {
        errors.push({ path: `file.columns.${column}`, code: "required_column" });
      }
    }
  }
  if (errors.length > 0) throw invalid(...errors.slice(0, LISTED_ERRORS));
  return { encoding, mark, delimiter, columns };
}
