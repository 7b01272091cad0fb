import { describe, expect, it } from "vitest";
import { GraphStore, NAMED_BY } from "../../server/analysis/graph-store.ts";
import { LiveGroups } from "../../server/analysis/live-groups.ts";
import { MISSING_DAY } from "../../shared/core/index.ts";

const NEVER = Number.POSITIVE_INFINITY;

/** A store of so many people, entered in order; ids are `p0`, `p1`, … */
function storeOf(people: number): GraphStore {
  const store = new GraphStore();
  for (let k = 0; k < people; k++) {
    store.putPerson(`p${k}`, `S${k}`, {
      recordedAt: k,
      withdrawnAt: NEVER,
      classification: 0,
      interviewedAnswer: 0,
      becameCase: 0,
    });
  }
  return store;
}

/** One step that adds or withdraws pairs. */
function step(
  store: GraphStore,
  groups: LiveGroups,
  links: readonly (readonly [number, number])[],
  withdrawnAt = NEVER,
): void {
  const pairs = links.map(([u, v]) => {
    const pair = store.pairs.findOrAdd(u, v);
    const days = { firstDay: MISSING_DAY, lastDay: MISSING_DAY };
    const row = { pair, namedBy: NAMED_BY.unknown, ...days, recordedAt: 1000, withdrawnAt };
    store.exposures.replace(pair, [row]);
    return pair;
  });
  groups.apply({ people: new Set(), pairs: new Set(pairs) });
}

const shapes = (groups: LiveGroups) => groups.list().map(({ id, size }) => `${id} ${size}`);

describe("live groups", () => {
  it("follows one link per step as the method's table says", async () => {
    // methods C.11: components 7 6 5 4 4 3 2 1, largest 2 2 4 4 4 4 4 8
    const store = storeOf(8);
    const groups = await LiveGroups.read(store, -1);
    const links = [
      [0, 1],
      [2, 3],
      [1, 2],
      [4, 5],
      [0, 3],
      [6, 7],
      [5, 6],
      [3, 4],
    ] as const;
    const found = links.map((link) => {
      step(store, groups, [link]);
      const list = groups.list();
      const inGroups = list.reduce((sum, { size }) => sum + size, 0);
      return [list.length + 8 - inGroups, list[0]?.size];
    });
    expect(found.map(([count]) => count)).toEqual([7, 6, 5, 4, 4, 3, 2, 1]);
    expect(found.map(([, largest]) => largest)).toEqual([2, 2, 4, 4, 4, 4, 4, 8]);
    expect(shapes(groups)).toEqual(["p0 8"]);
  });

  it("keeps the id of the larger part, of equal parts the older one's", async () => {
    const store = storeOf(9);
    const groups = await LiveGroups.read(store, -1);
    step(store, groups, [[0, 1]]);
    step(store, groups, [
      [2, 3],
      [3, 4],
    ]);
    expect(shapes(groups)).toEqual(["p2 3", "p0 2"]);
    step(store, groups, [[1, 2]]);
    expect(shapes(groups)).toEqual(["p2 5"]);
    step(store, groups, [[5, 6]]);
    step(store, groups, [[7, 8]]);
    step(store, groups, [[8, 5]]);
    expect(shapes(groups)).toEqual(["p2 5", "p5 4"]);
  });

  it("does not depend on the order of pairs inside a step", async () => {
    const links = [
      [0, 1],
      [5, 1],
      [4, 5],
      [2, 3],
      [3, 4],
    ] as const;
    for (const order of [links, links.toReversed()]) {
      const store = storeOf(6);
      const groups = await LiveGroups.read(store, -1);
      step(store, groups, [[4, 5]]);
      step(store, groups, order);
      expect(shapes(groups)).toEqual(["p4 6"]);
    }
  });

  it("gives no id twice when a founder leaves and founds again", async () => {
    const store = storeOf(6);
    const groups = await LiveGroups.read(store, -1);
    step(store, groups, [
      [0, 1],
      [1, 2],
    ]);
    step(store, groups, [[0, 1]], 2000);
    expect(shapes(groups)).toEqual(["p0 2"]);
    step(store, groups, [[0, 5]]);
    expect(shapes(groups).sort()).toEqual(["p0 2", "p5 2"]);
    step(store, groups, [[1, 2]], 3000);
    expect(shapes(groups)).toEqual(["p5 2"]);
  });

  it("splits nothing while another way round holds a group together", async () => {
    const store = storeOf(4);
    const groups = await LiveGroups.read(store, -1);
    step(store, groups, [
      [0, 1],
      [1, 2],
      [2, 0],
      [2, 3],
    ]);
    step(store, groups, [[0, 1]], 2000);
    expect(shapes(groups)).toEqual(["p0 4"]);
    for (let turn = 0; turn < 200; turn++) {
      step(store, groups, [[2, 3]], 2000);
      step(store, groups, [[2, 3]]);
    }
    expect(shapes(groups)).toEqual(["p0 4"]);
  });
});
