import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import type pg from "pg";
import type { Tx } from "../db/with-tx.ts";
import type { KeyRing } from "../identity/keys.ts";
import type { LetterOrder } from "./letters.ts";
import { tokenHash } from "./tokens.ts";

/** A letter sealed for its row. */
export function sealOrder(keys: KeyRing, order: LetterOrder): { id: string; sealed: Buffer } {
  const id = randomUUID();
  return { id, sealed: keys.sealLetter(id, JSON.stringify(order)) };
}

/** Puts a letter into the queue, in the transaction of what it tells of (accounts login). */
export async function queueLetter(
  tx: Tx,
  keys: KeyRing,
  order: LetterOrder,
  minutes: number,
): Promise<void> {
  const { id, sealed } = sealOrder(keys, order);
  await tx.execute(
    sql`insert into auth.mail (id, sealed, expires_at)
        values (${id}, ${sealed}, now() + make_interval(mins => ${minutes}))`,
  );
}

export interface DueLetter {
  id: string;
  sealed: Buffer;
  expires_at: string;
}

/**
 * Claims the letter that waits longest, and moves its next try into the future: 15 seconds at
 * first, twice as long each time, at most a quarter of an hour.
 */
export async function claimLetter(pool: pg.Pool): Promise<DueLetter | null> {
  const found = await pool.query<DueLetter>(
    `update auth.mail set attempts = least(attempts + 1, 1000),
       due_at = now() + make_interval(secs => least(900, 15 * power(2, least(attempts, 10))))
     where id = (select id from auth.mail where due_at <= now() and expires_at > now()
       order by due_at limit 1 for update skip locked)
     returning id, sealed, expires_at`,
  );
  return found.rows[0] ?? null;
}

/** The letter is sent, or there is nobody to send it to. */
export async function dropLetter(pool: pg.Pool, id: string): Promise<void> {
  await pool.query("delete from auth.mail where id = $1", [id]);
}

/**
 * Makes a reset's token valid, if its address belongs to an account that may sign in. Done here and
 * not while the request is answered, so that the answer takes as long for an address nobody has.
 *
 * @returns the address on record (never the one typed), or null when there is none
 */
export async function openReset(
  pool: pg.Pool,
  token: string,
  email: string,
  expiresAt: string,
): Promise<string | null> {
  const found = await pool.query<{ id: string; email: string }>(
    "select id, email from auth.account where lower(email) = lower($1) and disabled_at is null",
    [email],
  );
  const account = found.rows[0];
  if (!account) return null;
  await pool.query(
    `insert into auth.invitation (id, token_hash, kind, email, account_id, expires_at)
     values ($1, $2, 'reset', $3, $4, $5) on conflict (token_hash) do nothing`,
    [randomUUID(), tokenHash(token), account.email, account.id, expiresAt],
  );
  return account.email;
}
