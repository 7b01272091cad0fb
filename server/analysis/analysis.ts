import type { Logger } from "pino";
import type { z } from "zod";
import type {
  graphQuery,
  NetworkGraph,
  NetworkSummary,
  SummaryQuery,
} from "../../shared/contracts/network.ts";
import { now } from "../clock.ts";
import type { Pools } from "../db/pools.ts";
import { safeError } from "../http/translate-error.ts";
import { WorkerLane } from "../worker-lane.ts";
import type { Job, JobAnswer } from "./analysis-jobs.ts";
import type { PictureQuestion } from "./answer-picture.ts";
import { Answers } from "./answers.ts";
import type { LiveGroup } from "./group-book.ts";
import { founderOf, groupNames } from "./group-names.ts";
import { LiveGraph, type LoadedGraph } from "./live-graph.ts";
import { presentPicture, presentSummary } from "./present-answers.ts";
import { type AnalysisSettings, type AskedReport, reportQuestion } from "./report-question.ts";
import { TrailMemory } from "./trail-memory.ts";

/** Graphs kept in memory; the one asked for longest ago is dropped and read again when wanted. */
const MOST_LOADED = 12;
const LOADED_AHEAD = 4;
const WORKER = new URL("./analysis-worker.mjs", import.meta.url);

/** Current groups of an investigation; do not change them. */
export type GroupsNow = {
  readonly graphVersion: number;
  /** Instant (ISO) that growth is counted from: the start of the investigation's local today. */
  readonly since: string;
  /** By size descending. */
  readonly groups: readonly LiveGroup[];
};

export type GraphQuery = z.output<typeof graphQuery>;

/** The server's analysis: live graphs and what is computed on them. */
export type Analysis = {
  /**
   * Begins to load the graphs of the most recent investigations, so that first questions are
   * quick, and returns without waiting for them.
   */
  start(): Promise<void>;
  /** Ends loading ahead and the worker threads; running questions fail. */
  stop(): Promise<void>;
  /** Connected groups of the current record; null when there is no such investigation. */
  groups(investigationId: string): Promise<GroupsNow | null>;
  /** The network report; null when there is no such investigation. */
  summary(
    investigationId: string,
    query: SummaryQuery,
    settings: AnalysisSettings,
  ): Promise<NetworkSummary | null>;
  /** The network picture; null when there is no such investigation or group. */
  graph(
    investigationId: string,
    query: GraphQuery,
    settings: AnalysisSettings,
  ): Promise<NetworkGraph | null>;
  /** Graph version in memory, or null while the investigation is not loaded. */
  version(investigationId: string): number | null;
  /** Waits until a graph version that is committed can be seen here. */
  ready(investigationId: string, version: number): Promise<void>;
  /** Brings a graph up to date if it is loaded; the dispatcher calls this. */
  follow(investigationId: string): Promise<void>;
  /** False while the last reading of some graph in memory failed. */
  healthy(): boolean;
  /** Investigations in memory and their graph versions. */
  loaded(): ReadonlyMap<string, number>;
};

type Kept = { readonly live: LiveGraph; readonly answers: Answers; readonly trail: TrailMemory };

/**
 * Makes the analysis.
 *
 * @param options.pools only the system login is used, which reads `core` of all investigations
 */
export function createAnalysis(options: {
  pools: Pick<Pools, "system">;
  log: Pick<Logger, "error">;
}): Analysis {
  const pool = options.pools.system;
  const kept = new Map<string, Kept>();
  const lane = () => new WorkerLane<Job, JobAnswer>(WORKER, "analysis");
  const reports = lane();
  const pictures = lane();
  let stopped = false;
  let loadingAhead: Promise<void> = Promise.resolve();

  function keep(id: string): Kept {
    const known = kept.get(id);
    if (known) {
      kept.delete(id);
      kept.set(id, known);
      return known;
    }
    const answers = new Answers();
    const trail = new TrailMemory();
    const live = new LiveGraph(pool, id, () => {
      answers.clear();
      trail.clear();
    });
    const made = { live, answers, trail };
    kept.set(id, made);
    const oldest = kept.keys().next().value;
    if (kept.size > MOST_LOADED && oldest !== undefined) kept.delete(oldest);
    return made;
  }

  async function open(id: string): Promise<{ graph: LoadedGraph; entry: Kept } | null> {
    const entry = keep(id);
    const graph = await entry.live.get();
    if (graph) return { graph, entry };
    kept.delete(id);
    return null;
  }

  async function report(graph: LoadedGraph, { trail }: Kept, asked: AskedReport) {
    const snapshot = graph.snapshot();
    const question = trail.reduce(asked.question);
    const answer = await reports.run({ kind: "report", snapshot, question });
    if (trail.keep(asked.question, answer)) {
      return { ...answer, trail: trail.of(asked.question) };
    }
    const whole = await reports.run({ kind: "report", snapshot, question: asked.question });
    trail.keep(asked.question, whole);
    return whole;
  }

  const complain = (error: unknown) =>
    options.log.error({ event: "graph not loaded", error: safeError(error) });

  async function loadAhead(): Promise<void> {
    const { rows } = await pool.query<{ id: string }>(
      `select id from core.investigation where graph_version > 0
       order by recorded_at desc limit ${LOADED_AHEAD}`,
    );
    if (rows.length > 0) reports.warm();
    for (const { id } of rows) if (!stopped) await open(id).catch(complain);
  }

  return {
    async start() {
      loadingAhead = loadAhead().catch(complain);
    },

    async stop() {
      stopped = true;
      await loadingAhead;
      await Promise.all([reports.stop(), pictures.stop()]);
    },

    async groups(id) {
      const opened = await open(id);
      if (!opened) return null;
      const { graph } = opened;
      const since = graph.since().toISOString();
      return { graphVersion: graph.store.version, since, groups: graph.groups.list() };
    },

    async summary(id, query, settings) {
      const opened = await open(id);
      if (!opened) return null;
      const { graph, entry } = opened;
      const asked = reportQuestion(query, settings, now());
      const graphVersion = graph.store.version;
      const answer = await entry.answers.get(graphVersion, asked.key, () =>
        report(graph, entry, asked),
      );
      return presentSummary(asked, graphVersion, answer);
    },

    async graph(id, query, settings) {
      const opened = await open(id);
      if (!opened) return null;
      const { graph, entry } = opened;
      const { group, ...rest } = query;
      const asked = reportQuestion(rest, settings, now());
      const founder = group === undefined ? null : founderOf(graph, group);
      if (founder === undefined) return null;
      const graphVersion = graph.store.version;
      const key = `picture ${founder} ${asked.key}`;
      const drawn = await entry.answers.get(graphVersion, key, async () => {
        const names = groupNames(graph);
        const question: PictureQuestion = {
          report: { ...asked.question, trail: [] },
          groupOf: founder,
          founders: asked.question.asOf === null ? names.founders : null,
        };
        const answer = await pictures.run({
          kind: "picture",
          snapshot: graph.snapshot(),
          question,
        });
        return presentPicture(graph, answer, names.ids);
      });
      return { graphVersion, cutOff: asked.cutOff, ...drawn };
    },

    version: (id) => kept.get(id)?.live.version ?? null,

    async ready(id, version) {
      const entry = keep(id);
      if ((entry.live.version ?? -1) < version) await entry.live.follow();
    },

    async follow(id) {
      const entry = kept.get(id);
      if (entry && entry.live.version !== null) await entry.live.follow();
    },

    healthy: () => [...kept.values()].every(({ live }) => !live.failing),

    loaded() {
      const versions = [...kept].map(([id, { live }]) => [id, live.version ?? -1] as const);
      return new Map(versions.filter(([, version]) => version >= 0));
    },
  };
}
