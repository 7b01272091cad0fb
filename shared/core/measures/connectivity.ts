import { binomialWeight } from "../stats/law-weights.ts";
import { checkPeople, checkShare } from "./check-input.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/** Above this the exact probability takes too long; the limit is good there. */
export const MOST_PEOPLE_EXACT = 10_000;

/** Weights below this part of the largest are let go: what is kept differs by less than 1e-20. */
const NEGLIGIBLE = 1e-30;

/**
 * x in p = (ln n + x)/n: how far the pair probability is from the one at which the last isolates
 * find a pair. @throws RangeError for n < 1 or p outside 0 … 1. Source: Erdős & Rényi 1959.
 */
export function connectivityOffset(n: number, p: number): number {
  checkPeople(n, 1);
  checkShare(p);
  return n * p - Math.log(n);
}

/**
 * Limit of the probability that all people form one group, exp(−e^(−x)); the same limit holds for
 * "nobody is without a pair". Source: Erdős & Rényi 1959, *On random graphs I*; methods C.3.1.
 */
export function connectivityLimit(x: number): number {
  return Math.exp(-Math.exp(-x));
}

/** One step of the walk: from `from` to `to`, u people not yet found, each found with chance h. */
function spread(u: number, h: number, weight: number, found: number, to: Float64Array): void {
  const mode = Math.min(u, Math.floor((u + 1) * h));
  const peak = weight * binomialWeight(mode, u - mode, h, 1 - h);
  to[found + mode]! += peak;
  const odds = h / (1 - h);
  if (odds === Number.POSITIVE_INFINITY) return;
  const least = peak * 1e-25;
  let term = peak;
  for (let k = mode; k < u; k++) {
    term *= ((u - k) / (k + 1)) * odds;
    if (term < least) break;
    to[found + k + 1]! += term;
  }
  term = peak;
  for (let k = mode; k > 0; k--) {
    term *= k / (u - k + 1) / odds;
    if (term < least) break;
    to[found + k - 1]! += term;
  }
}

/**
 * Natural logarithm of the exact probability that n people form one group when each possible pair is
 * there with probability p.
 *
 * Not by Gilbert's recursion, whose differences lose all digits where the probability is small, but
 * by sums of positive terms. Ask one person after the other for their pairs, always one who has been
 * found and not yet asked. At which asking a given person is found is geometric, independently for
 * the n − 1 others, and all are one group exactly when after t askings at least t others have been
 * found, for t = 1 … n − 1. That nobody is missed in n − 1 askings has probability
 * (1 − q^(n−1))^(n−1) with q = 1 − p, and this factor carries the smallness; given it, the walk of
 * the number found keeps up with probability of about e/n or more, and is followed exactly.
 *
 * Relative error about n·1e-15 in the probability. Edge cases: n = 1 gives 0 (certain); p = 0 with
 * more people gives −∞; nobody `no_people`; more than 10,000 people `too_many_people`.
 * @throws RangeError for n no whole number >= 0 or p outside 0 … 1
 *
 * Cost: about n·√n·c small steps, fewer when everyone is soon found. Source: own arrangement of the
 * exploration walk of Erdős–Rényi networks, checked against Gilbert 1959, *Random graphs*, in long
 * arithmetic; methods C.3.1.
 */
export function lnConnectedProbability(n: number, p: number): Measured {
  checkPeople(n);
  checkShare(p);
  if (n === 0) return undefinedBecause("no_people");
  if (n === 1 || p === 1) return defined(0);
  if (p === 0) return defined(Number.NEGATIVE_INFINITY);
  if (n > MOST_PEOPLE_EXACT) return undefinedBecause("too_many_people");

  const others = n - 1;
  const logMissed = Math.log1p(-p);
  let now = new Float64Array(n);
  let next = new Float64Array(n);
  now[0] = 1;
  let low = 0;
  let high = 0;
  for (let asked = 1; asked <= others && low < others; asked++) {
    // Chance to be found at this asking, given neither before nor never.
    const hazard = Math.min(1, p / -Math.expm1((others - asked + 1) * logMissed));
    next.fill(0);
    for (let found = low; found <= high; found++) {
      const weight = now[found]!;
      if (weight > 0) spread(others - found, hazard, weight, found, next);
    }
    let largest = 0;
    for (let found = asked; found <= others; found++) largest = Math.max(largest, next[found]!);
    const least = largest * NEGLIGIBLE;
    low = asked;
    while (low < others && next[low]! <= least) low++;
    high = others;
    while (high > low && next[high]! <= least) high--;
    [now, next] = [next, now];
  }
  const within = others * Math.log(-Math.expm1(others * logMissed));
  return defined(within + Math.log(now[others]!));
}

/**
 * The exact probability itself; below 1e-308 it is 0 in doubles and the logarithm says more. Else as
 * `lnConnectedProbability`.
 */
export function connectedProbability(n: number, p: number): Measured {
  const logarithm = lnConnectedProbability(n, p);
  return logarithm.value === null ? logarithm : defined(Math.exp(logarithm.value));
}
