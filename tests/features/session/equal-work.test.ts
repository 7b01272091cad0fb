import * as argon2 from "@node-rs/argon2";
import pg from "pg";
import { afterAll, beforeAll, beforeEach, expect, test, vi } from "vitest";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";
import { buildAccount } from "../../support/factories.ts";

// What an address is worth must not show in what an answer says or costs. Work is counted here; the
// time it takes is measured apart (npm run measure:sign-in).
vi.mock("@node-rs/argon2", async (original) => {
  const real = await original<typeof argon2>();
  return { ...real, verify: vi.fn(real.verify), hash: vi.fn(real.hash) };
});

let app: TestApp;
let known: string;
let disabled: string;
const statements: string[] = [];
let watching = false;

beforeAll(async () => {
  app = await startTestApp();
  // Letters are sent later and by somebody else; here only the answering is watched.
  app.services.mail = { ...app.services.mail, soon: () => {} };
  known = (await buildAccount(app)).email;
  const off = await buildAccount(app);
  disabled = off.email;
  await app.pools.auth.query("update auth.account set disabled_at = now() where id = $1", [off.id]);
});

afterAll(async () => {
  await app?.close();
});

beforeEach(async () => {
  const query = pg.Client.prototype.query as (...args: unknown[]) => unknown;
  vi.spyOn(pg.Client.prototype, "query").mockImplementation(function (
    this: pg.Client,
    ...args: unknown[]
  ) {
    const [first] = args;
    const text = typeof first === "string" ? first : (first as { text?: string } | null)?.text;
    // Of the accounts login, and not what runs by the clock.
    if (
      watching &&
      this.user === "strandline_auth" &&
      text &&
      !/auth\.mail set attempts/.test(text)
    ) {
      statements.push(text.replace(/\s+/g, " ").trim());
    }
    return query.apply(this, args);
  } as never);
  await app.pools.auth.query("delete from auth.attempt");
});

/** What one request does and answers, without what names the request itself. */
async function workOf(path: string, body: Record<string, string>) {
  const client = new TestClient(app);
  vi.mocked(argon2.verify).mockClear();
  vi.mocked(argon2.hash).mockClear();
  statements.length = 0;
  watching = true;
  const answer = await client.call("post", path, { body });
  watching = false;
  const { instance: _instance, ...rest } = answer.body;
  const headers = Object.fromEntries(
    Object.entries(answer.headers).filter(([name]) => !/^(date|etag|x-request-id)$/.test(name)),
  );
  return {
    status: answer.status,
    body: rest,
    headers,
    verifications: vi.mocked(argon2.verify).mock.calls.length,
    hashes: vi.mocked(argon2.hash).mock.calls.length,
    statements: [...statements],
  };
}

test("a refused sign-in is the same work and the same answer, whoever was named", async () => {
  const attempt = (email: string) =>
    workOf("/api/session", { email, password: "a password that is wrong" });
  const ofKnown = await attempt(known);
  expect(ofKnown).toMatchObject({ status: 401, verifications: 1, hashes: 0 });
  expect(ofKnown.statements.length).toBeGreaterThanOrEqual(2);
  expect(ofKnown.statements.some((text) => text.includes("auth.account"))).toBe(true);
  expect(await attempt("nobody@test.example")).toEqual(ofKnown);
  expect(await attempt(disabled)).toEqual(ofKnown);
});

test("asking for a reset is the same work and the same answer, and looks nobody up", async () => {
  const ask = (email: string) => workOf("/api/password-resets", { email });
  const ofKnown = await ask(known);
  expect(ofKnown).toMatchObject({ status: 202, verifications: 0, hashes: 0 });
  expect(ofKnown.statements.some((text) => text.includes("insert into auth.mail"))).toBe(true);
  expect(ofKnown.statements.some((text) => text.includes("auth.account"))).toBe(false);
  expect(await ask("nobody@test.example")).toEqual(ofKnown);
  expect(await ask(disabled)).toEqual(ofKnown);
});
