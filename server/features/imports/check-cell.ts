import type { z } from "zod";
import { LIMITS, text } from "../../../shared/contracts/common.ts";
import { unguardCell } from "../../../shared/csv-cells.ts";
import { FIELD_ERRORS, type FieldErrorCode } from "../../../shared/errors.ts";
import { MISSING } from "../../../shared/vocabulary.ts";
import { dayIn } from "../../clock.ts";

/** What a cell holds after its check: a value in its stored form, or the code of its error. */
export type CellResult = { value: string } | { code: FieldErrorCode };
export type CellCheck = (cell: string) => CellResult;

/** Distinct values whose result is kept per column; dates and coded values repeat all the time. */
const KEPT_RESULTS = 20_000;

/** True for the words that stand for a value asked for and not got. */
export function isMissingWord(value: string): boolean {
  return (MISSING as readonly string[]).includes(value);
}

/** What lists write where nothing is known; read as the word `unknown`. */
const UNKNOWN_WORDS: ReadonlySet<string> = new Set(["n/a", "null", "-", "--", "–", "—", "unknown"]);
// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is refused
const UNSEEN = /[\u0000-\u0008\u000B\u000C\u000E-\u001F\u007F-\u009F\u202A-\u202E\u2066-\u2069]/;
const FORMULA = /^[=+\-@\t\r＝＋－＠]/;

/** True for a cell that a spreadsheet could run as a formula; kept as it is, and counted. */
export function looksLikeFormula(cell: string): boolean {
  return FORMULA.test(cell);
}

/**
 * Reads and checks one cell: trimmed, without the apostrophe of an export, words for "nothing
 * known" as `unknown` (or blank in a column that does not take that word). A character that cannot
 * be seen or turns the text round is an error.
 *
 * @returns null for blank
 */
export function checkCell(check: CellCheck, raw: string | undefined): CellResult | null {
  const trimmed = (raw ?? "").trim();
  if (trimmed === "") return null;
  if (UNSEEN.test(trimmed)) return { code: "bad_character" };
  const cell = unguardCell(trimmed).trim();
  if (!UNKNOWN_WORDS.has(cell.toLowerCase())) return check(cell);
  const result = check("unknown");
  return "code" in result && cell.toLowerCase() !== "unknown" ? null : result;
}

const INSTANT =
  /^(\d{4}-\d{2}-\d{2})[T ]([01]\d|2[0-3]):[0-5]\d(?::[0-5]\d(?:\.\d{1,9})?)?(Z|[+-](?:0\d|1[0-4]):[0-5]\d)?$/;

/**
 * Takes an ISO date with a time for its day: as written where it names no offset, else the local day
 * of that instant in the investigation's zone.
 */
export function dayOfInstant(check: CellCheck, timeZone: string): CellCheck {
  return (cell) => {
    const match = INSTANT.exec(cell);
    if (!match) return check(cell);
    const day = match[1] ?? "";
    const written = check(day);
    if ("code" in written || !match[3]) return written;
    return check(dayIn(timeZone, cell.replace(" ", "T")));
  };
}

function codeOf(error: z.ZodError): FieldErrorCode {
  const message = error.issues[0]?.message ?? "";
  return message in FIELD_ERRORS ? (message as FieldErrorCode) : "invalid";
}

/** Checks with one of the contracts' fields; the cell is not blank. */
export function byContract(schema: z.ZodType): CellCheck {
  return (cell) => {
    const parsed = schema.safeParse(cell);
    if (!parsed.success) return { code: codeOf(parsed.error) };
    // Nothing may be left of a cell that held only characters that are dropped.
    return { value: parsed.data === null ? "" : String(parsed.data) };
  };
}

/** Keeps results of values seen before; only for columns whose values repeat. */
export function remembered(check: CellCheck): CellCheck {
  const known = new Map<string, CellResult>();
  return (cell) => {
    const earlier = known.get(cell);
    if (earlier) return earlier;
    const result = check(cell);
    if (known.size < KEPT_RESULTS) known.set(cell, result);
    return result;
  };
}

/** A day that is over or today; partial days are compared as far as they go. */
export function notInFuture(check: CellCheck, today: string): CellCheck {
  return (cell) => {
    const result = check(cell);
    if ("code" in result || isMissingWord(result.value)) return result;
    return result.value > today.slice(0, result.value.length) ? { code: "in_future" } : result;
  };
}

/**
 * A number with a decimal point, or one of the words. Kept as written but for surplus zeros, so
 * that "2", "2.0" and "02" are one value.
 */
export function numeric(min: number, max: number, whole: boolean): CellCheck {
  return (cell) => {
    if (isMissingWord(cell)) return { value: cell };
    if (!/^[+-]?\d{1,15}(?:\.\d{1,15})?$/.test(cell)) return { code: "not_a_number" };
    const number = Number(cell);
    if (whole && !Number.isInteger(number)) return { code: "not_a_whole_number" };
    if (number < min) return { code: "too_small" };
    return number > max ? { code: "too_big" } : { value: String(number) };
  };
}

const refText = byContract(text(LIMITS.ref, 1));

/**
 * A reference: trimmed, case-sensitive. The words for "missing" are no reference, else everyone
 * unknown would become one and the same person.
 */
export const reference: CellCheck = (cell) => {
  const result = refText(cell);
  if ("value" in result && isMissingWord(result.value.toLowerCase())) return { code: "required" };
  return result;
};
