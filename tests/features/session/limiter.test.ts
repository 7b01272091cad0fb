import { afterAll, beforeAll, expect, test } from "vitest";
import { createLimiter, networkOf } from "../../../server/features/session/limiter.ts";
import { HttpProblem } from "../../../server/http/problem.ts";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";
import { buildAccount, PASSWORD } from "../../support/factories.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

/** Seconds to wait, 0 when the attempt was let through. */
async function waitOf(attempt: Promise<unknown>): Promise<number> {
  try {
    await attempt;
    return 0;
  } catch (error) {
    if (error instanceof HttpProblem && error.code === "too_many_attempts") {
      return error.retryAfter ?? -1;
    }
    throw error;
  }
}

test("addresses are counted as networks", () => {
  expect(networkOf("192.0.2.7")).toBe("192.0.2.7");
  expect(networkOf("::ffff:192.0.2.7")).toBe("192.0.2.7");
  expect(networkOf("2001:db8:1:2::1")).toBe(networkOf("2001:0db8:0001:00ff:ffff::"));
  expect(networkOf("2001:db8:1:2::1")).not.toBe(networkOf("2001:db8:1:302::1"));
  expect(networkOf("::1")).toBe("00000000000000/56");
});

test("counts survive a restart, lie hashed, and leave successes out", async () => {
  const [first, second] = [createLimiter(app.pools.auth), createLimiter(app.pools.auth)];
  const about = "counted@test.example";
  for (let at = 0; at < 40; at++) {
    await (await first.begin("192.0.2.1", about)).succeeded();
  }
  for (let at = 0; at < 30; at++) expect(await waitOf(first.begin("192.0.2.1", about))).toBe(0);
  const wait = await waitOf(second.begin("192.0.2.1", about.toUpperCase()));
  expect(wait).toBeGreaterThan(3500);
  expect(wait).toBeLessThanOrEqual(3600);
  expect(await waitOf(second.begin("192.0.2.2", about))).toBe(0);
  const stored = await app.pools.auth.query(
    "select string_agg(a::text, ' ') as rows from auth.attempt a",
  );
  expect(stored.rows[0].rows).not.toMatch(/192\.0\.2|counted/);
  await app.pools.auth.query("update auth.attempt set since = since - interval '61 minutes'");
  expect(await waitOf(second.begin("192.0.2.1", about))).toBe(0);
});

test("an address has 300 failures, whatever the accounts", async () => {
  const limiter = createLimiter(app.pools.auth);
  const waits = await Promise.all(
    Array.from({ length: 305 }, (_none, at) =>
      waitOf(limiter.begin("198.51.100.9", `u${at}@x.example`)),
    ),
  );
  expect(waits.filter((wait) => wait === 0)).toHaveLength(300);
});

test("a known device is slowed down by its own failures only, more each time", async () => {
  const limiter = createLimiter(app.pools.auth);
  const about = "device@test.example";
  for (let at = 0; at < 35; at++) await waitOf(limiter.begin("192.0.2.3", about));
  expect(await waitOf(limiter.begin("192.0.2.3", about))).toBeGreaterThan(0);
  const waits = await Promise.all(
    Array.from({ length: 12 }, () => waitOf(limiter.begin("192.0.2.3", about, "device-a"))),
  );
  expect(waits.filter((wait) => wait === 0).length).toBeGreaterThanOrEqual(5);
  expect(waits.filter((wait) => wait === 0).length).toBeLessThanOrEqual(9);
  expect(Math.max(...waits)).toBeGreaterThan(4);
  expect(Math.max(...waits)).toBeLessThanOrEqual(1800);
  const attempt = await limiter.begin("192.0.2.3", about, "device-b");
  await attempt.succeeded();
});

test("who signed in here before gets in although others guessed at the account", async () => {
  const account = await buildAccount(app);
  const office = new TestClient(app);
  const first = await office.signIn(account.email, PASSWORD);
  const cookies = first.headers["set-cookie"] as unknown as string[];
  expect(cookies[0]).toMatch(/^strandline=/);
  expect(cookies[1]).toMatch(
    /^strandline-device=[\w.-]+; Max-Age=\d+; Path=\/; HttpOnly; SameSite=Strict$/,
  );
  const stranger = new TestClient(app);
  for (let at = 0; at < 30; at++) await stranger.signIn(account.email, "wrong");
  expect((await stranger.signIn(account.email, PASSWORD)).status).toBe(429);
  expect((await office.signIn(account.email, PASSWORD)).status).toBe(200);
  // The mark of one account opens no door to another, and a forged one none at all.
  const other = await buildAccount(app);
  for (let at = 0; at < 30; at++) await stranger.signIn(other.email, "wrong");
  expect((await office.signIn(other.email, PASSWORD)).status).toBe(429);
  const headers = { Cookie: `strandline-device=${"A".repeat(22)}.${"B".repeat(43)}` };
  const body = { email: other.email, password: PASSWORD };
  const forged = await new TestClient(app).call("post", "/api/session", { body, headers });
  expect(forged.status).toBe(429);
});
