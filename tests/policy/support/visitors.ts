import { randomUUID } from "node:crypto";
import { ROLES, type Role } from "../../../shared/roles.ts";
import type { TestApp } from "../../support/app.ts";
import { buildAccount, buildMember, PASSWORD } from "../../support/factories.ts";
import type { World } from "./world.ts";

/** Everybody who may knock: the four roles, and those who have no business here. */
export const OUTSIDERS = ["anonymous", "disabled", "expired"] as const;
export const ROLELESS = ["withoutMembership", "endedTracer"] as const;
export type VisitorName = Role | (typeof OUTSIDERS)[number] | (typeof ROLELESS)[number];
export const VISITORS: readonly VisitorName[] = [...ROLES, ...OUTSIDERS, ...ROLELESS];

/** Signs in over plain HTTP and returns the cookie. */
export async function cookieOf(app: TestApp, email: string): Promise<string> {
  const answer = await fetch(`${app.origin}/api/session`, {
    method: "POST",
    headers: { Origin: app.origin, "Content-Type": "application/json" },
    body: JSON.stringify({ email, password: PASSWORD }),
  });
  const cookie = answer.headers.getSetCookie()[0]?.split(";")[0];
  if (answer.status !== 200 || !cookie) throw new Error(`sign-in answered ${answer.status}`);
  return cookie;
}

/** Cookies of every visitor of a world ("" for nobody). */
export async function cookiesOf(world: World): Promise<Record<VisitorName, string>> {
  const { app, admin } = world;
  const tracer = async () => {
    const account = await buildAccount(app);
    const memberId = await buildMember(app, world.here, account.id, "tracer");
    return { ...account, memberId, cookie: await cookieOf(app, account.email) };
  };
  const disabled = await tracer();
  await admin.query("update auth.account set disabled_at = now() where id = $1", [disabled.id]);
  const expired = await tracer();
  await admin.query(
    "update auth.session set expire = now() - interval '1 minute' where account_id = $1",
    [expired.id],
  );
  const ended = await tracer();
  await admin.query("update core.member set ended_at = now() where id = $1", [ended.memberId]);
  const without = await buildAccount(app);
  const roles = await Promise.all(
    ROLES.map(async (role) => [role, await cookieOf(app, world.everyone[role].email)] as const),
  );
  return {
    ...(Object.fromEntries(roles) as Record<Role, string>),
    anonymous: "",
    disabled: disabled.cookie,
    expired: expired.cookie,
    endedTracer: ended.cookie,
    withoutMembership: await cookieOf(app, without.email),
  };
}

/** An answer as far as a matrix compares it. */
export interface Answer {
  status: number;
  headers: Headers;
  text: string;
}

export interface Knock {
  method: string;
  path: string;
  cookie: string;
  body?: unknown;
  form?: FormData;
  headers?: Record<string, string | null>;
  key?: boolean;
}

/** Sends one request as a browser of this site would; a header of null is left out. */
export async function knock(app: TestApp, request: Knock): Promise<Answer> {
  const given: Record<string, string | null> = {
    Origin: app.origin,
    "Sec-Fetch-Site": "same-origin",
    Cookie: request.cookie || null,
    "Idempotency-Key": request.key === false ? null : randomUUID(),
    "Content-Type": request.body === undefined ? null : "application/json",
    ...request.headers,
  };
  const headers = Object.entries(given).filter((one): one is [string, string] => one[1] !== null);
  const stop = new AbortController();
  const answer = await fetch(`${app.origin}${request.path}`, {
    method: request.method.toUpperCase(),
    headers,
    redirect: "manual",
    signal: stop.signal,
    ...(request.form ? { body: request.form } : {}),
    ...(request.body === undefined ? {} : { body: JSON.stringify(request.body) }),
  });
  const endless = answer.headers.get("content-type")?.startsWith("text/event-stream");
  const text = endless ? "" : await answer.text();
  if (endless) stop.abort();
  return { status: answer.status, headers: answer.headers, text };
}

/** Runs tasks a few at a time, in order of their list. */
export async function inBatches<T, R>(
  list: readonly T[],
  work: (item: T) => Promise<R>,
  size = 8,
): Promise<R[]> {
  const out: R[] = [];
  for (let at = 0; at < list.length; at += size) {
    out.push(...(await Promise.all(list.slice(at, at + size).map(work))));
  }
  return out;
}
