import type { Logger } from "pino";
import type { Pools } from "../../db/pools.ts";
import { safeError } from "../../http/translate-error.ts";

const SWEEP_MS = 3_600_000;

/**
 * A commit is one transaction, so a crash leaves nothing of it but its state: back to ready, its
 * staged rows are still there. Called at boot, before any commit can run.
 */
export async function resetInterrupted(pools: Pick<Pools, "system">): Promise<number> {
  const done = await pools.system.query(
    "update core.import set state = 'ready', progress = 0 where state = 'committing'",
  );
  return done.rowCount ?? 0;
}

/** Deletes checked rows that nobody committed within a day. */
export async function sweepStages(pools: Pick<Pools, "system">): Promise<number> {
  const done = await pools.system.query<{ swept: number }>(
    "select core.sweep_import_stages() as swept",
  );
  return done.rows[0]?.swept ?? 0;
}

/** Resets interrupted commits, then sweeps old stages now and every hour. */
export async function startImportUpkeep(deps: {
  pools: Pick<Pools, "system">;
  log: Logger;
}): Promise<{ stop: () => void }> {
  const { pools, log } = deps;
  const reset = await resetInterrupted(pools);
  if (reset > 0) log.info({ event: "imports ready again", count: reset });
  const sweep = () =>
    sweepStages(pools).then(
      (count) => {
        if (count > 0) log.info({ event: "import stages dropped", count });
      },
      (error: unknown) => log.warn({ event: "import sweep failed", error: safeError(error) }),
    );
  await sweep();
  const timer = setInterval(() => void sweep(), SWEEP_MS);
  timer.unref();
  return { stop: () => clearInterval(timer) };
}
