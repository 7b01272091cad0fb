import { ERRORS, type ErrorCode, type FieldError, type Problem } from "../../shared/errors.ts";

/** An expected failure: a code of the catalogue and, for forms, the fields it is about. */
export class HttpProblem extends Error {
  readonly code: ErrorCode;
  readonly errors: FieldError[] | undefined;
  /** Seconds after which another try makes sense. */
  readonly retryAfter: number | undefined;

  constructor(code: ErrorCode, options: { errors?: FieldError[]; retryAfter?: number } = {}) {
    super(code);
    this.code = code;
    this.errors = options.errors;
    this.retryAfter = options.retryAfter;
  }
}

/** Refuses with 422 and one or more field errors. */
export function invalid(...errors: FieldError[]): HttpProblem {
  return new HttpProblem("invalid", { errors });
}

/** The body of a problem (RFC 9457); carries codes and paths, never a value. */
export function problemBody(problem: HttpProblem, requestId: string): Problem {
  const { status, title } = ERRORS[problem.code];
  return {
    type: `urn:strandline:problem:${problem.code}`,
    title,
    status,
    code: problem.code,
    // A record out of scope and one that does not exist give the same bytes; the request's id
    // stands in a header all the same.
    ...(status === 404 ? {} : { instance: `urn:uuid:${requestId}` }),
    ...(problem.errors ? { errors: problem.errors } : {}),
  };
}
