import type { ListQuery } from "../../../shared/contracts/common.ts";
import type { Group } from "../../../shared/contracts/network.ts";
import type { GroupsNow } from "../../analysis/analysis.ts";
import { invalid } from "../../http/problem.ts";

const SORT_KEYS = ["size", "cases", "contacts", "grownSince"] as const;
type SortKey = (typeof SORT_KEYS)[number];

/**
 * A page of the current groups. Without `sort` the largest come first; ties keep that order. `q`
 * finds groups by the beginning of their id, the only thing about a group that can be typed.
 *
 * @throws HttpProblem `invalid` for a sort key that groups do not have
 */
export function pageOfGroups(now: GroupsNow, query: ListQuery) {
  const { page, pageSize, sort, q } = query;
  let groups: readonly Group[] = now.groups.map(({ id, size, cases, contacts, past }) => ({
    id,
    size,
    cases,
    contacts,
    grownSince: size - past,
  }));
  if (q) groups = groups.filter(({ id }) => id.startsWith(q.toLowerCase()));
  if (sort) {
    const isDown = sort.startsWith("-");
    const key = (isDown ? sort.slice(1) : sort) as SortKey;
    if (!SORT_KEYS.includes(key)) throw invalid({ path: "sort", code: "not_sortable" });
    groups = groups.toSorted((x, y) => (isDown ? y[key] - x[key] : x[key] - y[key]));
  }
  return {
    items: groups.slice((page - 1) * pageSize, page * pageSize),
    total: groups.length,
    page,
    pageSize,
    graphVersion: now.graphVersion,
    since: now.since,
  };
}
