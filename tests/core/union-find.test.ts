import { describe, expect, it } from "vitest";
import { components, UnionFind } from "../../shared/core/index.ts";
import { graphOf, linksOf, randomLinks } from "./support/graphs.ts";

// Source: methods C.11, exact fixture: 8 people, one pair per step.
it("follows groups pair by pair", () => {
  const groups = new UnionFind(8);
  const film = { groups: [] as number[], largest: [] as number[], cycleRank: [] as number[] };
  const merges: number[] = [];
  let largest = 1;
  for (const [step, [a, b]] of linksOf("01 23 12 45 03 67 56 34").entries()) {
    const bothGroups = groups.size(a) >= 2 && groups.size(b) >= 2;
    if (groups.union(a, b).merged && bothGroups) merges.push(step + 1);
    largest = Math.max(largest, groups.size(a));
    film.groups.push(groups.groups);
    film.largest.push(largest);
    film.cycleRank.push(step + 1 - 8 + groups.groups);
  }
  expect(film.groups).toEqual([7, 6, 5, 4, 4, 3, 2, 1]);
  expect(film.largest).toEqual([2, 2, 4, 4, 4, 4, 4, 8]);
  expect(film.cycleRank).toEqual([0, 0, 0, 0, 1, 1, 1, 1]);
  expect(merges).toEqual([3, 7, 8]);
});

describe("identity of a group", () => {
  // Source: methods C.11: "keeps the id of the larger part (tie: older)".
  it("stays with the larger part", () => {
    const groups = new UnionFind(5);
    groups.union(3, 4);
    const root = groups.root(3);
    expect(groups.union(0, 3)).toEqual({ merged: true, winner: root, loser: 0 });
    expect(groups.root(0)).toBe(root);
    expect(groups.oldest(4)).toBe(0);
  });

  it("of two equal parts stays with the one entered first, whatever the order of the ends", () => {
    for (const [a, b] of [
      [0, 3],
      [3, 0],
    ] as const) {
      const groups = new UnionFind(4);
      groups.union(0, 1);
      groups.union(2, 3);
      const [older, younger] = [groups.root(0), groups.root(2)];
      expect(groups.union(a, b)).toEqual({ merged: true, winner: older, loser: younger });
    }
  });

  it("does not change when a pair falls inside a group", () => {
    const groups = new UnionFind(3);
    groups.union(0, 1);
    const root = groups.root(0);
    expect(groups.union(1, 0)).toEqual({ merged: false, winner: root, loser: root });
    expect(groups.union(2, 2)).toEqual({ merged: false, winner: 2, loser: 2 });
    expect(groups.groups).toBe(2);
  });
});

it("grows person by person", () => {
  const groups = new UnionFind();
  expect([groups.length, groups.groups]).toEqual([0, 0]);
  for (let k = 0; k < 1000; k++) {
    expect(groups.add()).toBe(k);
    if (k > 0) groups.union(k - 1, k);
  }
  expect([groups.length, groups.groups, groups.size(500)]).toEqual([1000, 1, 1000]);
});

it("agrees with the components of the finished graph", () => {
  for (let seed = 1; seed <= 40; seed++) {
    const n = 30;
    const links = randomLinks(n, 0.04, seed);
    const groups = new UnionFind(n);
    for (const [a, b] of links) groups.union(a, b);
    const { component, sizes } = components(graphOf(n, links));
    expect(groups.groups).toBe(sizes.length);
    for (let u = 0; u < n; u++) {
      expect(groups.size(u)).toBe(sizes[component[u] ?? -1]);
      expect(groups.oldest(u)).toBe(component.indexOf(component[u] ?? -1));
    }
  }
});

it("refuses people it does not hold", () => {
  const groups = new UnionFind(2);
  expect(() => groups.root(2)).toThrow(RangeError);
  expect(() => groups.union(0, -1)).toThrow(RangeError);
  expect(() => groups.size(0.5)).toThrow(RangeError);
  expect(() => new UnionFind(-1)).toThrow(RangeError);
});
