import { FIELD_ERRORS, type FieldErrorCode } from "../../shared/errors.ts";
import { HttpProblem } from "./problem.ts";

interface Caught {
  code?: unknown;
  status?: unknown;
  type?: unknown;
  cause?: unknown;
  issues?: readonly ZodIssue[];
  name?: unknown;
}
interface ZodIssue {
  path: readonly PropertyKey[];
  message: string;
  code?: string;
  keys?: readonly string[];
  errors?: readonly (readonly ZodIssue[])[];
}

/** SQLSTATE of an error or of what caused it (drizzle wraps the driver's error). */
export function sqlState(error: unknown): string | null {
  let at = error as Caught | undefined;
  for (let depth = 0; at && depth < 5; depth++) {
    if (typeof at.code === "string" && /^[0-9A-Z]{5}$/.test(at.code)) return at.code;
    at = at.cause as Caught | undefined;
  }
  return null;
}

function fieldCode(issue: ZodIssue): FieldErrorCode {
  if (issue.message in FIELD_ERRORS) return issue.message as FieldErrorCode;
  if (issue.code === "unrecognized_keys") return "unknown_key";
  if (issue.code === "invalid_type") return "wrong_type";
  if (issue.code === "invalid_value") return "not_in_list";
  if (issue.code === "too_big") return "too_big";
  if (issue.code === "too_small") return "too_small";
  return "invalid";
}

/** All issues of a failed parse, as dotted paths and codes. */
export function fieldErrors(issues: readonly ZodIssue[]): { path: string; code: FieldErrorCode }[] {
  return issues.slice(0, 200).flatMap((issue) => {
    const path = issue.path.map(String).join(".");
    if (issue.code === "unrecognized_keys") {
      // A key that is not ours may carry anything, so only its place is named.
      return [{ path, code: "unknown_key" as const }];
    }
    return [{ path, code: fieldCode(issue) }];
  });
}

const UNPROCESSABLE = new Set([
  "22001",
  "22003",
  "22007",
  "22008",
  "22021",
  "22P02",
  "22P05",
  "23502",
  "23514",
]);
const CLASHES = new Set(["23503", "23505"]);
const RETRIED = new Set(["40001", "40P01"]);

/**
 * The one translator from anything thrown to a problem. Unknown errors become a bland 500; the
 * second value says whether someone has to look (an alarm in the log).
 */
export function translateError(error: unknown): { problem: HttpProblem; alarm: boolean } {
  if (error instanceof HttpProblem) return { problem: error, alarm: false };
  const caught = error as Caught;
  if (caught?.issues && Array.isArray(caught.issues)) {
    return {
      problem: new HttpProblem("invalid", { errors: fieldErrors(caught.issues) }),
      alarm: false,
    };
  }
  if (caught?.type === "entity.too.large" || caught?.code === "LIMIT_FILE_SIZE") {
    return { problem: new HttpProblem("too_large"), alarm: false };
  }
  const state = sqlState(error);
  if (state) {
    if (UNPROCESSABLE.has(state))
      return { problem: new HttpProblem("invalid", { errors: [] }), alarm: true };
    if (CLASHES.has(state)) return { problem: new HttpProblem("conflict"), alarm: false };
    if (RETRIED.has(state)) return { problem: new HttpProblem("conflict"), alarm: false };
    if (state === "55P03")
      return { problem: new HttpProblem("in_flight", { retryAfter: 2 }), alarm: false };
    // The API let through what the database refused: hide it, and have someone look.
    if (state === "42501") return { problem: new HttpProblem("not_found"), alarm: true };
    if (/^(53|08)/.test(state) || /^57(014|P0[123])$/.test(state)) {
      return { problem: new HttpProblem("unavailable", { retryAfter: 2 }), alarm: true };
    }
    return { problem: new HttpProblem("internal"), alarm: true };
  }
  const message = error instanceof Error ? error.message : "";
  if (
    /timeout exceeded when trying to connect|Connection terminated|ECONNREFUSED|ECONNRESET/.test(
      `${message} ${String(caught?.code)} ${String((caught?.cause as Error | undefined)?.message ?? "")}`,
    )
  ) {
    return { problem: new HttpProblem("unavailable", { retryAfter: 2 }), alarm: true };
  }
  const status = typeof caught?.status === "number" ? caught.status : 500;
  if (status === 413) return { problem: new HttpProblem("too_large"), alarm: false };
  if (status === 415) return { problem: new HttpProblem("json_required"), alarm: false };
  if (caught?.name === "MulterError" || (status >= 400 && status < 500)) {
    return { problem: new HttpProblem("malformed_request"), alarm: false };
  }
  return { problem: new HttpProblem("internal"), alarm: true };
}

/** What may be logged of an error: its name, SQLSTATE and stack frames, never its message. */
export function safeError(error: unknown): Record<string, unknown> {
  const caught = error as { name?: string; stack?: string };
  const frames = (caught?.stack ?? "")
    .split("\n")
    .filter((line) => /^\s+at /.test(line))
    .slice(0, 12)
    .map((line) => line.trim());
  return { name: caught?.name ?? "unknown", sqlState: sqlState(error), frames };
}
