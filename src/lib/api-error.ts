import { ERRORS, type ErrorCode, type FieldError, type Problem } from "../../shared/errors.ts";
import type { ErrorKind } from "../components/ui/error-state.tsx";

/** Codes of the server, and two of the client: no answer at all, and an answer that is not ours. */
export type ApiErrorCode = ErrorCode | "offline" | "unreadable";

/** A request that did not succeed. Holds codes and paths, never a value that was typed. */
export class ApiError extends Error {
  /** HTTP status; 0 when no answer came. */
  readonly status: number;
  readonly code: ApiErrorCode;
  readonly errors: readonly FieldError[];
  /** Seconds after which another try makes sense. */
  readonly retryAfter: number | undefined;

  constructor(
    status: number,
    code: ApiErrorCode,
    options: { errors?: readonly FieldError[]; retryAfter?: number } = {},
  ) {
    super(code);
    this.name = "ApiError";
    this.status = status;
    this.code = code;
    this.errors = options.errors ?? [];
    this.retryAfter = options.retryAfter;
  }
}

/** Makes an ApiError of an answer that is not 2xx. */
export async function readProblem(response: Response): Promise<ApiError> {
  const wait = Number(response.headers.get("retry-after"));
  const retryAfter = Number.isFinite(wait) && wait > 0 ? wait : undefined;
  try {
    const body = (await response.json()) as Partial<Problem>;
    if (body.code && body.code in ERRORS) {
      return new ApiError(response.status, body.code, { errors: body.errors ?? [], retryAfter });
    }
  } catch {
    // A proxy's page or nothing at all: the status alone has to do.
  }
  return new ApiError(response.status, "unreadable", { retryAfter });
}

/** Words for a person, from the catalogue of errors. */
export function errorWords(error: unknown): string {
  if (!(error instanceof ApiError)) return "Something went wrong in this page";
  if (error.code === "offline") return "No connection; nothing was sent";
  if (error.code === "unreadable") return "The server did not give an answer that can be used";
  const { title } = ERRORS[error.code];
  return error.retryAfter && error.code === "too_many_attempts"
    ? `${title} (${Math.ceil(error.retryAfter / 60)} min)`
    : title;
}

/** Which designed state fits an error. */
export function errorKind(error: unknown): ErrorKind {
  if (!(error instanceof ApiError)) return "error";
  if (error.code === "offline") return "offline";
  if (error.status === 403) return "no-permission";
  if (error.status === 404) return "not-found";
  return error.code === "stale_version" ? "conflict" : "error";
}
