import type { PairEnds } from "../graph/build-graph.ts";
import type { RandomStream } from "../random/random-stream.ts";
import { pairAt } from "./pair-at.ts";
import { PairSet } from "./pair-set.ts";
import { type PairSpace, placePairs } from "./pair-space.ts";
import { checkPeople, PairBuffer, type SampledNetwork, type Sampler } from "./sampled-network.ts";

/** People in the order of their households; those without one make a household of their own. */
type Households = {
  readonly order: Int32Array;
  /** First place of each household in `order`, and one entry more. */
  readonly starts: Int32Array;
};

function arrange(householdOf: Int32Array): Households {
  const n = householdOf.length;
  const order = Int32Array.from({ length: n }, (_, u) => u).sort(
    (u, v) => householdOf[u]! - householdOf[v]! || u - v,
  );
  const starts: number[] = [];
  for (let at = 0; at < n; at++) {
    const household = householdOf[order[at]!]!;
    const before = at === 0 ? -1 : householdOf[order[at - 1]!]!;
    if (household < 0 || household !== before) starts.push(at);
  }
  return { order, starts: Int32Array.from([...starts, n]) };
}

/** Last place h with sums[h] <= index. */
function placeOf(sums: Float64Array, index: number): number {
  let low = 0;
  let high = sums.length - 1;
  while (low < high - 1) {
    const middle = (low + high) >>> 1;
    if (sums[middle]! <= index) low = middle;
    else high = middle;
  }
  return low;
}

/** The pairs of which both ends live in one household, or of which they do not. */
function householdSpace({ order, starts }: Households, inside: boolean): PairSpace {
  const households = starts.length - 1;
  const n = order.length;
  const sums = new Float64Array(households + 1);
  for (let h = 0; h < households; h++) {
    const size = starts[h + 1]! - starts[h]!;
    const pairs = inside ? (size * (size - 1)) / 2 : size * (n - starts[h + 1]!);
    sums[h + 1] = sums[h]! + pairs;
  }
  return {
    total: sums[households]!,
    draw(random, out) {
      const index = random.below(sums[households]!);
      const h = placeOf(sums, index);
      const start = starts[h]!;
      const end = starts[h + 1]!;
      const rest = index - sums[h]!;
      if (inside) {
        pairAt(rest, out);
        out[0] = order[start + out[0]]!;
        out[1] = order[start + out[1]]!;
      } else {
        const after = n - end;
        const row = Math.floor(rest / after);
        out[0] = order[start + row]!;
        out[1] = order[end + (rest - row * after)]!;
      }
    },
    each(visit) {
      for (let h = 0; h < households; h++) {
        const end = starts[h + 1]!;
        for (let i = starts[h]!; i < end; i++) {
          const last = inside ? end : n;
          for (let j = inside ? i + 1 : end; j < last; j++) visit(order[i]!, order[j]!);
        }
      }
    },
  };
}

/**
 * Random graphs that keep how many pairs live in one household and how many do not: both numbers
 * are those of the observed network, and within them every graph is equally likely. The special
 * case of a mixing-preserving baseline with two kinds of pairs instead of one for each two classes.
 *
 * @param ends distinct pairs of the observed network
 * @param length pairs to use
 * @param householdOf household of each person, any whole number >= 0; −1 = lives with nobody on
 *   record
 * @throws RangeError for an end outside the people, a self pair or a repeated pair
 *
 * Cost: O(n + m·log households) a draw. Source: as `mixingSampler`.
 */
export function householdSampler(ends: PairEnds, length: number, householdOf: Int32Array): Sampler {
  const n = householdOf.length;
  checkPeople(n);
  const seen = new PairSet(length);
  let within = 0;
  for (let k = 0; k < length; k++) {
    const u = ends.a[k]!;
    const v = ends.b[k]!;
    if (!(u >= 0 && u < n && v >= 0 && v < n)) throw new RangeError(`pair ${k} names nobody`);
    if (u === v || !seen.add(u, v)) throw new RangeError(`pair ${k} is no pair or there twice`);
    if (householdOf[u]! >= 0 && householdOf[u] === householdOf[v]) within++;
  }
  const households = arrange(householdOf);
  const inside = householdSpace(households, true);
  const outside = householdSpace(households, false);
  const set = new PairSet(length);
  const pairs = new PairBuffer(length);
  return {
    sample(random: RandomStream): SampledNetwork {
      set.clear();
      pairs.length = 0;
      placePairs(inside, within, random, set, pairs);
      placePairs(outside, length - within, random, set, pairs);
      return { people: n, a: pairs.a, b: pairs.b, length: pairs.length, isInterviewed: null };
    },
  };
}
