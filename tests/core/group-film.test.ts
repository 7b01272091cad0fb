import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  components,
  type ExposureTable,
  exposureFilter,
  groupFilm,
  LivingGroups,
  MISSING_DAY,
  type PairSpans,
  spansAsItHappened,
  spansAsWeKnewIt,
} from "../../shared/core/index.ts";
import { graphOf, type Links, linksOf } from "./support/graphs.ts";

type Span = readonly [a: number, b: number, from: number, until?: number];

const spansOf = (rows: readonly Span[]): PairSpans => ({
  a: Int32Array.from(rows, ([a]) => a),
  b: Int32Array.from(rows, ([, b]) => b),
  from: Float64Array.from(rows, ([, , from]) => from),
  until: Float64Array.from(rows, ([, , , until = Number.POSITIVE_INFINITY]) => until),
});
const film = (n: number, rows: readonly Span[], frames: readonly number[], enteredAt?: number[]) =>
  groupFilm({
    n,
    spans: spansOf(rows),
    frames: Float64Array.from(frames),
    enteredAt: enteredAt ? Float64Array.from(enteredAt) : null,
  });

describe("groups over time", () => {
  const steps = linksOf("01 23 12 45 03 67 56 34").map(([a, b], k) => [a, b, k + 1] as const);
  const eight = [1, 2, 3, 4, 5, 6, 7, 8];

  it("follows eight people, one pair a step", () => {
    // [X] methods C.11.
    const { frames } = film(8, steps, eight);
    expect(frames.map((frame) => frame.groups)).toEqual([7, 6, 5, 4, 4, 3, 2, 1]);
    expect(frames.map((frame) => frame.largest)).toEqual([2, 2, 4, 4, 4, 4, 4, 8]);
    expect(frames.map((frame) => frame.cycleRank)).toEqual([0, 0, 0, 0, 1, 1, 1, 1]);
    expect(frames.filter((frame) => frame.merges > 0).map((frame) => frame.at)).toEqual([3, 7, 8]);
    expect(frames.map((frame) => frame.births)).toEqual([1, 1, 0, 1, 0, 1, 0, 0]);
    expect(frames.every((frame) => frame.joins === 0 && frame.people === 8)).toBe(true);
  });

  it("says which group goes on: of equal parts the older one", () => {
    const { frames, groupIds } = film(8, steps, eight);
    expect(frames[2]?.events).toEqual([
      { kind: "merge", group: 0, other: 2, size: 4, otherSize: 2 },
    ]);
    expect(frames[7]?.events).toEqual([
      { kind: "merge", group: 0, other: 4, size: 8, otherSize: 4 },
    ]);
    expect(Array.from(groupIds)).toEqual([0, 0, 0, 0, 0, 0, 0, 0]);
  });

  it("lets the larger part keep its identity, however young", () => {
    // The pair 0–1 is older; the three around 2 are more.
    const rows: Span[] = [
      [0, 1, 1],
      [2, 3, 2],
      [3, 4, 3],
      [1, 2, 4],
    ];
    const { frames, groupIds } = film(5, rows, [3, 4]);
    expect(frames[0]).toMatchObject({ births: 2, joins: 1, merges: 0 });
    expect(frames[1]?.events).toEqual([
      { kind: "merge", group: 2, other: 0, size: 5, otherSize: 2 },
    ]);
    expect(Array.from(groupIds)).toEqual([2, 2, 2, 2, 2]);
  });

  it("counts a new person as a group of their own, no later than their first pair", () => {
    const { frames, groupIds } = film(4, [[0, 1, 5]], [0, 1, 5, 9], [1, 7, 9, 20]);
    expect(frames.map((frame) => [frame.people, frame.groups, frame.largest])).toEqual([
      [0, 0, 0],
      [1, 1, 1],
      [2, 1, 2],
      [3, 2, 2],
    ]);
    expect(Array.from(groupIds)).toEqual([0, 0, 2, -1]);
  });

  it("lets a withdrawal split a group: the largest part goes on, the other is new", () => {
    const rows: Span[] = [
      [0, 1, 1],
      [1, 2, 1],
      [2, 3, 1, 5],
      [3, 4, 1],
    ];
    const { frames, groupIds } = film(5, rows, [1, 5]);
    expect(frames[1]).toMatchObject({ groups: 2, largest: 3, pairs: 3, splits: 1, cycleRank: 0 });
    expect(frames[1]?.events).toEqual([
      { kind: "split", group: 0, other: 5, size: 3, otherSize: 2 },
    ]);
    expect(Array.from(groupIds)).toEqual([0, 0, 0, 5, 5]);
  });

  it("ends a group of which only single people are left, and it may begin again", () => {
    const rows: Span[] = [
      [0, 1, 1, 2],
      [0, 1, 3],
    ];
    const { frames } = film(2, rows, [1, 2, 3]);
    expect(frames.map(({ births, ends, largest }) => [births, ends, largest])).toEqual([
      [1, 0, 2],
      [0, 1, 1],
      [1, 0, 2],
    ]);
  });

  it("never shows a pair that came and went between two frames", () => {
    expect(film(2, [[0, 1, 2, 4]], [1, 5]).frames[1]).toMatchObject({ pairs: 0, births: 0 });
  });

  it("has frames of a later cut-off unchanged by what comes after", () => {
    const { frames } = film(8, steps, [3]);
    expect(film(8, steps, [3, 8]).frames[0]).toEqual(frames[0]);
  });

  it("agrees with components of what stands at each frame", () => {
    const n = 9;
    const person = fc.integer({ min: 0, max: n - 1 });
    const span = fc
      .tuple(person, person, fc.integer({ min: 0, max: 12 }), fc.integer({ min: 1, max: 9 }))
      .filter(([a, b]) => a < b);
    const distinct = fc.uniqueArray(span, { selector: ([a, b]) => a * n + b, maxLength: 20 });
    fc.assert(
      fc.property(distinct, (rows) => {
        const spans = rows.map(([a, b, from, lasts]) => {
          return [a, b, from, lasts > 6 ? Number.POSITIVE_INFINITY : from + lasts] as const;
        });
        const at = [0, 2, 3, 7, 11, 15];
        const { frames, groupIds } = film(n, spans, at);
        for (const frame of frames) {
          const links: Links = spans
            .filter(([, , from, until]) => from <= frame.at && until > frame.at)
            .map(([a, b]) => [a, b] as const);
          const { sizes, component } = components(graphOf(n, links));
          expect(frame).toMatchObject({
            groups: sizes.length,
            largest: sizes[0],
            pairs: links.length,
            cycleRank: links.length - n + sizes.length,
          });
          if (frame.at !== 15) continue;
          for (let u = 0; u < n; u++) {
            for (let v = 0; v < n; v++) {
              expect(groupIds[u] === groupIds[v]).toBe(component[u] === component[v]);
            }
          }
        }
      }),
      { seed: 20260301, numRuns: 150 },
    );
  });

  it("keeps groups = groups before + births undone and done, over any film without withdrawals", () => {
    const person = fc.integer({ min: 0, max: 11 });
    const pair = fc.tuple(person, person).filter(([a, b]) => a !== b);
    fc.assert(
      fc.property(fc.array(pair, { maxLength: 25 }), (pairs) => {
        const rows = pairs.map(([a, b], k) => [a, b, k] as const);
        let groups = 12;
        for (const frame of film(12, rows, [4, 9, 25]).frames) {
          groups -= frame.births + frame.joins + frame.merges;
          expect(frame.groups).toBe(groups);
        }
      }),
      { seed: 20260301, numRuns: 150 },
    );
  });

  it("refuses spans and frames that make no sense, and is empty without frames", () => {
    expect(() => film(2, [[0, 2, 1]], [1])).toThrow(RangeError);
    expect(() => film(2, [[0, 0, 1]], [1])).toThrow(RangeError);
    expect(() => film(2, [[0, 1, 3, 3]], [1])).toThrow(RangeError);
    expect(() => film(2, [], [1, 1])).toThrow(RangeError);
    expect(() => film(2, [], [Number.NaN])).toThrow(RangeError);
    expect(() => film(2, [], [1], [1])).toThrow(RangeError);
    expect(film(2, [[0, 1, 1]], []).frames).toEqual([]);
    expect(film(0, [], [1]).frames[0]).toMatchObject({ people: 0, groups: 0, largest: 0 });
  });

  it("gives groups that split off ids nobody had", () => {
    const groups = new LivingGroups(100);
    for (const id of [7, 9, 11]) groups.enter(id);
    expect(groups.join(0, 2)).toMatchObject({ kind: "birth", group: 7 });
    expect(groups.rebuild(new Int32Array(0), new Int32Array(0), 0)).toMatchObject([
      { kind: "end", group: 7 },
    ]);
    expect([0, 1, 2].map((place) => groups.idOf(place))).toEqual([7, 9, 100]);
  });
});

describe("the two clocks", () => {
  // Pairs 0–1 (told twice) and 1–2 (undated), 0–2 (withdrawn, told again).
  const table: ExposureTable = {
    pairA: Int32Array.of(0, 1, 0),
    pairB: Int32Array.of(1, 2, 2),
    pair: Int32Array.of(0, 0, 1, 2, 2),
    firstDay: Int32Array.of(20, 18, MISSING_DAY, 10, MISSING_DAY),
    lastDay: Int32Array.of(21, MISSING_DAY, MISSING_DAY, 12, 11),
    recordedAt: Float64Array.of(1000, 2000, 1500, 1200, 3000),
    withdrawnAt: Float64Array.of(2500, Number.NaN, Number.POSITIVE_INFINITY, 1800, Number.NaN),
  };

  it("as it happened: the first day of each pair by the record of an instant", () => {
    const { spans, undated } = spansAsItHappened(table, null);
    expect([Array.from(spans.a), Array.from(spans.b), Array.from(spans.from)]).toEqual([
      [0, 0],
      [1, 2],
      [18, 11],
    ]);
    expect(undated).toBe(1);
    const early = spansAsItHappened(table, 1300);
    expect(Array.from(early.spans.from)).toEqual([20, 10]);
    expect(early.undated).toBe(0);
  });

  it("as we knew it: from entry to withdrawal, without a gap while another telling stands", () => {
    const spans = spansAsWeKnewIt(table);
    const rows = Array.from(spans.a, (a, k) => [a, spans.b[k], spans.from[k], spans.until[k]]);
    expect(rows).toEqual([
      [0, 1, 1000, Number.POSITIVE_INFINITY],
      [1, 2, 1500, Number.POSITIVE_INFINITY],
      [0, 2, 1200, 1800],
      [0, 2, 3000, Number.POSITIVE_INFINITY],
    ]);
  });

  it("shows at every instant what the filter says was on record", () => {
    const at = [500, 1000, 1200, 1799, 1800, 2500, 3000];
    const { frames } = groupFilm({
      n: 3,
      enteredAt: null,
      spans: spansAsWeKnewIt(table),
      frames: Float64Array.from(at),
    });
    const onRecord = at.map(
      (asOf) => exposureFilter(table, { from: null, to: null, asOf }).a.length,
    );
    expect(frames.map((frame) => frame.pairs)).toEqual(onRecord);
  });
});
