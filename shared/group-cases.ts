import { CLUSTER_KINDS, type ClusterKind } from "./contracts/clusters.ts";
import { UnionFind } from "./core/index.ts";

/** What proposed clusters are computed with. */
export interface ClusterSettings {
  /** Days that the reference days of two joined cases differ by at most. */
  windowDays: number;
  /** Cases that a proposed cluster has at least. */
  minimumCases: number;
}

/** A confirmed or probable case with its reference day (a day number). */
export interface DatedCase {
  studyNumber: string;
  day: number;
  basis: "onset" | "specimen";
}

/** Days (numbers, both ends included) on which a case was at a place. */
export interface Stay {
  /** Index of the case. */
  person: number;
  place: number;
  first: number;
  last: number;
}

/** What the grouping looks at. `links` are pairs of case indexes with a live contact pair. */
export interface ClusterInput {
  cases: readonly DatedCase[];
  links: Iterable<readonly [number, number]>;
  stays: Iterable<Stay>;
  /** Setting of a place by its number; a place that is not in it has none on record. */
  settingOf: ReadonlyMap<number, ClusterKind>;
}

/** A connected set of cases. `members` are case indexes, earliest reference day first. */
export interface ProposedCluster {
  kind: ClusterKind;
  members: number[];
  /** Distinct places that at least one join rests on. */
  places: number;
}

/** Joins that a place made, counted at the earlier case of each. */
interface PlaceJoins {
  place: number;
  person: number;
  joins: number;
}

const meets = (x: readonly Stay[], y: readonly Stay[]) =>
  x.some((a) => y.some((b) => a.first <= b.last && b.first <= a.last));

/** Stays by place, then by case. */
function byPlace(stays: Iterable<Stay>): Map<number, Map<number, Stay[]>> {
  const places = new Map<number, Map<number, Stay[]>>();
  for (const stay of stays) {
    let people = places.get(stay.place);
    if (!people) {
      people = new Map();
      places.set(stay.place, people);
    }
    const earlier = people.get(stay.person);
    if (earlier) earlier.push(stay);
    else people.set(stay.person, [stay]);
  }
  return places;
}

/** Joins cases that were at a place on the same days; tells how many joins each place made. */
function joinAtPlaces(
  cases: readonly DatedCase[],
  stays: Iterable<Stay>,
  windowDays: number,
  groups: UnionFind,
): PlaceJoins[] {
  const made: PlaceJoins[] = [];
  const dayOf = (person: number) => cases[person]?.day ?? Number.NaN;
  for (const [place, people] of byPlace(stays)) {
    if (people.size < 2) continue;
    const there = [...people].sort(([a], [b]) => dayOf(a) - dayOf(b) || a - b);
    for (const [at, [person, own]] of there.entries()) {
      let joins = 0;
      for (let next = at + 1; next < there.length; next++) {
        const [other, others] = there[next] ?? [person, []];
        // In order of reference days: nobody further on can be near enough.
        if (dayOf(other) - dayOf(person) > windowDays) break;
        if (!meets(own, others)) continue;
        groups.union(person, other);
        joins++;
      }
      if (joins > 0) made.push({ place, person, joins });
    }
  }
  return made;
}

/** The kind with most joins; of equal ones the first of the vocabulary. */
function commonest(joins: ReadonlyMap<ClusterKind, number>): ClusterKind {
  let best: ClusterKind = "contact_only";
  let most = 0;
  for (const kind of CLUSTER_KINDS) {
    const count = joins.get(kind) ?? 0;
    if (count > most) [best, most] = [kind, count];
  }
  return best;
}

/**
 * Proposed clusters: two cases are joined when their reference days differ by at most W days and
 * they share a live contact pair, or were at one place on overlapping days; a cluster is a connected
 * set of at least the minimum. The order is by size, then the earlier first reference day, then the
 * lower study number among members, so that the same record always gives the same list.
 *
 * Cost: near-linear in links and stays, and, at each place, every two of its cases within W days of
 * each other.
 * Source: methods A.6 (working definition), C.11 (connected sets).
 */
export function groupCases(input: ClusterInput, settings: ClusterSettings): ProposedCluster[] {
  const { cases, settingOf } = input;
  const groups = new UnionFind(cases.length);
  for (const [a, b] of input.links) {
    const [one, two] = [cases[a], cases[b]];
    if (one && two && Math.abs(one.day - two.day) <= settings.windowDays) groups.union(a, b);
  }
  const placed = joinAtPlaces(cases, input.stays, settings.windowDays, groups);

  const found = new Map<
    number,
    { members: number[]; places: Set<number>; kinds: Map<ClusterKind, number> }
  >();
  for (let person = 0; person < cases.length; person++) {
    if (groups.size(person) < Math.max(2, settings.minimumCases)) continue;
    const root = groups.root(person);
    const cluster = found.get(root);
    if (cluster) cluster.members.push(person);
    else found.set(root, { members: [person], places: new Set(), kinds: new Map() });
  }
  for (const { place, person, joins } of placed) {
    const cluster = found.get(groups.root(person));
    if (!cluster) continue;
    const kind = settingOf.get(place) ?? "unknown";
    cluster.places.add(place);
    cluster.kinds.set(kind, (cluster.kinds.get(kind) ?? 0) + joins);
  }

  const early = (x: number, y: number) => {
    const [a, b] = [cases[x], cases[y]];
    if (!a || !b) return 0;
    return a.day - b.day || (a.studyNumber < b.studyNumber ? -1 : 1);
  };
  const lowest = (members: readonly number[]) =>
    members.reduce(
      (low, at) => {
        const number = cases[at]?.studyNumber ?? low;
        return number < low ? number : low;
      },
      cases[members[0] ?? 0]?.studyNumber ?? "",
    );
  return [...found.values()]
    .map(({ members, places, kinds }) => {
      members.sort(early);
      return {
        cluster: { kind: commonest(kinds), members, places: places.size },
        firstDay: cases[members[0] ?? 0]?.day ?? 0,
        lowest: lowest(members),
      };
    })
    .sort(
      (x, y) =>
        y.cluster.members.length - x.cluster.members.length ||
        x.firstDay - y.firstDay ||
        (x.lowest < y.lowest ? -1 : 1),
    )
    .map(({ cluster }) => cluster);
}
