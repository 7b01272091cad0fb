import type { RandomStream } from "../random/random-stream.ts";
import { PairSet } from "./pair-set.ts";
import { checkPeople, PairBuffer, type SampledNetwork, type Sampler } from "./sampled-network.ts";

/**
 * G(n,m): every graph on n people with exactly m pairs is equally likely. Only the arrangement of
 * the pairs is left to chance, which is what a comparison with an observed network needs.
 *
 * Up to half of the N possible pairs are drawn with a set that turns repeats away; beyond, the
 * absent pairs are drawn and all others are listed. Two ends are drawn instead of a pair index, so
 * nothing overflows with a million people.
 *
 * @param n people
 * @param m pairs, 0 … n(n − 1)/2
 * @throws RangeError for m above the number of possible pairs
 *
 * Cost: O(m) a draw for m <= N/2, else O(N). Source: Erdős & Rényi 1959; methods C.1.1, C.7.2.
 */
export function gnmSampler(n: number, m: number): Sampler {
  checkPeople(n);
  const possible = (n * (n - 1)) / 2;
  if (!Number.isSafeInteger(m) || m < 0) throw new RangeError("m must be a whole number >= 0");
  if (m > possible) throw new RangeError(`m must not exceed the ${possible} possible pairs`);
  const sparse = m <= possible / 2;
  const drawn = sparse ? m : possible - m;
  const pairs = new PairBuffer(Math.max(m, drawn));
  const set = new PairSet(drawn);

  return {
    sample(random: RandomStream): SampledNetwork {
      set.clear();
      const { a, b } = pairs;
      let length = 0;
      // In rounds: as many as are missing are drawn, then repeats dropped. Two plain loops run
      // twice as fast as one that draws and looks up by turns, and the outcome is the same.
      while (length < drawn) {
        random.fillBelow(n, a, length, drawn);
        random.fillBelow(n, b, length, drawn);
        for (let k = length; k < drawn; k++) {
          const u = a[k]!;
          const v = b[k]!;
          if (u === v || !set.add(u, v)) continue;
          a[length] = u;
          b[length++] = v;
        }
      }
      if (!sparse) {
        length = 0;
        for (let v = 1; v < n; v++) {
          for (let u = 0; u < v; u++) {
            if (set.has(u, v)) continue;
            a[length] = u;
            b[length++] = v;
          }
        }
      }
      return { people: n, a, b, length, isInterviewed: null };
    },
  };
}
