import { UnionFind } from "../../shared/core/index.ts";
import type { GraphStore } from "./graph-store.ts";

/**
 * Size of each person's group as the record stood at an instant: 1 for a person with no pair then,
 * 0 for one not on record then.
 *
 * Cost: one pass over the tellings.
 */
export function pastSizes(store: GraphStore, at: number): Int32Array {
  const count = store.people.length;
  const people = store.people.columns;
  const there = (k: number) =>
    (people.recordedAt[k] as number) <= at && (people.withdrawnAt[k] as number) > at;
  const groups = new UnionFind(count);
  const { a, b } = store.pairs;
  const { pair, recordedAt, withdrawnAt } = store.exposures.columns;
  for (let k = 0; k < store.exposures.length; k++) {
    if ((recordedAt[k] as number) > at || (withdrawnAt[k] as number) <= at) continue;
    const p = pair[k] as number;
    const u = a[p] as number;
    const v = b[p] as number;
    if (there(u) && there(v)) groups.union(u, v);
  }
  const sizes = new Int32Array(count);
  for (let k = 0; k < count; k++) sizes[k] = there(k) ? groups.size(k) : 0;
  return sizes;
}
