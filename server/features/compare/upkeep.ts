import type { Logger } from "pino";
import type { Pools } from "../../db/pools.ts";
import { stopRuns } from "./commands/run-comparison.ts";

/**
 * What was being made when the process ended says so; it can be run again. Called at boot, before any
 * comparison can be asked for.
 */
export async function endInterruptedRuns(pools: Pick<Pools, "system">): Promise<number> {
  const done = await pools.system.query(
    `update core.compare_run set state = 'failed', failure = 'compare_interrupted',
       finished_at = now() where state = 'running'`,
  );
  return done.rowCount ?? 0;
}

/** Ends what was interrupted; `stop` ends what is under way when the server stops. */
export async function startCompareUpkeep(deps: {
  pools: Pick<Pools, "system">;
  log: Pick<Logger, "info">;
}): Promise<{ stop: () => Promise<void> }> {
  const ended = await endInterruptedRuns(deps.pools);
  if (ended > 0) deps.log.info({ event: "comparisons interrupted", count: ended });
  return { stop: stopRuns };
}
