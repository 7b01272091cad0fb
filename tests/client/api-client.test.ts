import { afterEach, describe, expect, it, vi } from "vitest";
import { z } from "zod";
import { api, setOnUnauthorized, withQuery } from "../../src/lib/api-client.ts";
import { ApiError, errorKind, errorWords } from "../../src/lib/api-error.ts";

function answer(status: number, body: unknown, headers: Record<string, string> = {}) {
  const text = body === undefined ? null : JSON.stringify(body);
  const fetched = vi.fn<typeof fetch>(async () => new Response(text, { status, headers }));
  vi.stubGlobal("fetch", fetched);
  return fetched;
}

function sent(fetched: ReturnType<typeof answer>) {
  const [url, init] = fetched.mock.calls[0] ?? [];
  return { url: String(url), init, headers: new Headers(init?.headers) };
}

async function failure(work: Promise<unknown>): Promise<ApiError> {
  const caught: unknown = await work.then(
    () => null,
    (error: unknown) => error,
  );
  if (!(caught instanceof ApiError)) throw new Error("no ApiError");
  return caught;
}

afterEach(() => {
  vi.useRealTimers();
  setOnUnauthorized(() => {});
});

describe("a request", () => {
  it("carries JSON, the key of a create and no blank query words", async () => {
    const fetched = answer(201, { id: "a" });
    await api.post("/api/x", {
      body: { name: "N" },
      query: { page: 2, q: "", sort: undefined, on: false },
      idempotencyKey: "11111111-1111-4111-8111-111111111111",
    });
    const { url, init, headers } = sent(fetched);
    expect(url).toBe("/api/x?page=2&on=false");
    expect(init?.body).toBe('{"name":"N"}');
    expect(headers.get("content-type")).toBe("application/json");
    expect(headers.get("idempotency-key")).toBe("11111111-1111-4111-8111-111111111111");
    expect(headers.get("x-strandline-background")).toBeNull();
  });

  it("sends a file as it is", async () => {
    const fetched = answer(201, {});
    const form = new FormData();
    form.set("kind", "people");
    await api.post("/api/x", { body: form });
    const { init, headers } = sent(fetched);
    expect(init?.body).toBe(form);
    expect(headers.get("content-type")).toBeNull();
  });

  it("that nobody asked for is marked, so that it keeps no session alive", async () => {
    vi.useFakeTimers();
    vi.setSystemTime(Date.now() + 60_000);
    const fetched = answer(200, {});
    await api.get("/api/x");
    expect(sent(fetched).headers.get("x-strandline-background")).toBe("1");
    await api.get("/api/x", { background: false });
    const second = new Headers(fetched.mock.calls[1]?.[1]?.headers);
    expect(second.get("x-strandline-background")).toBeNull();
  });

  it("leaves the address alone without a query", () => {
    expect(withQuery("/api/x", {})).toBe("/api/x");
  });
});

describe("an answer", () => {
  it("is read by its contract, and one that does not fit is no answer", async () => {
    answer(200, { n: 3 });
    const schema = z.object({ n: z.number() });
    await expect(api.get("/api/x", { schema })).resolves.toEqual({ n: 3 });
    answer(200, { n: "three" });
    expect((await failure(api.get("/api/x", { schema }))).code).toBe("unreadable");
  });

  it("without a body is undefined", async () => {
    answer(204, undefined);
    await expect(api.delete("/api/x")).resolves.toBeUndefined();
  });

  it("of refusal keeps status, code, field errors and when to try again", async () => {
    const errors = [{ path: "contacts.2.phone", code: "not_a_phone" }];
    answer(422, { code: "invalid", errors });
    const invalid = await failure(api.post("/api/x", { body: {} }));
    expect(invalid).toMatchObject({ status: 422, code: "invalid", errors });
    answer(429, { code: "too_many_attempts" }, { "retry-after": "300" });
    const limited = await failure(api.post("/api/x", { body: {} }));
    expect(limited.retryAfter).toBe(300);
    expect(errorWords(limited)).toMatch(/5 min/);
  });

  it("that is a proxy's page is called unreadable", async () => {
    vi.stubGlobal("fetch", async () => new Response("<h1>Bad gateway</h1>", { status: 502 }));
    expect(await failure(api.get("/api/x"))).toMatchObject({ status: 502, code: "unreadable" });
  });

  it("that never comes is called offline", async () => {
    vi.stubGlobal("fetch", async () => {
      throw new TypeError("Failed to fetch");
    });
    const error = await failure(api.get("/api/x"));
    expect(error.code).toBe("offline");
    expect(errorKind(error)).toBe("offline");
  });
});

describe("the end of a session", () => {
  it("is told once a request finds nobody signed in, but not by a wrong password", async () => {
    const ended = vi.fn();
    setOnUnauthorized(ended);
    answer(401, { code: "sign_in_failed" });
    await failure(api.post("/api/session", { body: {} }));
    expect(ended).not.toHaveBeenCalled();
    answer(401, { code: "not_signed_in" });
    await failure(api.get("/api/x"));
    expect(ended).toHaveBeenCalledTimes(1);
  });
});

describe("designed states", () => {
  it("follow status and code", () => {
    expect(errorKind(new ApiError(403, "role_refused"))).toBe("no-permission");
    expect(errorKind(new ApiError(404, "not_found"))).toBe("not-found");
    expect(errorKind(new ApiError(409, "stale_version"))).toBe("conflict");
    expect(errorKind(new ApiError(409, "in_flight"))).toBe("error");
    expect(errorKind(new Error("x"))).toBe("error");
  });
});
