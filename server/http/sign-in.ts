import { randomUUID } from "node:crypto";
import type { Request } from "express";
import type pg from "pg";
import { ABSOLUTE_HOURS, IDLE_MINUTES, type Role } from "../../shared/roles.ts";
import { now } from "../clock.ts";
import { HttpProblem } from "./problem.ts";

/** A role an account holds in an investigation. */
export interface Membership {
  investigationId: string;
  investigationName: string;
  invented: boolean;
  role: Role;
}

/** The signed-in account, checked afresh on every request. */
export interface SignedIn {
  accountId: string;
  email: string;
  displayName: string;
  demo: boolean;
  memberships: Membership[];
  actingRole: Role | null;
  investigationId: string | null;
  nonce: string | null;
  /** When the password was last given in this session (ISO instant). */
  confirmedAt: string;
}

/** Minutes for which a password that was given is fresh. */
export const CONFIRMED_MINUTES = 5;

/** Whether the password was given a moment ago, for what a session left open must not do. */
export function isConfirmed(who: SignedIn): boolean {
  return now().getTime() - new Date(who.confirmedAt).getTime() < CONFIRMED_MINUTES * 60_000;
}

interface AccountRow {
  id: string;
  email: string;
  display_name: string;
  demo: boolean;
  epoch: number;
  disabled_at: string | null;
  memberships: Membership[];
}

const ACCOUNT = `select a.id, a.email, a.display_name, a.demo, a.epoch, a.disabled_at,
  coalesce((select json_agg(json_build_object('investigationId', m.investigation_id,
      'investigationName', i.name, 'invented', i.invented, 'role', m.role)
      order by i.recorded_at, m.since, m.role)
    from core.member m join core.investigation i on i.id = m.investigation_id
    where m.account_id = a.id and m.ended_at is null
      and core.day_lasts(m.ends_on, i.time_zone)), '[]') as memberships
  from auth.account a where a.id = $1`;

/** Reads an account with its live memberships; null when it is gone or disabled. */
export async function loadAccount(pool: pg.Pool, accountId: string): Promise<AccountRow | null> {
  const found = await pool.query<AccountRow>(ACCOUNT, [accountId]);
  const account = found.rows[0];
  return account && !account.disabled_at ? account : null;
}

/**
 * Who is asking: reads the session's account, compares its epoch, checks the absolute end and that
 * the acting role is still held.
 *
 * @returns null when nobody is signed in
 */
export async function whoIsAsking(request: Request, pool: pg.Pool): Promise<SignedIn | null> {
  const { session } = request;
  if (!session?.accountId) return null;
  const end = new Date(session.startedAt ?? 0).getTime() + ABSOLUTE_HOURS * 3_600_000;
  const account = end > now().getTime() ? await loadAccount(pool, session.accountId) : null;
  if (!account || account.epoch !== session.epoch) return null;
  const acting = account.memberships.find(
    (m) => m.role === session.actingRole && m.investigationId === session.investigationId,
  );
  return {
    accountId: account.id,
    email: account.email,
    displayName: account.display_name,
    demo: account.demo,
    memberships: account.memberships,
    actingRole: acting ? acting.role : null,
    investigationId: acting ? acting.investigationId : null,
    nonce: acting ? (session.nonce ?? null) : null,
    confirmedAt: session.confirmedAt ?? session.startedAt ?? new Date(0).toISOString(),
  };
}

const wait = (step: (done: (error?: unknown) => void) => void): Promise<void> =>
  new Promise((resolve, reject) => step((error) => (error ? reject(error) : resolve())));

/**
 * Begins a session for an account acting as one membership (or none), under a new session id and a
 * new context nonce. Used at sign-in and whenever the acting role changes.
 */
export async function beginSession(
  request: Request,
  pool: pg.Pool,
  account: { id: string; epoch: number },
  acting: Membership | null,
  startedAt: string,
): Promise<void> {
  const oldNonce = request.session?.nonce;
  await wait((done) => request.session.regenerate(done));
  const nonce = acting ? randomUUID() : null;
  if (acting) {
    await pool.query(
      `insert into auth.ctx_live (nonce, account_id, investigation_id, role, expires_at)
       values ($1, $2, $3, $4, now() + make_interval(hours => $5))`,
      [nonce, account.id, acting.investigationId, acting.role, ABSOLUTE_HOURS],
    );
  }
  if (oldNonce) await pool.query("delete from auth.ctx_live where nonce = $1", [oldNonce]);
  const minutes = acting ? IDLE_MINUTES[acting.role] : Math.min(...Object.values(IDLE_MINUTES));
  request.session.cookie.maxAge = minutes * 60_000;
  Object.assign(request.session, {
    startedAt,
    accountId: account.id,
    epoch: account.epoch,
    actingRole: acting?.role ?? null,
    investigationId: acting?.investigationId ?? null,
    nonce,
    fresh: true,
  });
  await wait((done) => request.session.save(done));
  // A later save of this request must update, never insert.
  delete request.session.fresh;
}

/** Ends the session: its row, its context, and the cookie. */
export async function endSession(request: Request, pool: pg.Pool): Promise<void> {
  const nonce = request.session?.nonce;
  if (nonce) await pool.query("delete from auth.ctx_live where nonce = $1", [nonce]);
  await wait((done) => request.session.destroy(done));
}

/** The signed-in account of a request, put there by the session step. */
export function signedInOf(request: Request): SignedIn {
  const who = request.res?.locals.who as SignedIn | null | undefined;
  if (!who) throw new HttpProblem("not_signed_in");
  return who;
}
