import type { ClusterSettings } from "../../../shared/group-cases.ts";
import type { InvestigationRow } from "../investigations/store.ts";

/** What an investigation's settings say of clusters (working definition: methods A.6). */
export function clusterSettings(
  settings: Pick<InvestigationRow, "clusterWindowDays" | "clusterMinimumCases">,
): ClusterSettings {
  return {
    windowDays: settings.clusterWindowDays,
    minimumCases: settings.clusterMinimumCases,
  };
}
