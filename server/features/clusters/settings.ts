import type { InvestigationRow } from "../investigations/store.ts";

/** What proposed clusters are computed with. */
export interface ClusterSettings {
  /** Days that the reference days of two joined cases differ by at most. */
  windowDays: number;
  /** Cases that a proposed cluster has at least. */
  minimumCases: number;
}

/** What an investigation's settings say of clusters (working definition: methods A.6). */
export function clusterSettings(
  settings: Pick<InvestigationRow, "clusterWindowDays" | "clusterMinimumCases">,
): ClusterSettings {
  return {
    windowDays: settings.clusterWindowDays,
    minimumCases: settings.clusterMinimumCases,
  };
}
