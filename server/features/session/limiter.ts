import { createHash } from "node:crypto";
import { isIPv6 } from "node:net";
import type pg from "pg";
import { HttpProblem } from "../../http/problem.ts";

const PER_ACCOUNT = 30;
const PER_ADDRESS = 300;
/** Failures of a known device that cost no time yet. */
const FREE = 5;
const LONGEST_SECONDS = 900;
/** A wait of a known device this short passes while the request is held. */
const HELD_SECONDS = 4;

/** Keys tell nothing to who reads the table: no address, no e-mail. */
const hashed = (...parts: string[]) =>
  createHash("sha256").update(parts.join("\n")).digest("base64url");

/** The part of an address that belongs to one customer: all of IPv4, the first 56 bits of IPv6. */
export function networkOf(address: string): string {
  const plain = address.replace(/%.*$/, "").toLowerCase();
  const four = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/.exec(plain)?.[1];
  if (four || !isIPv6(plain)) return four ?? plain;
  const [head = "", tail = ""] = plain.split("::");
  const left = head === "" ? [] : head.split(":");
  const right = tail === "" ? [] : tail.split(":");
  const groups = plain.includes("::")
    ? [...left, ...Array<string>(Math.max(0, 8 - left.length - right.length)).fill("0"), ...right]
    : left;
  const bits = groups.map((group) => group.padStart(4, "0")).join("");
  return `${bits.slice(0, 14)}/56`;
}

/** An attempt that was let through; tell how it ended. A success is taken back from the counts. */
export interface Attempt {
  succeeded(): Promise<void>;
}

interface Counted {
  failures: number;
  left: number;
}

/** Counts an attempt as failed under each key, before it is known: many at once count as many. */
async function count(pool: pg.Pool, keys: string[]): Promise<Counted[]> {
  const found = await pool.query<Counted & { key: string }>(
    `insert into auth.attempt as a (key, failures)
     select key, 1 from unnest($1::text[]) as k (key) order by key
     on conflict (key) do update set
       failures = case when a.since < now() - interval '1 hour' then 1 else least(a.failures, 1000000) + 1 end,
       since = case when a.since < now() - interval '1 hour' then now() else a.since end
     returning key, failures,
       ceil(extract(epoch from since + interval '1 hour' - now()))::int as left`,
    [keys],
  );
  return keys.map((key) => {
    const row = found.rows.find((one) => one.key === key);
    return { failures: row?.failures ?? 1, left: row?.left ?? 1 };
  });
}

async function takeBack(pool: pg.Pool, keys: string[]): Promise<void> {
  await pool.query(
    `update auth.attempt set failures = greatest(failures - 1, 0)
     where key in (select key from auth.attempt where key = any ($1) order by key for update)`,
    [keys],
  );
}

function refused(seconds: number): HttpProblem {
  return new HttpProblem("too_many_attempts", { retryAfter: Math.max(1, Math.ceil(seconds)) });
}

/**
 * Counts of failed attempts, in PostgreSQL: 30 an hour per address and account, 300 per address;
 * successes are not counted, for a whole office may sit behind one address. A device that signed in
 * to the account before is never refused for what others do: only its own failures slow it down,
 * five for nothing and then 1, 2, 4 … seconds up to a quarter of an hour.
 */
export function createLimiter(pool: pg.Pool) {
  async function byAddress(address: string, about: string): Promise<Attempt> {
    const network = networkOf(address);
    const keys = [hashed("account", network, about.toLowerCase()), hashed("address", network)];
    const [account, all] = await count(pool, keys);
    if (account && account.failures > PER_ACCOUNT) throw refused(account.left);
    if (all && all.failures > PER_ADDRESS) throw refused(all.left);
    return { succeeded: () => takeBack(pool, keys) };
  }

  async function byDevice(device: string, about: string): Promise<Attempt> {
    const key = hashed("device", device, about.toLowerCase());
    const before = await pool.query<{ wait: number }>(
      "select extract(epoch from free_at - now())::float8 as wait from auth.attempt where key = $1",
      [key],
    );
    const ahead = before.rows[0]?.wait ?? 0;
    if (ahead > HELD_SECONDS) throw refused(ahead);
    // Claimed ahead of the check, so that many attempts at once queue up behind each other.
    const pace = (failures: string) =>
      `(least($3::int, power(2, least(greatest(${failures} - $2::int, 0), 20))) * (${failures} >= $2::int)::int)`;
    const found = await pool.query<{ wait: number }>(
      `insert into auth.attempt as a (key, failures) values ($1, 1)
       on conflict (key) do update set
         failures = least(a.failures, 1000) + 1, since = now(),
         free_at = least(greatest(a.free_at, now()) + make_interval(secs => ${pace("a.failures")}),
           now() + make_interval(secs => 2 * $3::int))
       returning (extract(epoch from free_at - now()) - ${pace("(failures - 1)")})::float8 as wait`,
      [key, FREE, LONGEST_SECONDS],
    );
    const wait = found.rows[0]?.wait ?? 0;
    if (wait > HELD_SECONDS) throw refused(wait);
    if (wait > 0) await new Promise((resolve) => setTimeout(resolve, wait * 1000));
    return {
      async succeeded() {
        await pool.query("delete from auth.attempt where key = $1", [key]);
      },
    };
  }

  return {
    /**
     * Lets an attempt through or refuses it with the time to wait.
     *
     * @param about the account's e-mail, or what else is being guessed at
     * @param device id of a device known to that account, null for any other
     * @throws HttpProblem too_many_attempts
     */
    begin: (address: string, about: string, device: string | null = null): Promise<Attempt> =>
      device ? byDevice(device, about) : byAddress(address, about),
    /** Counts one of `most` in an hour; false when it is one too many. */
    async within(most: number, ...about: string[]): Promise<boolean> {
      const [counted] = await count(pool, [hashed("within", ...about)]);
      return (counted?.failures ?? 1) <= most;
    },
  };
}
export type Limiter = ReturnType<typeof createLimiter>;
