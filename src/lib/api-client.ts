import type { z } from "zod";
import { heardByServer, isBackground } from "./activity.ts";
import { ApiError, readProblem } from "./api-error.ts";

type QueryValue = string | number | boolean | null | undefined;

export interface RequestOptions<T> {
  /** Undefined, null and "" are left out. Coded values only: names go into a body. */
  query?: Readonly<Record<string, QueryValue>>;
  /** Sent as JSON, or as it is when it is FormData. */
  body?: unknown;
  /** Made once per form, so that pressing twice or trying again makes one record. */
  idempotencyKey?: string;
  /** Does not count as activity. By default: when no key or touch came just before. */
  background?: boolean;
  signal?: AbortSignal;
  /** Contract of the answer; without it the answer is taken as it comes. */
  schema?: z.ZodType<T>;
}

type OnUnauthorized = () => void;
let onUnauthorized: OnUnauthorized = () => {};

/** Sets what happens when the server says that nobody is signed in any more. */
export function setOnUnauthorized(handler: OnUnauthorized): void {
  onUnauthorized = handler;
}

/** Path with its query; exported for links to files. */
export function withQuery(path: string, query?: RequestOptions<unknown>["query"]): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query ?? {})) {
    if (value !== undefined && value !== null && value !== "") search.set(name, String(value));
  }
  const text = search.toString();
  return text === "" ? path : `${path}?${text}`;
}

async function request<T>(method: string, path: string, options: RequestOptions<T>): Promise<T> {
  const background = options.background ?? (method === "GET" && isBackground());
  const form = options.body instanceof FormData;
  const headers = new Headers({ Accept: "application/json, application/problem+json" });
  if (options.body !== undefined && !form) headers.set("Content-Type", "application/json");
  if (options.idempotencyKey) headers.set("Idempotency-Key", options.idempotencyKey);
  if (background) headers.set("X-Strandline-Background", "1");

  let response: Response;
  try {
    response = await fetch(withQuery(path, options.query), {
      method,
      headers,
      credentials: "same-origin",
      cache: "no-store",
      signal: options.signal ?? null,
      body: form ? (options.body as FormData) : bodyText(options.body),
    });
  } catch (error) {
    if (options.signal?.aborted) throw error;
    throw new ApiError(0, "offline");
  }
  if (!response.ok) {
    const problem = await readProblem(response);
    if (problem.status === 401 && problem.code !== "sign_in_failed") onUnauthorized();
    throw problem;
  }
  if (!background) heardByServer();
  return readAnswer(response, options.schema);
}

function bodyText(body: unknown): string | null {
  return body === undefined ? null : JSON.stringify(body);
}

async function readAnswer<T>(response: Response, schema?: z.ZodType<T>): Promise<T> {
  if (response.status === 204) return undefined as T;
  let answer: unknown;
  try {
    answer = await response.json();
  } catch {
    throw new ApiError(response.status, "unreadable");
  }
  if (!schema) return answer as T;
  const parsed = schema.safeParse(answer);
  if (!parsed.success) throw new ApiError(response.status, "unreadable");
  return parsed.data;
}

type Call = <T>(path: string, options?: RequestOptions<T>) => Promise<T>;

function call(method: string): Call {
  return (path, options = {}) => request(method, path, options);
}

/** Requests to our own API. Every failure is an ApiError (an abort keeps its own error). */
export const api = {
  get: call("GET"),
  post: call("POST"),
  patch: call("PATCH"),
  put: call("PUT"),
  delete: call("DELETE"),
} as const;

/** Address of a resource of an investigation: `/api/investigations/{id}/people`. */
export function inInvestigation(investigationId: string, rest = ""): string {
  return `/api/investigations/${investigationId}${rest === "" ? "" : `/${rest}`}`;
}
