import {
  type ClusterSettings,
  type DatedCase,
  groupCases,
  type ProposedCluster,
} from "../../../shared/group-cases.ts";
import { withTx } from "../../db/with-tx.ts";
import { safeError } from "../../http/translate-error.ts";
import type { Services } from "../../services.ts";
import { loadInvestigation } from "../investigations/store.ts";
import { clusterSettings } from "./settings.ts";
import { loadClusterInput } from "./store.ts";

/** Proposed clusters of an investigation, in their order, with the cases they are made of. */
export interface ProposedClusters extends ClusterSettings {
  /** Version of the record they were worked out on. */
  graphVersion: number;
  cases: readonly DatedCase[];
  clusters: readonly ProposedCluster[];
  withoutReferenceDay: number;
}

/** An investigation's last answer, and the next one while it is being worked out. */
interface Desk {
  last: ProposedClusters | null;
  working: Promise<ProposedClusters> | null;
  /** Milliseconds of this process at which the next may begin. */
  restsUntil: number;
  waking: NodeJS.Timeout | null;
}

type DeskServices = Pick<Services, "pools" | "hub" | "log">;

const desks = new Map<string, Desk>();
const mostDesks = 8;

/** How long a request waits for the next answer when there is an earlier one to show meanwhile. */
const PATIENCE_MS = 30;
/** An answer that took long is not worked out again and again: it rests as long as it took. */
const RESTS_AFTER_MS = 200;

function deskOf(investigationId: string): Desk {
  const desk = desks.get(investigationId) ?? {
    last: null,
    working: null,
    restsUntil: 0,
    waking: null,
  };
  desks.delete(investigationId);
  desks.set(investigationId, desk);
  for (const [oldest, { working }] of desks) {
    if (desks.size <= mostDesks) break;
    if (working === null) desks.delete(oldest);
  }
  return desk;
}

/** Reads the record in one snapshot of the background login and groups its cases. */
async function workOut(services: DeskServices, id: string): Promise<ProposedClusters> {
  const read = await withTx(
    { pool: services.pools.system, nonce: null },
    async (tx) => {
      const investigation = await loadInvestigation(tx, id);
      return { investigation, ...(await loadClusterInput(tx, id)) };
    },
    "repeatable",
  );
  const settings = clusterSettings(read.investigation);
  return {
    ...settings,
    graphVersion: read.investigation.graphVersion,
    cases: read.input.cases,
    clusters: groupCases(read.input, settings),
    withoutReferenceDay: read.withoutReferenceDay,
  };
}

function begin(services: DeskServices, id: string, desk: Desk): Promise<ProposedClusters> {
  if (desk.working !== null) return desk.working;
  const started = performance.now();
  const shown = desk.last;
  const working = workOut(services, id)
    .then((proposed) => {
      desk.last = proposed;
      // Whoever was shown the earlier answer asks again.
      if (shown) services.hub.publish(id, { topic: "clusters", id: null, version: null });
      return proposed;
    })
    .finally(() => {
      desk.working = null;
      const took = performance.now() - started;
      desk.restsUntil = performance.now() + (took > RESTS_AFTER_MS ? took : 0);
    });
  desk.working = working;
  return working;
}

/** Begins the next answer as soon as it may, with nobody waiting for it. */
function beginLater(services: DeskServices, id: string, desk: Desk): void {
  if (desk.working !== null || desk.waking) return;
  const start = () => {
    desk.waking = null;
    begin(services, id, desk).catch((error: unknown) =>
      services.log.error({ event: "clusters not worked out", error: safeError(error) }),
    );
  };
  const rest = desk.restsUntil - performance.now();
  if (rest <= 0) start();
  else desk.waking = setTimeout(start, rest).unref();
}

const sameSettings = (x: ClusterSettings, y: ClusterSettings) =>
  x.windowDays === y.windowDays && x.minimumCases === y.minimumCases;

/**
 * Proposed clusters at a version of the record or a later one. The last answer of an investigation
 * is kept. After a change the next is worked out in the background; a request waits for it a moment
 * only and is then given the last one, which says its version, and the live stream says when the
 * next is there. Without an answer under these settings the request waits.
 *
 * An answer holds study numbers and days, and the roles that may ask all see every case of the
 * investigation, so one serves all of them.
 *
 * @param wanted version and settings as the request's own transaction sees them
 * @returns `updating` is true when a later answer is on its way
 */
export async function proposedClusters(
  services: DeskServices,
  investigationId: string,
  wanted: ClusterSettings & { graphVersion: number },
): Promise<{ proposed: ProposedClusters; updating: boolean }> {
  const desk = deskOf(investigationId);
  const isIt = (one: ProposedClusters) =>
    sameSettings(one, wanted) && one.graphVersion >= wanted.graphVersion;
  if (desk.last && isIt(desk.last)) return { proposed: desk.last, updating: false };
  const last = desk.last && sameSettings(desk.last, wanted) ? desk.last : null;
  if (!last) {
    let proposed = await begin(services, investigationId, desk);
    // One that was under way before may have read earlier settings, or an earlier record.
    if (!isIt(proposed)) proposed = await begin(services, investigationId, desk);
    return { proposed, updating: !isIt(proposed) };
  }
  beginLater(services, investigationId, desk);
  const next = desk.working;
  if (next === null) return { proposed: last, updating: true };
  let timer: NodeJS.Timeout | undefined;
  const patience = new Promise<null>((done) => {
    timer = setTimeout(() => done(null), PATIENCE_MS);
  });
  // A failure is logged where it happens; this request still has an answer.
  const proposed = await Promise.race([next.catch(() => null), patience]);
  clearTimeout(timer);
  if (proposed && isIt(proposed)) return { proposed, updating: false };
  return { proposed: proposed && sameSettings(proposed, wanted) ? proposed : last, updating: true };
}
