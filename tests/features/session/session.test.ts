import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { hashedSid } from "../../../server/http/session-store.ts";
import { startTestApp, type TestApp, TestClient } from "../../support/app.ts";
import {
  buildAccount,
  buildInvestigation,
  buildMember,
  PASSWORD,
  signInAs,
} from "../../support/factories.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

/** Session id inside a signed cookie. */
function sidOf(headers: Record<string, unknown>): string {
  const cookies = headers["set-cookie"] as string[] | undefined;
  const match = /strandline=s%3A([^.]+)\./.exec(cookies?.[0] ?? "");
  if (!match?.[1]) throw new Error("no session cookie was set");
  return decodeURIComponent(match[1]);
}

async function rowOf(sid: string) {
  const found = await app.pools.auth.query("select sess from auth.session where sid = $1", [
    hashedSid(sid),
  ]);
  return found.rows[0]?.sess;
}

test("signing in gives a session under a new id, stored only as a hash", async () => {
  const account = await buildAccount(app);
  await buildMember(app, await buildInvestigation(app), account.id, "officer");
  const client = new TestClient(app);
  const first = await client.signIn(account.email, PASSWORD);
  expect(first.status).toBe(200);
  expect(first.body).toMatchObject({
    accountId: account.id,
    email: account.email,
    actingRole: "officer",
    rooms: ["trace", "safeguard"],
    idleMinutes: 15,
  });
  const cookie = (first.headers["set-cookie"] as unknown as string[])[0] ?? "";
  expect(cookie).toMatch(/HttpOnly/);
  expect(cookie).toMatch(/SameSite=Strict/);
  expect(cookie).toMatch(/Path=\//);
  const sid = sidOf(first.headers);
  const second = await client.signIn(account.email, PASSWORD);
  expect(sidOf(second.headers)).not.toBe(sid);
  expect(await rowOf(sid)).toBeUndefined();
  const plain = await app.pools.auth.query("select 1 from auth.session where sid = $1", [sid]);
  expect(plain.rowCount).toBe(0);
});

test("a wrong password and an unknown e-mail answer alike", async () => {
  const account = await buildAccount(app);
  const answers = [
    await new TestClient(app).signIn(account.email, "not the password"),
    await new TestClient(app).signIn("nobody@test.example", PASSWORD),
  ];
  for (const answer of answers) {
    expect(answer.status).toBe(401);
    expect(answer.headers["set-cookie"]).toBeUndefined();
  }
  const [one, two] = answers.map(({ body }) => ({ ...body, instance: "" }));
  expect(one).toEqual(two);
});

test("acting in another role renews the id, is on record and ends the old context", async () => {
  const id = await buildInvestigation(app);
  const account = await buildAccount(app);
  await buildMember(app, id, account.id, "tracer");
  await buildMember(app, id, account.id, "officer");
  const client = new TestClient(app);
  const before = await client.signIn(account.email, PASSWORD);
  expect(before.body.actingRole).toBe("tracer");
  const old = await rowOf(sidOf(before.headers));
  const body = { actingRole: "officer", investigationId: id };
  const after = await client.call("patch", "/api/session", { body });
  expect(after.status).toBe(200);
  expect(after.body).toMatchObject({ actingRole: "officer", endsAt: before.body.endsAt });
  expect(sidOf(after.headers)).not.toBe(sidOf(before.headers));
  const live = await app.pools.auth.query("select role from auth.ctx_live where account_id = $1", [
    account.id,
  ]);
  expect(live.rows).toEqual([{ role: "officer" }]);
  expect(old.nonce).toBeTruthy();
  const events = await client.get(`/api/investigations/${id}/access-events`, {
    action: "session.role_changed",
  });
  expect(events.body.items[0]).toMatchObject({ accountId: account.id, role: "officer" });
});

test("a role not held here, and an investigation of others, are not found", async () => {
  const tracer = await signInAs(app, "tracer", await buildInvestigation(app));
  const others = await buildInvestigation(app);
  for (const body of [
    { actingRole: "officer", investigationId: tracer.investigationId },
    { actingRole: "tracer", investigationId: others },
    { actingRole: "tracer", investigationId: randomUUID() },
  ]) {
    const answer = await tracer.client.call("patch", "/api/session", { body });
    expect(answer.status).toBe(404);
  }
});

test("signing out ends session and context; requests under way do not bring it back", async () => {
  const tracer = await signInAs(app, "tracer", await buildInvestigation(app));
  const under = Array.from({ length: 10 }, () => tracer.client.get(tracer.base).then(() => {}));
  const out = await tracer.client.call("delete", "/api/session");
  expect(out.status).toBe(204);
  expect(out.headers["clear-site-data"]).toBe('"cache", "storage"');
  await Promise.all(under);
  expect((await tracer.client.get("/api/session")).status).toBe(401);
  for (const table of ["session", "ctx_live"]) {
    const left = await app.pools.auth.query(`select 1 from auth.${table} where account_id = $1`, [
      tracer.accountId,
    ]);
    expect(left.rowCount).toBe(0);
  }
});

test.each([
  [
    "idle for too long",
    "update auth.session set expire = now() - interval '1 second' where account_id = $1",
  ],
  [
    "twelve hours old",
    `update auth.session set sess = jsonb_set(sess::jsonb, '{startedAt}',
       to_jsonb(to_char(now() - interval '12 hours 1 minute', 'YYYY-MM-DD"T"HH24:MI:SS"Z"')))::json
     where account_id = $1`,
  ],
  ["of an account disabled since", "update auth.account set disabled_at = now() where id = $1"],
  [
    "of an account whose sessions were ended",
    "update auth.account set epoch = epoch + 1 where id = $1",
  ],
])("a session %s is refused at the next request", async (_title, statement) => {
  const tracer = await signInAs(app, "tracer", await buildInvestigation(app));
  expect((await tracer.client.get(tracer.base)).status).toBe(200);
  await app.pools.auth.query(statement, [tracer.accountId]);
  expect((await tracer.client.get(tracer.base)).status).toBe(401);
  expect((await tracer.client.get("/api/session")).status).toBe(401);
});

test("activity moves the idle end, background requests do not", async () => {
  const tracer = await signInAs(app, "tracer", await buildInvestigation(app));
  const left = async () => {
    const found = await app.pools.auth.query(
      "select extract(epoch from expire - now())::float8 as left from auth.session where account_id = $1",
      [tracer.accountId],
    );
    return found.rows[0].left as number;
  };
  const shorten =
    "update auth.session set expire = now() + interval '60 seconds' where account_id = $1";
  await app.pools.auth.query(shorten, [tracer.accountId]);
  const headers = { "X-Strandline-Background": "1" };
  await tracer.client.call("get", tracer.base, { headers });
  expect(await left()).toBeLessThan(61);
  await tracer.client.get(tracer.base);
  expect(await left()).toBeGreaterThan(1700);
});

test.each([
  ["no origin at all", {}, 403],
  ["another site", { Origin: "https://elsewhere.example" }, 403],
  ["the right host on another port", { Origin: "http://127.0.0.1:1" }, 403],
  ["a null origin", { Origin: "null" }, 403],
  ["a browser that says cross-site", { Origin: "own", "Sec-Fetch-Site": "cross-site" }, 403],
  ["localhost by name", { Origin: "localhost" }, 401],
])("a sign-in from %s", async (_title, given, status) => {
  const port = new URL(app.origin).port;
  const origins: Record<string, string> = {
    own: app.origin,
    localhost: `http://localhost:${port}`,
  };
  const headers = Object.fromEntries(
    Object.entries(given).map(([name, value]) => [name, origins[value] ?? value]),
  );
  const answer = await fetch(`${app.origin}/api/session`, {
    method: "POST",
    headers: { "Content-Type": "application/json", ...headers },
    body: JSON.stringify({ email: "nobody@test.example", password: PASSWORD }),
  });
  expect(answer.status).toBe(status);
});

test("thirty failures within the hour close the door for that address and account", async () => {
  const account = await buildAccount(app);
  const client = new TestClient(app);
  const tries = await Promise.all(
    Array.from({ length: 30 }, () => client.signIn(account.email, "wrong")),
  );
  expect(new Set(tries.map((answer) => answer.status))).toEqual(new Set([401]));
  const shut = await client.signIn(account.email, PASSWORD);
  expect(shut.status).toBe(429);
  expect(Number(shut.headers["retry-after"])).toBeGreaterThan(0);
  const other = await buildAccount(app);
  expect((await client.signIn(other.email, PASSWORD)).status).toBe(200);
});
