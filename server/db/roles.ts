import type pg from "pg";
import { ROLES } from "../../shared/roles.ts";
import { loginOf } from "./access/policies.ts";

/** Application logins: one per role, one for accounts and sessions, one for background reading. */
export const LOGIN_NAMES = [...ROLES, "auth", "system"] as const;
export type LoginName = (typeof LOGIN_NAMES)[number];
export type LoginPasswords = Record<LoginName, string>;

/** Connections a login may hold; the server's pools stay below. */
const LIMIT = 24;

/**
 * Makes the owner and the logins if they are missing and sets their passwords. Logins are members
 * of nothing and can bypass nothing; row security binds them all.
 *
 * @param client an administrator's connection (a superuser, or one that may create such roles)
 */
export async function ensureRoles(client: pg.ClientBase, passwords: LoginPasswords): Promise<void> {
  await client.query("select pg_advisory_lock(7203115)");
  try {
    await client.query(
      `do $$ begin create role strandline_owner nologin bypassrls;
       exception when duplicate_object or unique_violation then null; end $$`,
    );
    for (const name of LOGIN_NAMES) {
      const login = loginOf(name);
      const found = await client.query("select 1 from pg_roles where rolname = $1", [login]);
      const verb = found.rowCount === 0 ? "create" : "alter";
      const password = passwords[name].replaceAll("'", "''");
      await client.query(
        `${verb} role ${login} login nosuperuser nobypassrls noinherit nocreatedb nocreaterole
         connection limit ${name === "auth" || name === "system" ? 60 : LIMIT * 2} password '${password}'`,
      );
      await client.query(
        `alter role ${login} set statement_timeout = '${name === "system" ? "10min" : "5s"}'`,
      );
      await client.query(`alter role ${login} set lock_timeout = '2s'`);
      await client.query(`alter role ${login} set idle_in_transaction_session_timeout = '10s'`);
      await client.query(`alter role ${login} set search_path = ''`);
    }
  } finally {
    await client.query("select pg_advisory_unlock(7203115)");
  }
}
