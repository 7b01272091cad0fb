import { createHash } from "node:crypto";
import connectPgSimple from "connect-pg-simple";
import session from "express-session";
import type pg from "pg";

declare module "express-session" {
  interface SessionData {
    /** Absolute end is counted from here (ISO instant). */
    startedAt: string;
    accountId: string;
    epoch: number;
    actingRole: string | null;
    investigationId: string | null;
    nonce: string | null;
    /** When the password was given again (ISO instant); sign-in counts as the first time. */
    confirmedAt?: string;
    /** Set only while a session is being made: no other save may create a row. */
    fresh?: boolean;
    /** Set on a request that nobody's hand caused; it does not move the idle end. */
    background?: boolean;
  }
}

const PgStore = connectPgSimple(session);
type Done = (error?: unknown) => void;

/** Row key of a session id: the id itself is never stored. */
export function hashedSid(sid: string): string {
  return createHash("sha256").update(sid).digest("base64url");
}

/**
 * Sessions in PostgreSQL under the hash of their id. Expiry is compared with the database's clock,
 * and only a session being made may insert a row, so that a request still in flight cannot bring a
 * signed-out session back.
 */
export class SessionStore extends PgStore {
  readonly #pool: pg.Pool;

  constructor(pool: pg.Pool) {
    super({
      pool,
      schemaName: "auth",
      tableName: "session",
      createTableIfMissing: false,
      pruneSessionInterval: false,
      errorLog: () => {},
    });
    this.#pool = pool;
  }

  override get(sid: string, done: (error: unknown, data?: session.SessionData | null) => void) {
    this.#pool
      .query("select sess from auth.session where sid = $1 and expire > now()", [hashedSid(sid)])
      .then(
        (found) => done(null, found.rows[0]?.sess ?? null),
        (error: unknown) => done(error),
      );
  }

  override set(sid: string, data: session.SessionData, done: Done = () => {}) {
    const { fresh, ...kept } = data;
    const seconds = Math.max(1, Math.round((data.cookie.originalMaxAge ?? 0) / 1000));
    const values = [hashedSid(sid), JSON.stringify(kept), seconds, data.accountId ?? null];
    const statement = fresh
      ? `insert into auth.session (sid, sess, expire, account_id)
         values ($1, $2, now() + make_interval(secs => $3), $4)`
      : `update auth.session set sess = $2, expire = now() + make_interval(secs => $3), account_id = $4
         where sid = $1`;
    this.#pool.query(statement, values).then(
      () => done(),
      (error: unknown) => done(error),
    );
  }

  override touch(sid: string, data: session.SessionData, done: Done = () => {}) {
    if (data.background) {
      done();
      return;
    }
    const left = data.cookie.expires ? new Date(data.cookie.expires).getTime() - Date.now() : 0;
    const seconds = Math.max(1, Math.round(left / 1000));
    this.#pool
      .query("update auth.session set expire = now() + make_interval(secs => $2) where sid = $1", [
        hashedSid(sid),
        seconds,
      ])
      .then(
        () => done(),
        (error: unknown) => done(error),
      );
  }

  override destroy(sid: string, done: Done = () => {}) {
    this.#pool.query("delete from auth.session where sid = $1", [hashedSid(sid)]).then(
      () => done(),
      (error: unknown) => done(error),
    );
  }
}
