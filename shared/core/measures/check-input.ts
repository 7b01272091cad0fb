/** Refuses a number of people that is not whole or below `fewest`. */
export function checkPeople(n: number, fewest = 0): void {
  if (!Number.isSafeInteger(n) || n < fewest) {
    throw new RangeError(`n must be a whole number >= ${fewest}, got ${n}`);
  }
}

/** Refuses a number of pairs that n people cannot have. */
export function checkPairs(n: number, m: number): void {
  checkPeople(n);
  if (!Number.isSafeInteger(m) || m < 0 || m > (n * (n - 1)) / 2) {
    throw new RangeError(`m must be a whole number from 0 to n(n − 1)/2, got ${m}`);
  }
}

/** Refuses a probability or share outside 0 … 1. */
export function checkShare(p: number, name = "p"): void {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`${name} must lie in 0 … 1, got ${p}`);
}

/** Refuses a mean degree that is negative or not finite. */
export function checkMeanDegree(c: number): void {
  if (!(c >= 0 && c < Number.POSITIVE_INFINITY)) {
    throw new RangeError(`c must be a finite number >= 0, got ${c}`);
  }
}
