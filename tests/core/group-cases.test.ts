import { describe, expect, it } from "vitest";
import type { ClusterKind } from "../../shared/contracts/clusters.ts";
import {
  type ClusterInput,
  type DatedCase,
  groupCases,
  type Stay,
} from "../../shared/group-cases.ts";
import { randomLinks, seeded } from "./support/graphs.ts";

const onDays = (...days: number[]): DatedCase[] =>
  days.map((day, at) => ({ studyNumber: `S-${100 + at}`, day, basis: "onset" }));
const stay = (person: number, place: number, first: number, last = first): Stay => ({
  person,
  place,
  first,
  last,
});
// Methods A.6, working definition: at least 2 cases within 14 days.
const WORKING_DEFINITION = { windowDays: 14, minimumCases: 2 };

const group = (input: Partial<ClusterInput>, settings = WORKING_DEFINITION) =>
  groupCases({ cases: [], links: [], stays: [], settingOf: new Map(), ...input }, settings);

describe("what joins two cases", () => {
  it("is a contact pair, up to W days apart", () => {
    const links = [[0, 1]] as const;
    expect(group({ cases: onDays(10, 24), links })).toEqual([
      { kind: "contact_only", members: [0, 1], places: 0 },
    ]);
    expect(group({ cases: onDays(10, 25), links })).toEqual([]);
    expect(group({ cases: onDays(25, 10), links })).toEqual([]);
  });

  it("is a place on overlapping days, which include their ends, up to W days apart", () => {
    const settingOf = new Map<number, ClusterKind>([[7, "school"]]);
    const there = (last: number, first: number) => [stay(0, 7, 1, last), stay(1, 7, first, 9)];
    expect(group({ cases: onDays(10, 24), stays: there(5, 5), settingOf })).toEqual([
      { kind: "school", members: [0, 1], places: 1 },
    ]);
    expect(group({ cases: onDays(10, 24), stays: there(4, 5), settingOf })).toEqual([]);
    expect(group({ cases: onDays(10, 25), stays: there(5, 5), settingOf })).toEqual([]);
  });

  it("is never a kind of place: two schools on one day join nobody", () => {
    const settingOf = new Map<number, ClusterKind>([
      [7, "school"],
      [8, "school"],
    ]);
    const stays = [stay(0, 7, 5), stay(1, 8, 5)];
    expect(group({ cases: onDays(10, 11), stays, settingOf })).toEqual([]);
  });

  it("compares every stay of a person at a place, and no stay of one with another's elsewhere", () => {
    const stays = [stay(0, 7, 1), stay(0, 7, 20), stay(1, 7, 20), stay(1, 8, 1)];
    expect(group({ cases: onDays(10, 11), stays })).toEqual([
      { kind: "unknown", members: [0, 1], places: 1 },
    ]);
  });
});

describe("what a proposed cluster is", () => {
  it("chains joins, so its ends may lie further apart than W", () => {
    const links = [
      [0, 1],
      [1, 2],
    ] as const;
    expect(group({ cases: onDays(0, 14, 28), links })[0]?.members).toEqual([0, 1, 2]);
  });

  it("has at least the minimum of cases, and never one alone", () => {
    const links = [
      [0, 1],
      [2, 3],
      [3, 4],
    ] as const;
    const cases = onDays(1, 1, 1, 1, 1);
    const sizes = (minimumCases: number) =>
      group({ cases, links }, { windowDays: 14, minimumCases }).map((one) => one.members.length);
    expect(sizes(2)).toEqual([3, 2]);
    expect(sizes(3)).toEqual([3]);
    expect(sizes(1)).toEqual([3, 2]);
  });

  it("is named by the kind of place with most joins, the first of the vocabulary in a draw", () => {
    const settingOf = new Map<number, ClusterKind>([
      [1, "social"],
      [2, "household"],
      [3, "workplace"],
    ]);
    const at = (place: number, ...people: number[]) => people.map((one) => stay(one, place, 5));
    const cases = onDays(1, 2, 3);
    const links = [[0, 1]] as const;
    const most = [...at(1, 0, 1, 2), ...at(2, 0, 1), ...at(3, 2)];
    expect(group({ cases, links, stays: most, settingOf })).toEqual([
      { kind: "social", members: [0, 1, 2], places: 2 },
    ]);
    const draw = [...at(1, 0, 1), ...at(2, 1, 2)];
    expect(group({ cases, links, stays: draw, settingOf })[0]?.kind).toBe("household");
  });

  it("stands by size, then first day, then lowest study number; members by day", () => {
    const cases = onDays(9, 8, 5, 4, 5, 4, 30, 29, 28);
    const links = [
      [0, 1],
      [4, 5],
      [2, 3],
      [6, 7],
      [7, 8],
    ] as const;
    expect(group({ cases, links }).map(({ members }) => members)).toEqual([
      [8, 7, 6],
      [3, 2],
      [5, 4],
      [1, 0],
    ]);
  });
});

/** The definition word by word: every two cases are compared, then reachability is walked. */
function bruteForce({ cases, links, stays }: ClusterInput, windowDays: number, minimum: number) {
  const [pairs, spent] = [[...links], [...stays]];
  const joined = (x: number, y: number) => {
    const apart = Math.abs((cases[x]?.day ?? 0) - (cases[y]?.day ?? 0));
    if (apart > windowDays) return false;
    if (pairs.some(([a, b]) => (a === x && b === y) || (a === y && b === x))) return true;
    return spent.some((one) =>
      spent.some((other) => {
        if (one.person !== x || other.person !== y || one.place !== other.place) return false;
        for (let day = one.first; day <= one.last; day++) {
          if (day >= other.first && day <= other.last) return true;
        }
        return false;
      }),
    );
  };
  const seen = new Set<number>();
  const found: number[][] = [];
  for (let start = 0; start < cases.length; start++) {
    if (seen.has(start)) continue;
    const members = [start];
    seen.add(start);
    for (const at of members) {
      for (let next = 0; next < cases.length; next++) {
        if (seen.has(next) || !joined(at, next)) continue;
        seen.add(next);
        members.push(next);
      }
    }
    if (members.length >= minimum) found.push(members.sort((a, b) => a - b));
  }
  return found.sort((a, b) => (a[0] ?? 0) - (b[0] ?? 0));
}

it("agrees with comparing every two cases, whatever the order they come in", () => {
  let clusters = 0;
  for (let seed = 1; seed <= 60; seed++) {
    const next = seeded(seed);
    const whole = (below: number) => Math.floor(next() * below);
    const n = 16;
    const cases = onDays(...Array.from({ length: n }, () => whole(60)));
    const stays = Array.from({ length: 24 }, () => {
      const first = whole(40);
      return stay(whole(n), whole(4), first, first + whole(6));
    });
    const input = { cases, links: randomLinks(n, 0.06, seed), stays, settingOf: new Map() };
    const windowDays = 3 + whole(12);
    const minimumCases = 2 + whole(2);
    const wanted = bruteForce(input, windowDays, minimumCases);
    const sets = (one: ClusterInput) =>
      groupCases(one, { windowDays, minimumCases })
        .map(({ members }) => members.toSorted((a, b) => a - b))
        .sort((a, b) => (a[0] ?? 0) - (b[0] ?? 0));
    expect(sets(input)).toEqual(wanted);
    const turned = { ...input, links: [...input.links].reverse(), stays: stays.toReversed() };
    expect(groupCases(turned, { windowDays, minimumCases })).toEqual(
      groupCases(input, { windowDays, minimumCases }),
    );
    clusters += wanted.length;
  }
  expect(clusters).toBeGreaterThan(60);
});
