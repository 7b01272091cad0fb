import type { Logger } from "pino";
import type { Pools } from "../../db/pools.ts";
import { safeError } from "../../http/translate-error.ts";

const SWEEP_MS = 15 * 60 * 1000;

/**
 * What was being made when the process ended was never stored: it says so. Called at boot, before
 * any file can be made.
 */
export async function endInterrupted(pools: Pick<Pools, "system">): Promise<number> {
  const done = await pools.system.query(
    "update core.export set state = 'failed', failure = 'export_failed' where state = 'building'",
  );
  return done.rowCount ?? 0;
}

/** Deletes the bytes of files that are a day old, and what failed ones left. */
export async function sweepExports(pools: Pick<Pools, "system">): Promise<number> {
  const done = await pools.system.query<{ swept: number }>("select core.sweep_exports() as swept");
  return done.rows[0]?.swept ?? 0;
}

/** Ends what was interrupted, then sweeps now and every quarter of an hour. */
export async function startExportUpkeep(deps: {
  pools: Pick<Pools, "system">;
  log: Logger;
}): Promise<{ stop: () => void }> {
  const { pools, log } = deps;
  const ended = await endInterrupted(pools);
  if (ended > 0) log.info({ event: "exports interrupted", count: ended });
  const sweep = () =>
    sweepExports(pools).then(
      (count) => {
        if (count > 0) log.info({ event: "export files deleted", count });
      },
      (error: unknown) => log.warn({ event: "export sweep failed", error: safeError(error) }),
    );
  await sweep();
  const timer = setInterval(() => void sweep(), SWEEP_MS);
  timer.unref();
  return { stop: () => clearInterval(timer) };
}
