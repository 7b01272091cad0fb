import type { Logger } from "pino";
import type { Pools } from "../db/pools.ts";
import { safeError } from "../http/translate-error.ts";

const EVERY_MS = 60 * 60 * 1000;

/** What runs out by itself: statement and login. Receipts answer repeats for a day, no longer. */
const DUE: readonly (readonly ["auth" | "system", string])[] = [
  ["auth", "delete from auth.session where expire < now()"],
  ["auth", "delete from auth.ctx_live where expires_at < now()"],
  ["auth", "delete from auth.idempotency where recorded_at < now() - interval '24 hours'"],
  ["auth", "delete from auth.first_officer_link where expires_at < now()"],
  ["auth", "delete from auth.invitation where expires_at < now() - interval '30 days'"],
  ["auth", "delete from auth.mail where expires_at < now()"],
  [
    "auth",
    "delete from auth.attempt where since < now() - interval '1 hour' and free_at < now() - interval '1 hour'",
  ],
  ["system", "delete from core.outbox where done_at < now() - interval '24 hours'"],
];

/** Deletes what has run out, once. Failures are logged and tried again at the next round. */
export async function keepHouse(pools: Pools, log: Pick<Logger, "warn">): Promise<void> {
  for (const [login, statement] of DUE) {
    try {
      await pools[login].query(statement);
    } catch (error) {
      log.warn({ event: "housekeeping failed", error: safeError(error) });
    }
  }
}

/** Keeps house now and every hour until stopped. */
export function startHousekeeping(pools: Pools, log: Logger): { stop: () => void } {
  void keepHouse(pools, log);
  const timer = setInterval(() => void keepHouse(pools, log), EVERY_MS);
  timer.unref();
  return { stop: () => clearInterval(timer) };
}
