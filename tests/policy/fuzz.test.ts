import { randomUUID } from "node:crypto";
import { gzipSync } from "node:zlib";
import fc from "fast-check";
import { afterAll, beforeAll, describe, expect, test, vi } from "vitest";
import type { z } from "zod";
import type { AnyRoute } from "../../server/http/route.ts";
import { plainRoutes, ROUTES } from "../../server/routes.ts";
import type { Role } from "../../shared/roles.ts";
import { acceptedBody, stageImport } from "./support/bodies.ts";
import { EXTRA_KEYS, mutated, rawBodies } from "./support/fuzz-mutations.ts";
import { valuesOf } from "./support/fuzz-shapes.ts";
import { cookieOf, inBatches } from "./support/visitors.ts";
import { makeWorld, type World } from "./support/world.ts";

// Source of the mutations and of what must hold: the project's own security rules. The seed is
// printed by a failing run and may be set to repeat it.
const SEED = Number(process.env.FUZZ_SEED ?? 20261201);
const RUNS = Number(process.env.FUZZ_RUNS ?? 200);
/** A hang, on a machine that runs other tests at the same time. */
const HANG_MS = 10_000;

interface Target {
  method: string;
  path: string;
  body?: z.ZodType | undefined;
  query?: z.ZodType | undefined;
  role: Role | null;
}

let world: World;
let ids: string[];
let importId: string;
const cookies = new Map<Role, { cookie: string; at: number }>();
/** Some routes ask for the password anew when it is older than five minutes. */
const FRESH_MS = 150_000;

// Hundreds of requests a test, on a machine that may run other work.
vi.setConfig({ testTimeout: 240_000 });

beforeAll(async () => {
  world = await makeWorld();
  ids = [...Object.values(world.people), world.foreign];
  importId = await stageImport(world.everyone.supervisor);
});

afterAll(async () => {
  await world?.close();
});

/** A session of the world's member of a role; made anew when a request has ended it. */
async function cookieFor(role: Role | null): Promise<string> {
  if (role === null) return "";
  const known = cookies.get(role);
  if (known && performance.now() - known.at < FRESH_MS) return known.cookie;
  const cookie = await cookieOf(world.app, world.everyone[role].email);
  cookies.set(role, { cookie, at: performance.now() });
  return cookie;
}

function addressOf(path: string): string {
  const known: Record<string, string> = { id: world.here, personId: world.people.held, importId };
  return path.replace(/:(\w+)/g, (_all, name: string) => known[name] ?? randomUUID());
}

interface Sent {
  status: number;
  code: string;
}

/** Sends one request and holds it to what every request must keep. */
async function send(
  target: Target,
  given: {
    address?: string;
    body?: string | Uint8Array<ArrayBuffer>;
    headers?: Record<string, string>;
  },
  say: string,
): Promise<Sent> {
  const started = performance.now();
  const stop = new AbortController();
  const timer = setTimeout(() => stop.abort(), HANG_MS);
  const answer = await fetch(`${world.app.origin}${given.address ?? addressOf(target.path)}`, {
    method: target.method.toUpperCase(),
    redirect: "manual",
    signal: stop.signal,
    headers: {
      Origin: world.app.origin,
      Cookie: await cookieFor(target.role),
      "Idempotency-Key": randomUUID(),
      "Content-Type": "application/json",
      ...given.headers,
    },
    body: target.method === "get" ? null : (given.body ?? null),
  });
  const text = await answer.text();
  clearTimeout(timer);
  if (answer.status === 401 && target.role) cookies.delete(target.role);
  expect(performance.now() - started, say).toBeLessThan(HANG_MS);
  expect(answer.status, `${say}\n${text.slice(0, 400)}`).toBeLessThan(500);
  expect(Object.keys(Object.prototype), say).toEqual([]);
  expect(({} as Record<string, unknown>).polluted, say).toBeUndefined();
  if (answer.status < 400) return { status: answer.status, code: "" };
  expect(answer.headers.get("content-type"), say).toContain("application/problem+json");
  return { status: answer.status, code: JSON.parse(text).code };
}

/** Waits for what earlier requests set going in the background. */
async function settled(): Promise<void> {
  for (let tries = 0; tries < 400; tries++) {
    const busy = await world.admin.query(
      `select 1 from core.export where state = 'building'
       union all select 1 from core.import where state = 'committing'
       union all select 1 from core.compare_run where state = 'running'`,
    );
    if (busy.rowCount === 0) return;
    await new Promise((done) => setTimeout(done, 50));
  }
  throw new Error("work in the background did not end");
}

/** A word for everything that is stored of investigations and people. */
async function stored(): Promise<string> {
  await settled();
  const tables = await world.admin.query<{ name: string }>(
    `select format('%I.%I', schemaname, tablename) as name from pg_tables
     where schemaname in ('core', 'identity') and tablename <> 'outbox' order by 1`,
  );
  const parts = tables.rows.map(
    ({ name }) =>
      `select '${name}' as name, md5(coalesce(string_agg(t::text, '|' order by t::text), '')) as word from ${name} t`,
  );
  const found = await world.admin.query(parts.join(" union all "));
  return JSON.stringify(found.rows);
}

/** A test of routes that take this; the others have none. */
const testIf = (taken: unknown): typeof test | (() => void) => (taken ? test : () => {});

const json = (value: unknown) => JSON.stringify(value) ?? "";
/** Samples by a fixed seed, so that a failing run can be repeated. */
const sample = <T>(values: fc.Arbitrary<T>, count: number, salt: number) =>
  fc.sample(values, { numRuns: count, seed: SEED + salt });

/** Objects of a body, each with a key that does not belong there. */
function withExtraKeys(value: unknown): string[] {
  return EXTRA_KEYS.map((key) => {
    const text = json(value);
    const entry = `"${key}":${key === "__proto__" ? '{"polluted":1}' : '"officer"'}`;
    return text === "{}" ? `{${entry}}` : `{${entry},${text.slice(1)}`;
  });
}

const inRoutes: Target[] = ROUTES.filter((route) => !route.upload).map((route: AnyRoute) => ({
  method: route.method,
  path: route.path,
  body: route.body,
  query: route.query,
  role: route.policy[0] ?? null,
}));

describe.each(inRoutes.map((one) => [`${one.method} ${one.path}`, one] as const))(
  "%s",
  (name, target) => {
    test("any path is answered", async () => {
      const odd = ["%00", "..%2f..%2fetc", "%ff", "'", "%F0%9F%92%A9", "a".repeat(3000), "0", "%"];
      for (const segment of odd) {
        for (const parameter of target.path.match(/:\w+/g) ?? []) {
          const address = target.path.replace(parameter, segment);
          const sent = await send(
            target,
            { address: addressOf(address), body: "{}" },
            `${parameter}=${segment}`,
          );
          expect(sent.status, segment).toBeGreaterThanOrEqual(400);
        }
      }
    });

    testIf(target.query)("any question is answered", async () => {
      const keys = [
        ...Object.keys((target.query as z.ZodObject).shape ?? {}),
        "__proto__",
        "constructor",
        "role",
      ];
      const word = fc.oneof(
        fc.string({ unit: "grapheme", maxLength: 30 }),
        fc.constantFrom(
          "1",
          "0",
          "-1",
          "1e9",
          "NaN",
          "9".repeat(30),
          "2026-03-01",
          "name",
          "-name",
        ),
        fc.constantFrom("\0", "\u202E", "' or 1=1", "x".repeat(2000), "%", "[]", "all", "true"),
      );
      const entries = fc.array(fc.tuple(fc.constantFrom(...keys), word), { maxLength: 5 });
      await inBatches(sample(entries, RUNS, 1), async (list) => {
        const question = list
          .map(([key, value]) => `${key}=${encodeURIComponent(value.toWellFormed())}`)
          .join("&");
        await send(target, { address: `${addressOf(target.path)}?${question}` }, question);
      });
      for (const raw of [
        "q=%00",
        "q=%ff",
        "page=%",
        "page=1&page=2",
        "page[]=1",
        "q[a]=b",
        "&&==",
      ]) {
        await send(target, { address: `${addressOf(target.path)}?${raw}` }, raw);
      }
    });

    testIf(target.body)("keys of nobody's are refused, and nothing is stored", async () => {
      const before = await stored();
      for (const body of withExtraKeys(acceptedBody(name, world))) {
        const sent = await send(target, { body }, body);
        expect(sent.code, body).toBe("invalid");
      }
      expect(await stored()).toBe(before);
    });

    testIf(target.body)(
      "bytes of any kind are answered, and a refusal stores nothing",
      async () => {
        const before = await stored();
        const text = json(acceptedBody(name, world));
        let taken = 0;
        for (const [what, body] of rawBodies(text)) {
          if ((await send(target, { body }, what)).status < 400) taken += 1;
        }
        const zipped = Uint8Array.from(gzipSync(text));
        const other: Record<string, string>[] = [
          { "Content-Encoding": "gzip" },
          { "Content-Type": "application/xml" },
          { "Content-Type": "text/plain" },
          { "Content-Type": "application/json; charset=utf-16" },
          { "Content-Type": "multipart/form-data; boundary=x" },
        ];
        for (const headers of other) {
          const body = headers["Content-Encoding"] ? zipped : text;
          const sent = await send(target, { body, headers }, JSON.stringify(headers));
          expect(sent.status, JSON.stringify(headers)).toBeGreaterThanOrEqual(400);
        }
        if (taken === 0) expect(await stored()).toBe(before);
      },
    );

    testIf(target.body)("bodies of its shape and mutations of them are answered", async () => {
      const shaped = valuesOf(target.body as z.ZodType, ids);
      const accepted = acceptedBody(name, world);
      const spread = Math.ceil(RUNS / 20);
      const bodies = [
        ...sample(shaped, RUNS, 2),
        ...sample(mutated(accepted), RUNS / 2, 3),
        ...sample(shaped, spread, 4).flatMap((one, at) => sample(mutated(one), 10, 5 + at)),
      ];
      let before = await stored();
      for (let at = 0; at < bodies.length; at += 40) {
        const sent = await inBatches(bodies.slice(at, at + 40), (body) =>
          send(target, { body: json(body) }, json(body)?.slice(0, 2000) ?? ""),
        );
        const after = await stored();
        if (sent.every(({ status }) => status >= 400)) expect(after).toBe(before);
        before = after;
      }
    });
  },
);

describe("routes outside any investigation", () => {
  test("answer any body and any question", async () => {
    const targets: Target[] = plainRoutes(world.app.services)
      .filter(({ path }) => !path.endsWith("/live"))
      .map((route) => ({
        method: route.method,
        path: route.path,
        body: route.body,
        query: route.query,
        role: route.access === "public" ? null : "supervisor",
      }));
    expect(targets.length).toBeGreaterThan(5);
    for (const target of targets) {
      const say = `${target.method} ${target.path}`;
      for (const [what, body] of rawBodies('{"email":"no@body.example"}')) {
        await send(target, { body }, `${say}: ${what}`);
      }
      if (target.body) {
        // Passwords are hashed slowly on purpose.
        const bodies = sample(valuesOf(target.body, ids), Math.ceil(RUNS / 10), 7);
        for (const body of bodies) {
          await send(target, { body: json(body) }, `${say} ${json(body)}`);
          const [worse] = sample(mutated(body), 1, 8);
          await send(target, { body: json(worse) }, `${say} ${json(worse)}`);
        }
      }
      for (const raw of ["page=%00", "page=1&page=2", "__proto__=1", "q=%ff"]) {
        await send(target, { address: `${addressOf(target.path)}?${raw}` }, `${say}?${raw}`);
      }
    }
  });
});
