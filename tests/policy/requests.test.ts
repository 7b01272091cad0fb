import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startTestApp, type TestApp } from "../support/app.ts";
import { buildInvestigation, type Member, signInAs } from "../support/factories.ts";
import { cookieOf } from "./support/visitors.ts";

let app: TestApp;
let tracer: Member;
let cookie: string;

beforeAll(async () => {
  app = await startTestApp();
  tracer = await signInAs(app, "tracer", await buildInvestigation(app));
  cookie = await cookieOf(app, tracer.email);
});
afterAll(() => app.close());

/** Sends bytes as they are, with the tracer's cookie. */
async function send(path: string, body: string | Uint8Array | FormData, method = "POST") {
  const headers: Record<string, string> = {
    Cookie: cookie,
    Origin: app.origin,
    "Idempotency-Key": crypto.randomUUID(),
  };
  if (!(body instanceof FormData)) headers["Content-Type"] = "application/json";
  const answer = await fetch(`${app.origin}${path}`, { method, headers, body: body as BodyInit });
  return { status: answer.status, body: (await answer.json()) as { code: string } };
}

describe("a body", () => {
  it("is refused when its bytes are no UTF-8: a name would be kept as another", async () => {
    const bytes = Buffer.concat([Buffer.from('{"name":"'), Buffer.of(0xff), Buffer.from('"}')]);
    expect(await send(`${tracer.base}/people`, bytes)).toMatchObject({
      status: 400,
      body: { code: "malformed_request" },
    });
  });

  it.each([
    ["lists", "[", "]"],
    ["objects", '{"a":', "}"],
  ])("nested far too deep in %s is refused, not a fault of ours", async (_what, open, close) => {
    const person = await tracer.client.post(`${tracer.base}/people`, { name: "Nestor Invented" });
    const inside = `${open.repeat(30_000)}1${close.repeat(30_000)}`;
    const path = `${tracer.base}/people/${person.body.id}/interview-draft`;
    expect(await send(path, `{"version":0,"body":{"a":${inside}}}`, "PUT")).toMatchObject({
      status: 400,
      body: { code: "malformed_request" },
    });
    expect(await send(`${tracer.base}/people`, `{"name":${inside}}`)).toMatchObject({
      status: 400,
    });
  });

  it("is JSON wherever no file is taken, also when it calls itself a form", async () => {
    const form = new FormData();
    form.set("name", "Nestor Invented");
    expect(await send(`${tracer.base}/people`, form)).toMatchObject({
      status: 415,
      body: { code: "json_required" },
    });
  });
});

describe("an upload", () => {
  const part = '--b\r\nContent-Disposition: form-data; name="kind"\r\n\r\npeople\r\n';
  it.each([
    ["nothing at all", "", "multipart/form-data; boundary=b"],
    ["no part", "anything", "multipart/form-data; boundary=b"],
    ["no end", part, "multipart/form-data; boundary=b"],
    ["no boundary", `${part}--b--\r\n`, "multipart/form-data"],
  ])("with %s is refused, not a fault of ours", async (_what, body, type) => {
    const supervisor = await signInAs(app, "supervisor", tracer.investigationId);
    const answer = await fetch(`${app.origin}${supervisor.base}/imports`, {
      method: "POST",
      headers: {
        Cookie: await cookieOf(app, supervisor.email),
        Origin: app.origin,
        "Idempotency-Key": crypto.randomUUID(),
        "Content-Type": type,
      },
      body,
    });
    expect([400, 422]).toContain(answer.status);
  });
});

it.each(["/healthz", "/readyz", "/api/openapi.json"])("%s is only read", async (path) => {
  for (const method of ["POST", "PUT", "PATCH", "DELETE"]) {
    const answer = await fetch(`${app.origin}${path}`, { method, headers: { Origin: app.origin } });
    expect(answer.status, method).toBe(405);
    expect(answer.headers.get("allow")).toBe("GET, HEAD");
  }
});

it("the session cookie has no date of its own; the one that clears it has", async () => {
  const who = await signInAs(app, "supervisor", tracer.investigationId);
  const read = await who.client.get("/api/session");
  const [kept] = read.headers["set-cookie"] as unknown as string[];
  expect(kept).toMatch(/^strandline=[^;]+; Path=\/; HttpOnly; SameSite=Strict$/);
  const left = await who.client.call("delete", "/api/session");
  const [cleared] = left.headers["set-cookie"] as unknown as string[];
  expect(cleared).toMatch(/^strandline=; Path=\/; Expires=Thu, 01 Jan 1970/);
});
