import type { Logger } from "pino";
import type { Analysis } from "../analysis/analysis.ts";
import type { Pools } from "../db/pools.ts";
import { safeError } from "../http/translate-error.ts";
import { listen } from "./listener.ts";
import type { LiveHub } from "./live-hub.ts";
import { deliverOutbox, waitingInvestigations } from "./outbox.ts";

/** How often the outbox and the graph versions are looked at although nothing was notified. */
const NET_MS = 5_000;

export type Dispatcher = { stop(): Promise<void> };

type Parts = {
  pools: Pick<Pools, "system">;
  /** Connection string of the system login. */
  systemUrl: string;
  analysis: Pick<Analysis, "follow" | "loaded">;
  hub: Pick<LiveHub, "publish">;
  log: Pick<Logger, "warn" | "error">;
};

/**
 * Carries every committed change to the live graphs and to the live streams. A notification starts
 * a round at once; a poll every 5 s and a round at each (re)connection are the net, and since the
 * outbox keeps what is undone, nothing is lost while the process or the connection is down.
 *
 * A graph is brought up to date before its messages go out, so who refetches finds the new version.
 * Messages reach the streams of the process that claims them: one server process per database.
 *
 * @returns once the first attempt to listen has succeeded or failed
 */
export async function startDispatcher(parts: Parts): Promise<Dispatcher> {
  const { analysis, hub, log } = parts;
  const pool = parts.pools.system;
  let stopped = false;
  let running: Promise<void> | null = null;
  let wanted = false;

  const failed = (event: string) => (error: unknown) => {
    log.error({ event, error: safeError(error) });
  };

  /** Follows graphs; the ids of those that could be followed. */
  async function follow(ids: Iterable<string>): Promise<string[]> {
    const done: string[] = [];
    for (const id of ids) {
      await analysis
        .follow(id)
        .then(() => done.push(id))
        .catch(failed("graph not followed"));
    }
    return done;
  }

  async function round(): Promise<void> {
    const ids = await follow(await waitingInvestigations(pool));
    if (ids.length === 0) return;
    const send = () =>
      deliverOutbox(pool, ids, ({ investigationId, ...message }) =>
        hub.publish(investigationId, message),
      );
    // Bounded by what was waiting: new messages start a round of their own.
    for (let turn = 0; turn < 100 && (await send()) > 0; turn++);
  }

  function wake(): void {
    if (stopped) return;
    wanted = true;
    running ??= (async () => {
      while (wanted && !stopped) {
        wanted = false;
        await round().catch(failed("messages not delivered"));
      }
      running = null;
    })();
  }

  /** Graphs whose version went on without a message being heard. */
  async function catchUp(): Promise<void> {
    const loaded = analysis.loaded();
    if (loaded.size > 0) {
      const { rows } = await pool.query<{ id: string; graph_version: string }>(
        "select id, graph_version from core.investigation where id = any ($1::uuid[])",
        [[...loaded.keys()]],
      );
      const behind = rows.filter((row) => Number(row.graph_version) !== loaded.get(row.id));
      await follow(behind.map((row) => row.id));
    }
    wake();
  }

  let settle = () => {};
  const firstConnection = new Promise<void>((resolve) => {
    settle = resolve;
  });
  const net = setInterval(() => {
    catchUp().catch(failed("graph versions not read"));
  }, NET_MS);
  const listener = listen(parts.systemUrl, {
    change(investigationId) {
      // The graph follows without waiting for its turn in a round.
      analysis.follow(investigationId).catch(failed("graph not followed"));
      wake();
    },
    connect() {
      settle();
      catchUp().catch(failed("graph versions not read"));
    },
    lost(error) {
      settle();
      log.warn({ event: "listening connection lost", error: safeError(error) });
    },
  });
  await firstConnection;

  return {
    async stop() {
      stopped = true;
      clearInterval(net);
      await listener.stop();
      await running;
    },
  };
}
