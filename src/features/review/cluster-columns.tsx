import type { Cluster, ClusterKind } from "../../../shared/contracts/clusters.ts";
import type { DataColumn } from "../../components/data-table/data-column.ts";
import { formatDay, formatNumber } from "../../lib/formatters.ts";
import { settingWords } from "../../lib/words.ts";
import { bySpecimen } from "./cluster-rows.ts";

const kindWords: Readonly<Record<ClusterKind, string>> = {
  ...settingWords,
  unknown: "place of unknown kind",
  contact_only: "contact only",
};

/** How many study numbers a line has room for. */
const shown = 4;

/** "D-4417, D-4418 and 3 more": the first members and how many there are besides. */
export function membersText({ members, cases }: Cluster): string {
  const first = members.slice(0, shown);
  const more = cases - first.length;
  return `${first.join(", ")}${more > 0 ? ` and ${formatNumber(more)} more` : ""}`;
}

/** Columns of the proposed clusters: what is new stands beside what there is. */
export const clusterColumns: readonly DataColumn<Cluster>[] = [
  {
    id: "number",
    header: "proposed cluster",
    hideable: false,
    sortKey: "number",
    cell: ({ number }) => formatNumber(number),
  },
  {
    id: "cases",
    header: "cases",
    numeric: true,
    sortKey: "cases",
    cell: ({ cases }) => formatNumber(cases),
  },
  {
    id: "newInLast7Days",
    header: "new in 7 days",
    numeric: true,
    sortKey: "newInLast7Days",
    cell: ({ newInLast7Days }) =>
      newInLast7Days === 0 ? (
        <span className="text-ink-2">0</span>
      ) : (
        <strong>{formatNumber(newInLast7Days)}</strong>
      ),
  },
  { id: "kind", header: "kind of place", cell: ({ kind }) => kindWords[kind] },
  {
    id: "places",
    header: "places",
    numeric: true,
    sortKey: "places",
    cell: ({ places }) => formatNumber(places),
  },
  {
    id: "firstDay",
    header: "first day",
    sortKey: "firstDay",
    cell: ({ firstDay }) => formatDay(firstDay),
  },
  {
    id: "lastDay",
    header: "last day",
    sortKey: "lastDay",
    cell: ({ lastDay }) => formatDay(lastDay),
  },
  {
    id: "bySpecimen",
    header: "by specimen day",
    numeric: true,
    cell: (cluster) => formatNumber(bySpecimen(cluster)),
  },
  { id: "members", header: "study numbers", cell: membersText },
];
