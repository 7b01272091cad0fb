import type { Cluster } from "../../../shared/contracts/clusters.ts";
import type { OnsetRow } from "../../components/day-strip/day-strip-row.ts";

/** Reference days of each proposed cluster as a row of the day strip; both bases of a day as one. */
export function clusterRows(clusters: readonly Cluster[]): OnsetRow[] {
  return clusters.map(({ number, onsets }) => {
    const counts = new Map<string, number>();
    for (const { day, count } of onsets) counts.set(day, (counts.get(day) ?? 0) + count);
    return {
      type: "onsets",
      id: String(number),
      label: `proposed cluster ${number}`,
      counts: [...counts].map(([day, count]) => ({ day, count })),
    };
  });
}

/** First and last day of the one scale that all strips of a page share; today is always on it. */
export function clusterDays(clusters: readonly Cluster[], today: string) {
  const days = clusters.flatMap(({ firstDay, lastDay }) => [firstDay, lastDay]);
  const inOrder = [...days, today].sort();
  return { from: inOrder[0] ?? today, to: inOrder.at(-1) ?? today };
}

/** Cases of a cluster whose onset is not known, so that the specimen day stands for it. */
export function bySpecimen({ onsets }: Cluster): number {
  return onsets.reduce((sum, { basis, count }) => (basis === "specimen" ? sum + count : sum), 0);
}
