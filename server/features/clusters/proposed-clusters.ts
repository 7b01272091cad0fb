import {
  type ClusterSettings,
  type DatedCase,
  groupCases,
  type ProposedCluster,
} from "../../../shared/group-cases.ts";
import type { Tx } from "../../db/with-tx.ts";
import { clusterState, loadClusterInput } from "./store.ts";

/** Proposed clusters of an investigation, in their order, with the cases they are made of. */
export interface ProposedClusters {
  cases: readonly DatedCase[];
  clusters: readonly ProposedCluster[];
  withoutReferenceDay: number;
}

interface Kept {
  state: string;
  proposed: Promise<ProposedClusters>;
}

const kept = new Map<string, Kept>();
const mostKept = 8;

async function workOut(
  tx: Tx,
  investigationId: string,
  settings: ClusterSettings,
): Promise<ProposedClusters> {
  const { input, withoutReferenceDay } = await loadClusterInput(tx, investigationId);
  return { cases: input.cases, clusters: groupCases(input, settings), withoutReferenceDay };
}

/**
 * Proposed clusters as the transaction sees them. The last answer of an investigation is kept and
 * given again for as long as nothing that it was made of has changed; whoever asks while it is being
 * worked out waits for it, since every open page asks at the same moment after a change. It holds
 * study numbers and days only, and the roles that may ask all see every case of the investigation.
 *
 * @param tx one snapshot: what is compared and what is read must be of the same moment
 */
export async function proposedClusters(
  tx: Tx,
  investigationId: string,
  settings: ClusterSettings,
): Promise<ProposedClusters> {
  const { windowDays, minimumCases } = settings;
  const state = `${await clusterState(tx, investigationId)}/${windowDays}/${minimumCases}`;
  const known = kept.get(investigationId);
  if (known?.state === state) {
    // Where the other request broke off, this one works it out for itself.
    const proposed = await known.proposed.catch(() => null);
    if (proposed) return proposed;
  }
  const entry = { state, proposed: workOut(tx, investigationId, settings) };
  kept.delete(investigationId);
  kept.set(investigationId, entry);
  for (const oldest of kept.keys()) {
    if (kept.size <= mostKept) break;
    kept.delete(oldest);
  }
  try {
    return await entry.proposed;
  } catch (error) {
    if (kept.get(investigationId) === entry) kept.delete(investigationId);
    throw error;
  }
}
