import pg from "pg";
import { loginOf } from "./access/policies.ts";
import { LOGIN_NAMES, type LoginName, type LoginPasswords } from "./roles.ts";
import { TYPES } from "./types.ts";

/** One pool per database login. */
export type Pools = Record<LoginName, pg.Pool>;

const SIZE: Record<LoginName, number> = {
  tracer: 6,
  supervisor: 6,
  epidemiologist: 4,
  officer: 4,
  auth: 6,
  system: 4,
};

/** Connection string of a login on the administrator's server and database. */
export function loginUrl(adminUrl: string, name: LoginName, password: string): string {
  const url = new URL(adminUrl);
  url.username = loginOf(name);
  url.password = password;
  return url.toString();
}

/**
 * Opens the pools (lazily connected).
 *
 * @param onError told of a lost idle or checked-out connection; the process goes on
 */
export function createPools(
  adminUrl: string,
  passwords: LoginPasswords,
  onError: (error: Error) => void,
): Pools {
  const make = (name: LoginName) => {
    const pool = new pg.Pool({
      connectionString: loginUrl(adminUrl, name, passwords[name]),
      max: SIZE[name],
      connectionTimeoutMillis: 3000,
      idleTimeoutMillis: 30_000,
      maxLifetimeSeconds: 3600,
      keepAlive: true,
      types: TYPES,
    });
    pool.on("error", onError);
    // The pool's listener does not cover clients that are checked out.
    pool.on("connect", (client) => client.on("error", onError));
    return pool;
  };
  return Object.fromEntries(LOGIN_NAMES.map((name) => [name, make(name)])) as Pools;
}

/** Ends all pools. */
export async function endPools(pools: Pools): Promise<void> {
  await Promise.all(Object.values(pools).map((pool) => pool.end()));
}
