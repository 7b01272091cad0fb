import { lambertGiantShare } from "../stats/lambert-giant-share.ts";
import { checkMeanDegree, checkPeople } from "./check-input.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/** What random mixing with mean degree c gives in the limit of many people. */
export type RandomMixingGroups = {
  /** S, share of all people in the one large group; 0 for c <= 1. */
  readonly giantShare: number;
  /** ⟨s⟩, people in the group of a random person outside the large one. Without bound at c = 1. */
  readonly groupOfPerson: Measured;
  /** R, people per group, the large one left out. */
  readonly peoplePerGroup: number;
  /** c* = c(1 − S) <= 1: what remains outside the large group looks like mixing with c*. */
  readonly dual: number;
  /** I = c − 1 − ln c, how fast small groups become rare with size; without bound at c = 0. */
  readonly rate: Measured;
  /** SD of the large group's size divided by √n, where p is fixed; above the threshold only. */
  readonly spread: Measured;
};

/**
 * Sizes of groups under random mixing with mean degree c.
 *
 * ⟨s⟩ = 1/(1 − c*) and R = 2/(2 − c*) with c* = c(1 − S), the same as 1/(1 − c + cS) and
 * 2/(2 − c + cS). Spread √(S(1 − S))/(1 − c*).
 *
 * Edge cases: c = 0 gives 1, 1 and 0; at c = 1 ⟨s⟩ is undefined (`at_threshold`) while R = 2; `rate`
 * at c = 0 is undefined (`no_pairs`).
 * @throws RangeError for a negative or non-finite c
 *
 * Cost: O(1). Source: Erdős & Rényi 1960; Bollobás 2001, *Random Graphs*; Newman 2010, *Networks*;
 * spread: Stepanov 1970; methods C.2.1.
 */
export function randomMixingGroups(c: number): RandomMixingGroups {
  checkMeanDegree(c);
  const share = lambertGiantShare(c);
  const dual = c > 1 ? c * Math.exp(-c * share) : c;
  return {
    giantShare: share,
    groupOfPerson: c === 1 ? undefinedBecause("at_threshold") : defined(1 / (1 - dual)),
    peoplePerGroup: 2 / (2 - dual),
    dual,
    rate: c === 0 ? undefinedBecause("no_pairs") : defined(rateOf(c)),
    spread:
      c > 1
        ? defined(Math.sqrt(share * (1 - share)) / (1 - dual))
        : undefinedBecause("not_above_threshold"),
  };
}

/** c − 1 − ln c; near 1 by its series, where the plain form loses its digits. */
function rateOf(c: number): number {
  const e = c - 1;
  if (Math.abs(e) > 1e-3) return e - Math.log(c);
  return e * e * (1 / 2 + e * (-1 / 3 + e * (1 / 4 + e * (-1 / 5 + e / 6))));
}

/** Where c stands in the critical window of n people. */
export type CriticalWindow = {
  /** w = n^(−1/3): the window is 1 ± w. */
  readonly halfWidth: number;
  /** λ = (c − 1)·n^(1/3): −1 and 1 are the ends of the window. */
  readonly position: number;
};

/**
 * The critical window of n people and the place of c in it. The factor 1 on w is a convention.
 *
 * @throws RangeError for n < 1 or a negative or non-finite c
 *
 * Cost: O(1). Source: Łuczak 1990; Janson, Knuth, Łuczak & Pittel 1993, *The birth of the giant
 * component*; methods C.2.2, C.2.4.
 */
export function criticalWindow(n: number, c: number): CriticalWindow {
  checkPeople(n, 1);
  checkMeanDegree(c);
  const root = Math.cbrt(n);
  return { halfWidth: 1 / root, position: (c - 1) * root };
}

/**
 * Size of the largest group below the threshold, (ln n − (5/2) ln ln n)/I, in people.
 *
 * Leading order for a fixed c < 1 and many people: a mean of 11.4 in simulations at n = 1000, c = 0.5
 * stands against 10.8 here, but at c = 0.8, near the window, 33 against 90. Never more than n and
 * never less than 2 (c > 0) is given.
 *
 * Edge cases: c >= 1 − n^(−1/3) undefined (`not_below_threshold`); c = 0 gives 1; fewer than 3 people
 * undefined (`too_few_people`).
 * @throws RangeError for n < 1 or a negative or non-finite c
 *
 * Cost: O(1). Source: Erdős & Rényi 1960; Bollobás 2001; methods C.2.2.
 */
export function largestSmallGroup(n: number, c: number): Measured {
  const { position } = criticalWindow(n, c);
  if (n < 3) return undefinedBecause("too_few_people");
  if (position >= -1) return undefinedBecause("not_below_threshold");
  if (c === 0) return defined(1);
  const logarithm = Math.log(n);
  const size = (logarithm - 2.5 * Math.log(logarithm)) / rateOf(c);
  return defined(Math.min(n, Math.max(2, size)));
}
