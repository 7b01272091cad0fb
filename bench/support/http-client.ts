import { randomUUID } from "node:crypto";

/** A signed-in caller of the product under measurement; keeps its cookie. */
export class BenchClient {
  #cookie = "";
  readonly #origin: string;

  constructor(origin: string) {
    this.#origin = origin;
  }

  call<T>(method: string, path: string, body?: unknown): Promise<{ ms: number; body: T }> {
    const type = { "Content-Type": "application/json" };
    return this.#send<T>(method, path, type, body === undefined ? null : JSON.stringify(body));
  }

  /** Uploads a text as a file, with the form's other fields. */
  upload<T>(
    path: string,
    fields: Readonly<Record<string, string>>,
    text: string,
  ): Promise<{ ms: number; body: T }> {
    const form = new FormData();
    for (const [name, value] of Object.entries(fields)) form.set(name, value);
    form.set("file", new Blob([text], { type: "text/csv" }), "file.csv");
    return this.#send<T>("POST", path, {}, form);
  }

  async #send<T>(
    method: string,
    path: string,
    type: Record<string, string>,
    body: FormData | string | null,
  ): Promise<{ ms: number; body: T }> {
    const started = performance.now();
    const answer = await fetch(`${this.#origin}${path}`, {
      method,
      headers: {
        Origin: this.#origin,
        Cookie: this.#cookie,
        "Idempotency-Key": randomUUID(),
        ...type,
      },
      body,
    });
    const text = await answer.text();
    const ms = performance.now() - started;
    const cookie = answer.headers.get("set-cookie")?.split(";")[0];
    if (cookie) this.#cookie = cookie;
    if (!answer.ok)
      throw new Error(
        `${method} ${path.replace(/[0-9a-f-]{36}/g, "…")} answered ${answer.status}: ${text.slice(0, 300)}`,
      );
    return { ms, body: (text ? JSON.parse(text) : null) as T };
  }
}

/** Median, 95th percentile and most, in milliseconds with one decimal. */
export function spread(values: readonly number[]): {
  n: number;
  median: number;
  p95: number;
  most: number;
} {
  const sorted = [...values].sort((a, b) => a - b);
  const at = (share: number) =>
    Math.round(
      (sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)] ?? 0) * 10,
    ) / 10;
  return { n: sorted.length, median: at(0.5), p95: at(0.95), most: at(1) };
}
