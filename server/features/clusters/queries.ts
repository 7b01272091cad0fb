import { CLUSTER_MEMBERS_TOLD, type Cluster } from "../../../shared/contracts/clusters.ts";
import type { ListQuery } from "../../../shared/contracts/common.ts";
import { dayNumber, dayString } from "../../../shared/core/index.ts";
import type { DatedCase, ProposedCluster } from "../../../shared/group-cases.ts";
import { invalid } from "../../http/problem.ts";
import type { ProposedClusters } from "./proposed-clusters.ts";

const SORT_KEYS = ["number", "cases", "newInLast7Days", "firstDay", "lastDay", "places"] as const;
type SortKey = (typeof SORT_KEYS)[number];

/** How far back "new" looks, today included. Source: methods C.11, *growing*. */
const NEW_DAYS = 7;

type Ranked = { number: number; cluster: ProposedCluster; members: readonly DatedCase[] };

const newOf = (members: readonly DatedCase[], today: number) =>
  members.filter(({ day }) => day > today - NEW_DAYS && day <= today).length;

/** Members are in order of their days, so first and last are the ends. */
function figure({ number, cluster, members }: Ranked, key: SortKey, today: number): number {
  switch (key) {
    case "number":
      return number;
    case "cases":
      return members.length;
    case "newInLast7Days":
      return newOf(members, today);
    case "firstDay":
      return members[0]?.day ?? 0;
    case "lastDay":
      return members.at(-1)?.day ?? 0;
    case "places":
      return cluster.places;
  }
}

function present({ number, cluster, members }: Ranked, today: number): Cluster {
  const onsets = new Map<string, Cluster["onsets"][number]>();
  for (const { day, basis } of members) {
    const entry = onsets.get(`${day} ${basis}`);
    if (entry) entry.count++;
    else onsets.set(`${day} ${basis}`, { day: dayString(day), count: 1, basis });
  }
  return {
    number,
    kind: cluster.kind,
    cases: members.length,
    firstDay: dayString(members[0]?.day ?? 0),
    lastDay: dayString(members.at(-1)?.day ?? 0),
    onsets: [...onsets.values()],
    newInLast7Days: newOf(members, today),
    places: cluster.places,
    members: members.slice(0, CLUSTER_MEMBERS_TOLD).map(({ studyNumber }) => studyNumber),
  };
}

/**
 * A page of the proposed clusters. Without `sort` they stand by their number; ties keep that order.
 * `q` is the beginning of a study number and finds the cluster that a case is in.
 *
 * @param today the investigation's day
 * @throws HttpProblem `invalid` for a sort key that clusters do not have
 */
export function pageOfClusters(proposed: ProposedClusters, query: ListQuery, today: string) {
  const { page, pageSize, sort, q } = query;
  const now = dayNumber(today) ?? 0;
  let ranked: Ranked[] = proposed.clusters.map((cluster, at) => ({
    number: at + 1,
    cluster,
    members: cluster.members.flatMap((member) => proposed.cases[member] ?? []),
  }));
  if (q) {
    const start = q.toUpperCase();
    ranked = ranked.filter(({ members }) =>
      members.some(({ studyNumber }) => studyNumber.toUpperCase().startsWith(start)),
    );
  }
  if (sort) {
    const isDown = sort.startsWith("-");
    const key = (isDown ? sort.slice(1) : sort) as SortKey;
    if (!SORT_KEYS.includes(key)) throw invalid({ path: "sort", code: "not_sortable" });
    const figures = new Map(ranked.map((one) => [one.number, figure(one, key, now)]));
    const of = ({ number }: Ranked) => figures.get(number) ?? 0;
    ranked.sort((x, y) => (isDown ? of(y) - of(x) : of(x) - of(y)));
  }
  return {
    items: ranked.slice((page - 1) * pageSize, page * pageSize).map((one) => present(one, now)),
    total: ranked.length,
    page,
    pageSize,
    today,
    withoutReferenceDay: proposed.withoutReferenceDay,
  };
}
