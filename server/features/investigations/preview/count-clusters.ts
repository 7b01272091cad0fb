import { dayNumber } from "../../../../shared/core/index.ts";
import { type ClusterInput, groupCases } from "../../../../shared/group-cases.ts";
import { closureDaysOf } from "../present.ts";
import type { SettingsRow } from "../settings-store.ts";

export interface ClusterCounts {
  proposed: number;
  cases: number;
  /** Those whose last reference day lies as many days back as closure asks for, or more. */
  quiet: number;
}

/**
 * Counts proposed clusters as the Review room proposes them.
 *
 * @param today local day in the investigation's zone
 */
export function countClusters(
  input: ClusterInput,
  settings: SettingsRow,
  today: string,
): ClusterCounts {
  const clusters = groupCases(input, {
    windowDays: settings.clusterWindowDays,
    minimumCases: settings.clusterMinimumCases,
  });
  const quietUntil = (dayNumber(today) ?? 0) - closureDaysOf(settings);
  const counts: ClusterCounts = { proposed: clusters.length, cases: 0, quiet: 0 };
  for (const { members } of clusters) {
    counts.cases += members.length;
    // Members are in order of their days.
    const last = input.cases[members.at(-1) ?? -1]?.day;
    if (last !== undefined && last <= quietUntil) counts.quiet += 1;
  }
  return counts;
}
