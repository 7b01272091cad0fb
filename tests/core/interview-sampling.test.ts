import { describe, expect, it } from "vitest";
import {
  degreeCounts,
  doubleReports,
  equalRecallExcess,
  excessDegreeRatio,
  expectedObservation,
  sidedReports,
  twoLists,
  unseenPeople,
} from "../../shared/core/index.ts";
import { graphOf, seeded } from "./support/graphs.ts";
import { HAND_GRAPHS } from "./support/hand-graphs.ts";
import { karate } from "./support/published-networks.ts";

describe("what interviews are expected to show", () => {
  // [X] methods C.8.1: exact expectations, printed to 12 places.
  it.each([
    [1000, 5, 100, 1, 475.225225225225, 455.080779655, 2.088531295851, 5, 0.19009009009],
    [
      1000, 5, 100, 0.7, 337.86036036036, 366.3927716, 1.844252324545, 3.604054054054,
      0.135144144144,
    ],
    [1000, 2, 100, 1, 190.09009009009, 263.437646191, 1.443150535532, 2, 0.19009009009],
    [
      34,
      156 / 34,
      17,
      0.8,
      50.298181818,
      31.709823569,
      3.172403763691,
      4.026524064171,
      0.644848484848,
    ],
  ])("n %d, c %d, i %d, q %d", (n, c, i, q, pairs, people, naive, among, share) => {
    const got = expectedObservation({ n, p: c / (n - 1), interviewed: i, recall: q });
    expect(got.pairs).toBeCloseTo(pairs, 9);
    expect(got.people).toBeCloseTo(people, 9);
    expect(got.recordedMeanDegree.value).toBeCloseTo(naive, 11);
    expect(got.meanDegreeInterviewed.value).toBeCloseTo(among, 11);
    expect(got.shareOfPairs.value).toBeCloseTo(share, 11);
  });

  // [X] methods C.8.5: 100 of 1000 interviewed at random, true 0.5 → 0.66, 1 → 1.02, 5 → 2.09.
  it.each([
    [0.5, 0.66],
    [1, 1.02],
    [5, 2.09],
  ])("true %d shows as %d in the recorded graph", (c, shown) => {
    const design = { n: 1000, p: c / 999, interviewed: 100, recall: 1 };
    expect(expectedObservation(design).recordedMeanDegree.value).toBeCloseTo(shown, 2);
  });

  it("sees everything when everybody is asked and remembers", () => {
    const got = expectedObservation({ n: 50, p: 0.1, interviewed: 50, recall: 1 });
    expect(got).toMatchObject({ people: 50, shareOfPairs: { value: 1 } });
    expect(got.pairs).toBeCloseTo(122.5, 12);
  });

  it("says why a figure is undefined, and refuses impossible designs", () => {
    const none = expectedObservation({ n: 9, p: 0.5, interviewed: 0, recall: 1 });
    expect(none).toMatchObject({
      pairs: 0,
      people: 0,
      recordedMeanDegree: { value: null, reason: "no_people" },
      meanDegreeInterviewed: { value: null, reason: "no_one_interviewed" },
      shareOfPairs: { value: 0 },
    });
    const alone = expectedObservation({ n: 1, p: 0.5, interviewed: 1, recall: 1 });
    expect(alone.shareOfPairs.reason).toBe("no_pairs");
    expect(expectedObservation({ n: 3, p: 1, interviewed: 2, recall: 1 }).people).toBe(3);
    const good = { n: 9, p: 0.5, interviewed: 3, recall: 1 };
    for (const bad of [{ interviewed: 10 }, { p: 1.1 }, { recall: -1 }, { n: 2.5 }]) {
      expect(() => expectedObservation({ ...good, ...bad })).toThrow(RangeError);
    }
  });

  it("agrees with trying it out", () => {
    // [S] own simulation, tolerance 4 standard errors.
    const design = { n: 30, p: 0.15, interviewed: 8, recall: 0.6 };
    const next = seeded(7);
    const runs = 4000;
    const told: number[] = [];
    for (let run = 0; run < runs; run++) {
      let count = 0;
      for (let a = 0; a < 8; a++) {
        for (let b = a + 1; b < 30; b++) {
          const chances = b < 8 ? 2 : 1;
          if (next() >= design.p) continue;
          let named = false;
          for (let k = 0; k < chances; k++) if (next() < design.recall) named = true;
          if (named) count++;
        }
      }
      told.push(count);
    }
    const mean = told.reduce((a, b) => a + b) / runs;
    const spread = Math.sqrt(told.reduce((a, b) => a + (b - mean) ** 2, 0) / runs / runs);
    expect(Math.abs(mean - expectedObservation(design).pairs)).toBeLessThan(4 * spread);
  });
});

describe("double reports", () => {
  // [X] methods C.8.2.
  it.each([
    [6, 4, 0.75, 10.666666666667],
    [18, 12, 0.75, 32],
  ])("both %i, one %i", (both, one, q, pairs) => {
    const got = doubleReports(both, one);
    expect(got.recall.value).toBeCloseTo(q, 14);
    expect(got.pairs.value).toBeCloseTo(pairs, 11);
  });

  it("is undefined without a pair named by both", () => {
    const none = { value: null, reason: "no_double_reports" };
    expect(doubleReports(0, 5)).toEqual({ recall: none, pairs: none });
    expect(sidedReports(3, 4, 0)).toEqual({ recallFirst: none, recallSecond: none, pairs: none });
  });

  it("keeps the sides apart where they have roles", () => {
    // 0.8 and 0.3 of 1000 pairs, as expected counts: 800, 300, both 240.
    const sided = sidedReports(800, 300, 240);
    expect(sided).toMatchObject({
      recallFirst: { value: 0.8 },
      recallSecond: { value: 0.3 },
      pairs: { value: 1000 },
    });
    // [X] methods C.8.2: the form for equal recall is 26 % too high there.
    expect(equalRecallExcess(0.8, 0.3)).toBeCloseTo(1.2604166666667, 12);
    expect((doubleReports(240, 620).pairs.value ?? 0) / 1000).toBeCloseTo(1.2604166666667, 12);
    expect(equalRecallExcess(0.4, 0.4)).toBeCloseTo(1, 15);
  });

  it("refuses impossible counts", () => {
    expect(() => sidedReports(3, 4, 5)).toThrow(RangeError);
    expect(() => doubleReports(-1, 4)).toThrow(RangeError);
    expect(() => equalRecallExcess(0, 0.5)).toThrow(RangeError);
  });
});

describe("people not yet named", () => {
  const counts = { observed: 30, once: 12, twice: 6, interviews: null };

  it("gives the worked example", () => {
    // [X] estimates and variance, [L] interval: methods C.8.3.
    const got = unseenPeople(counts);
    expect(got.estimate).toBe(42);
    expect(got.corrected).toBeCloseTo(39.428571428571, 11);
    expect(got.variance).toBeCloseTo(84, 11);
    expect(got.standardError).toBeCloseTo(9.165151389912, 11);
    expect(got.interval?.[0]).toBeCloseTo(33.178057977212, 11);
    // The sheet prints 75.310690605980, a slip of digits: the lower limit it prints gives
    // 30 + 12²/3.178057977212, and so does mpmath with 30 digits.
    expect(got.interval?.[1]).toBeCloseTo(75.31069006058, 10);
  });

  it("multiplies what is added by (i − 1)/i for i interviews", () => {
    const got = unseenPeople({ ...counts, interviews: 10 });
    expect(got.estimate).toBeCloseTo(30 + 0.9 * 12, 12);
    expect(got.corrected).toBeCloseTo(30 + (0.9 * 132) / 14, 12);
    // [X] by hand: 6 (0.9·2 + 0.81·8 + 0.81·4) = 69.12.
    expect(got.variance).toBeCloseTo(69.12, 11);
    const [low = 0, high = 0] = got.interval ?? [];
    // The log interval is symmetric on the scale of what was not seen.
    expect((low - 30) * (high - 30)).toBeCloseTo(10.8 ** 2, 9);
    const many = unseenPeople({ ...counts, interviews: 1e9 });
    expect(many.variance).toBeCloseTo(84, 5);
  });

  it("gives no interval where there is none", () => {
    const bare = { variance: null, standardError: null, interval: null };
    expect(unseenPeople({ ...counts, twice: 0 })).toMatchObject({ estimate: 96, ...bare });
    expect(unseenPeople({ ...counts, once: 0 })).toMatchObject({ estimate: 30, ...bare });
    const nobody = { observed: 0, once: 0, twice: 0, interviews: 0 };
    expect(unseenPeople(nobody)).toMatchObject({ estimate: 0, corrected: 0, ...bare });
    // One interview says nothing about who else could be named.
    const single = { observed: 4, once: 4, twice: 0, interviews: 1 };
    expect(unseenPeople(single)).toMatchObject({ estimate: 4, corrected: 4, ...bare });
  });

  it.each([
    { observed: 3, once: 2, twice: 2, interviews: 5 },
    { observed: 3, once: 2, twice: 1, interviews: 1 },
    { observed: 3, once: 3, twice: 0, interviews: 0 },
    { observed: -1, once: 0, twice: 0, interviews: null },
  ])("refuses impossible counts %#", (bad) => {
    expect(() => unseenPeople(bad)).toThrow(RangeError);
  });
});

describe("two lists", () => {
  it("gives the worked example", () => {
    // [X] methods C.8.3.
    const got = twoLists(40, 30, 12);
    expect(got.lincolnPetersen.value).toBe(100);
    expect(got.chapman).toBeCloseTo(96.769230769231, 11);
    expect(got.variance).toBeCloseTo(270.745562130178, 10);
  });

  it("is undefined without overlap, where Chapman still stands", () => {
    expect(twoLists(4, 3, 0)).toMatchObject({
      lincolnPetersen: { value: null, reason: "no_overlap" },
      chapman: 19,
    });
    expect(() => twoLists(4, 3, 4)).toThrow(RangeError);
  });

  it("has Chapman unbiased whenever the lists together can cover everyone", () => {
    // [X] enumeration of all lists of 4 and 5 out of 7 people: mean of the estimate is exactly 7.
    const choose = (n: number, k: number): number => (k === 0 ? 1 : (choose(n - 1, k - 1) * n) / k);
    let mean = 0;
    for (let both = 2; both <= 4; both++) {
      const chance = (choose(4, both) * choose(3, 5 - both)) / choose(7, 5);
      mean += chance * twoLists(4, 5, both).chapman;
    }
    expect(mean).toBeCloseTo(7, 12);
  });
});

describe("friendship paradox", () => {
  it("gives the published network", () => {
    // [L] methods C.8.4: karate 7.769230769231 against a mean of 4.588235294118.
    const { n, links } = karate();
    expect(excessDegreeRatio(degreeCounts(graphOf(n, links))).value).toBeCloseTo(
      7.769230769231,
      11,
    );
  });

  it.each(HAND_GRAPHS)("$name", ({ n, links, c, sumOfSquares }) => {
    // [X] methods D.3.
    const got = excessDegreeRatio(degreeCounts(graphOf(n, links))).value ?? 0;
    expect(got).toBeCloseTo(sumOfSquares / n / c, 13);
    expect(got).toBeGreaterThanOrEqual(c - 1e-12);
  });

  it("is undefined without a pair", () => {
    expect(excessDegreeRatio(degreeCounts(graphOf(3, [])))).toEqual({
      value: null,
      reason: "no_pairs",
    });
  });
});
