import type pg from "pg";
import { dayIn, now, startOfDayIn } from "../clock.ts";
import { followGraph } from "./follow-graph.ts";
import type { GraphSnapshot, GraphStore } from "./graph-store.ts";
import { LiveGroups } from "./live-groups.ts";
import { loadGraph } from "./load-graph.ts";

/** A loaded graph: the store, its groups, and the snapshot workers read. */
export type LoadedGraph = {
  readonly store: GraphStore;
  readonly groups: LiveGroups;
  /** The same object until the graph changes. */
  snapshot(): GraphSnapshot;
  /** Instant that growth is counted from: the start of the investigation's local today. */
  since(): Date;
};

async function loaded(store: GraphStore): Promise<LoadedGraph> {
  const startOfToday = () => startOfDayIn(store.timeZone, dayIn(store.timeZone, now()));
  let start = startOfToday();
  const groups = await LiveGroups.read(store, start.getTime() - 1);
  let snapshot: GraphSnapshot | null = null;
  return {
    store,
    groups,
    snapshot() {
      if (snapshot?.version !== store.version) snapshot = store.snapshot();
      return snapshot;
    },
    since() {
      const current = startOfToday();
      // Another day, or another zone by a change of the settings.
      if (current.getTime() !== start.getTime()) {
        start = current;
        groups.since(start.getTime() - 1);
      }
      return start;
    },
  };
}

/** Keeps the graph of one investigation in memory and in step with the database. */
export class LiveGraph {
  readonly #pool: pg.Pool;
  readonly #id: string;
  readonly #onLoad: () => void;
  #loaded: LoadedGraph | null = null;
  #failing = false;
  #running: Promise<void> | null = null;
  #queued: Promise<void> | null = null;

  /** @param onLoad told whenever the graph was read whole */
  constructor(pool: pg.Pool, investigationId: string, onLoad: () => void) {
    this.#pool = pool;
    this.#id = investigationId;
    this.#onLoad = onLoad;
  }

  /** Graph version in memory, or null while nothing is loaded. */
  get version(): number | null {
    return this.#loaded?.store.version ?? null;
  }

  /** True while the last attempt to read or follow failed. */
  get failing(): boolean {
    return this.#failing;
  }

  /** The graph, loaded first when needed; null when there is no such investigation. */
  async get(): Promise<LoadedGraph | null> {
    if (this.#loaded === null) await this.follow();
    return this.#loaded;
  }

  /**
   * Brings the graph up to every change that is committed when this is called. Calls that come
   * together share the work.
   */
  follow(): Promise<void> {
    if (this.#running === null) return this.#start();
    // A run under way may have looked before the caller's change: one more run covers all callers.
    this.#queued ??= this.#running
      .catch(() => {})
      .then(() => {
        this.#queued = null;
        return this.#start();
      });
    return this.#queued;
  }

  #start(): Promise<void> {
    this.#running = this.#step()
      .then(
        () => {
          this.#failing = false;
        },
        (error: unknown) => {
          this.#failing = true;
          throw error;
        },
      )
      .finally(() => {
        this.#running = null;
      });
    return this.#running;
  }

  async #step(): Promise<void> {
    const graph = this.#loaded;
    if (graph) {
      const followed = await followGraph(this.#pool, this.#id, graph.store, (touched) =>
        graph.groups.apply(touched),
      );
      if (followed) return;
    }
    const store = await loadGraph(this.#pool, this.#id);
    this.#loaded = store && (await loaded(store));
    this.#onLoad();
  }
}
