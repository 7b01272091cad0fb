import type { RandomStream } from "../random/random-stream.ts";
import { checkPeople, PairBuffer, type SampledNetwork, type Sampler } from "./sampled-network.ts";

/**
 * G(n,p): each pair of n people independently with probability p, in time proportional to the
 * pairs that fall, by jumping over the pairs that do not (their number is geometric).
 *
 * Pairs come as (higher, lower) in the order (1,0) (2,0) (2,1) (3,0) … p = 0 and p = 1 are told
 * apart: the jump divides by ln(1 − p).
 *
 * @param n people
 * @param p probability of a pair, 0 … 1
 * @throws RangeError for anything else
 *
 * Cost: O(n + pairs) a draw. Source: Batagelj & Brandes 2005, *Efficient generation of large random
 * networks*; Gilbert 1959; methods C.7.1.
 */
export function gnpSampler(n: number, p: number): Sampler {
  checkPeople(n);
  if (!(p >= 0 && p <= 1)) throw new RangeError("p must lie between 0 and 1");
  const expected = ((n * (n - 1)) / 2) * p;
  const pairs = new PairBuffer(Math.ceil(expected + 5 * Math.sqrt(expected)));
  const scale = Math.log1p(-p);

  return {
    sample(random: RandomStream): SampledNetwork {
      pairs.length = 0;
      if (p === 1) {
        for (let v = 1; v < n; v++) for (let w = 0; w < v; w++) pairs.push(v, w);
      } else if (p > 0) {
        let v = 1;
        let w = -1;
        while (v < n) {
          w += 1 + Math.floor(Math.log(1 - random.next()) / scale);
          while (w >= v && v < n) {
            w -= v;
            v++;
          }
          if (v < n) pairs.push(v, w);
        }
      }
      return { people: n, a: pairs.a, b: pairs.b, length: pairs.length, isInterviewed: null };
    },
  };
}
