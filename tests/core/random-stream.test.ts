import { describe, expect, it } from "vitest";
import { createStream, Xoshiro } from "../../shared/core/index.ts";

describe("xoshiro128++", () => {
  it("gives the words of its published recurrence", () => {
    // Blackman and Vigna 2021; the words were computed for state 1, 2, 3, 4 with a program of a few
    // lines in another language (Python integers), written from the published recurrence.
    const stream = new Xoshiro([1, 2, 3, 4]);
    const words = Array.from({ length: 8 }, () => stream.word());
    expect(words).toEqual([
      641, 1573767, 3222811527, 3517856514, 836907274, 4247214768, 3867114732, 1355841295,
    ]);
  });
});

describe("createStream", () => {
  it("gives the same numbers for the same seed and stream, others for others", () => {
    const first = (seed: number, stream: number) => {
      const one = createStream(seed, stream);
      return Array.from({ length: 4 }, () => one.next()).join();
    };
    expect(first(1, 0)).toBe(first(1, 0));
    const seen = new Set<string>();
    for (const seed of [0, 1, 2, 2 ** 32, 2 ** 32 + 1, 2 ** 53 - 1]) {
      for (let stream = 0; stream < 200; stream++) seen.add(first(seed, stream));
    }
    expect(seen.size).toBe(6 * 200);
  });

  it("fills [0, 1) evenly, also over the first numbers of many streams", () => {
    // 10 bins, 20,000 draws: chi-squared with 9 degrees of freedom, 0.9999 quantile 33.7 (memory).
    const chi = (draw: (at: number) => number) => {
      const bins = new Array(10).fill(0);
      for (let at = 0; at < 20_000; at++) bins[Math.floor(draw(at) * 10)]++;
      return bins.reduce((sum, count) => sum + (count - 2000) ** 2 / 2000, 0);
    };
    const one = createStream(20261201, 0);
    expect(chi(() => one.next())).toBeLessThan(33.7);
    expect(chi((at) => createStream(7, at).next())).toBeLessThan(33.7);
    expect(chi((at) => createStream(at, 7).next())).toBeLessThan(33.7);
  });

  it("draws whole numbers below n evenly, small and large", () => {
    for (const n of [1, 2, 3, 7, 1000, 2 ** 21, 2 ** 21 + 1, 2 ** 32 + 5, 2 ** 53]) {
      const stream = createStream(3, n % 1000);
      const bins = [0, 0, 0];
      for (let at = 0; at < 6000; at++) {
        const drawn = stream.below(n);
        const third = Math.floor((drawn / n) * 3);
        if (!Number.isSafeInteger(drawn) || drawn < 0 || drawn >= n)
          throw new Error(`drew ${drawn}`);
        bins[third] = (bins[third] ?? 0) + 1;
      }
      // Thirds hold shares of the whole numbers that follow from n; 5 SE of 6000 draws are 183.
      const held = [0, 1, 2].map((third) =>
        n > 1000 ? 2000 : (6000 * countInThird(n, third)) / n,
      );
      for (const third of [0, 1, 2]) {
        expect(Math.abs((bins[third] ?? 0) - (held[third] ?? 0))).toBeLessThan(183);
      }
    }
  });

  it("fills arrays with what single draws give", () => {
    for (const n of [1, 2, 7, 10_000, 2 ** 21, 2 ** 21 + 1, 2 ** 31]) {
      const one = createStream(4, n % 997);
      const many = createStream(4, n % 997);
      const out = new Int32Array(500);
      many.fillBelow(n, out, 100, 400);
      const wanted = Array.from({ length: 300 }, () => one.below(n));
      expect([...out.subarray(100, 400)]).toEqual(wanted);
      expect([out[99], out[400]]).toEqual([0, 0]);
      expect(many.next()).toBe(one.next());
    }
  });

  it("refuses a seed or a stream that is no whole number in range", () => {
    for (const [seed, stream] of [
      [-1, 0],
      [0.5, 0],
      [2 ** 53, 0],
      [0, -1],
      [0, 2 ** 32],
      [Number.NaN, 0],
    ]) {
      expect(() => createStream(seed ?? 0, stream ?? 0)).toThrow(RangeError);
    }
  });
});

function countInThird(n: number, third: number): number {
  let count = 0;
  for (let k = 0; k < n; k++) if (Math.floor((k / n) * 3) === third) count++;
  return count;
}
