/** What proposed clusters are computed with. */
export interface ClusterSettings {
  /** Days that the reference days of two joined cases differ by at most. */
  windowDays: number;
  /** Cases that a proposed cluster has at least. */
  minimumCases: number;
}

/**
 * Defaults for every investigation until they are settings of one.
 * Source: methods A.6, working definition: at least 2 cases, reference days within 14 days.
 */
export const CLUSTER_SETTINGS: ClusterSettings = { windowDays: 14, minimumCases: 2 };
