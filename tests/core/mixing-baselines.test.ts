import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { createStream, householdSampler, mixingSampler } from "../../shared/core/index.ts";
import { endsOf, type Links, linksOf, randomLinks } from "./support/graphs.ts";
import { chiLimit, chiSquared, everyGraph, keyOf, tally } from "./support/null-models.ts";

/** Pairs inside and between classes as one text. */
function mixingOf(ends: { a: Int32Array; b: Int32Array; length: number }, classOf: Int32Array) {
  const counts = new Map<string, number>();
  for (let k = 0; k < ends.length; k++) {
    const x = classOf[ends.a[k] ?? -1] ?? -1;
    const y = classOf[ends.b[k] ?? -1] ?? -1;
    const key = `${Math.min(x, y)}/${Math.max(x, y)}`;
    counts.set(key, (counts.get(key) ?? 0) + 1);
  }
  return [...counts].sort().join(" ");
}

const withLength = (links: Links) => ({ ...endsOf(links), length: links.length });

describe("mixing-preserving baseline", () => {
  it("keeps the number of pairs of each two classes exactly", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 25 }),
        fc.integer({ min: 1, max: 4 }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.nat(1000),
        (n, classes, p, seed) => {
          const links = randomLinks(n, p, seed);
          const classOf = Int32Array.from(
            { length: n },
            (_, u) => (u * 7 + seed) % Math.min(classes, n),
          );
          const sampler = mixingSampler(endsOf(links), links.length, classOf);
          for (let i = 0; i < 3; i++) {
            const drawn = sampler.sample(createStream(seed, i));
            expect(mixingOf(drawn, classOf)).toBe(mixingOf(withLength(links), classOf));
            expect(new Set(keyOf(drawn).split(" ")).size).toBe(Math.max(1, links.length));
          }
        },
      ),
      { seed: 20261201, numRuns: 60 },
    );
  });

  it("draws every graph with these counts alike", () => {
    // Enumeration (exact): 2 of 3 pairs inside {0,1,2}, 4 of 6 across, 1 of 1 inside {3,4}.
    const classOf = Int32Array.of(0, 0, 0, 1, 1);
    const links = linksOf("01 02 03 14 13 24 34");
    const wanted = mixingOf(withLength(links), classOf);
    const graphs = [...everyGraph(5)].filter((g) => mixingOf(withLength(g), classOf) === wanted);
    expect(graphs.length).toBe(3 * 15 * 1);
    const counts = tally(mixingSampler(endsOf(links), links.length, classOf), 6000, 51);
    expect(counts.size).toBe(graphs.length);
    expect(chiSquared(counts, graphs.length)).toBeLessThan(chiLimit(graphs.length - 1));
  });

  it("with one class is G(n,m)", () => {
    const links = linksOf("01 12 23");
    const counts = tally(mixingSampler(endsOf(links), 3, new Int32Array(4)), 4000, 52);
    expect(counts.size).toBe(20);
    expect(chiSquared(counts, 20)).toBeLessThan(chiLimit(19));
  });

  it("refuses missing classes and pairs that are none", () => {
    const two = Int32Array.of(0, -1);
    expect(() => mixingSampler(endsOf([[0, 1]]), 1, two)).toThrow(/classes/);
    expect(() => mixingSampler(endsOf([[0, 0]]), 1, new Int32Array(2))).toThrow(RangeError);
    expect(() =>
      mixingSampler(
        endsOf([
          [0, 1],
          [1, 0],
        ]),
        2,
        new Int32Array(2),
      ),
    ).toThrow(/twice/);
    expect(() => mixingSampler(endsOf([[0, 5]]), 1, new Int32Array(2))).toThrow(/nobody/);
    expect(() => mixingSampler(endsOf([]), 0, Int32Array.of(0, 9))).toThrow(/gaps/);
  });
});

describe("household baseline", () => {
  const inside = ({ a, b, length }: ReturnType<typeof withLength>, householdOf: Int32Array) => {
    let count = 0;
    for (let k = 0; k < length; k++) {
      const home = householdOf[a[k] ?? -1] ?? -1;
      if (home >= 0 && home === householdOf[b[k] ?? -1]) count++;
    }
    return count;
  };

  it("draws every graph with these two counts alike", () => {
    // Enumeration (exact): households {0,3,4} and {1,2}, person 5 alone: 4 inside pairs, 11 others.
    const householdOf = Int32Array.of(7, 2, 2, 7, 7, -1);
    const links = linksOf("03 12 05 14");
    const graphs = [...everyGraph(6)].filter(
      (g) => g.length === 4 && inside(withLength(g), householdOf) === 2,
    );
    expect(graphs.length).toBe(6 * 55);
    const counts = tally(householdSampler(endsOf(links), 4, householdOf), 14_000, 53);
    expect(counts.size).toBe(graphs.length);
    expect(chiSquared(counts, graphs.length)).toBeLessThan(chiLimit(graphs.length - 1));
  });

  it("keeps both counts on random networks, nearly full ones too", () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 20 }), fc.nat(10), fc.nat(1000), (n, tenths, seed) => {
        const links = randomLinks(n, tenths / 10, seed);
        const householdOf = Int32Array.from({ length: n }, (_, u) =>
          u % 5 === 4 ? -1 : (u * 3) % 4,
        );
        const sampler = householdSampler(endsOf(links), links.length, householdOf);
        const drawn = sampler.sample(createStream(seed, 0));
        expect(drawn.length).toBe(links.length);
        expect(inside(drawn, householdOf)).toBe(inside(withLength(links), householdOf));
        if (links.length > 0) expect(new Set(keyOf(drawn).split(" ")).size).toBe(links.length);
      }),
      { seed: 20261202, numRuns: 80 },
    );
  });
});
