/**
 * Deviance x·ln(x/m) + m − x of a count x from its expectation m: 0 where they meet, positive
 * elsewhere. Near x = m the plain form loses all digits, and a series in (x − m)/(x + m) takes over.
 *
 * @param x >= 0; x = 0 gives m
 * @param m > 0
 *
 * Cost: O(1). Source: Loader 2000, *Fast and accurate computation of binomial probabilities*.
 */
export function deviancePart(x: number, m: number): number {
  if (x === 0) return m;
  const difference = x - m;
  if (Math.abs(difference) >= 0.1 * (x + m)) return x * Math.log(x / m) - difference;
  const v = difference / (x + m);
  const square = v * v;
  let sum = difference * v;
  let power = 2 * x * v;
  // v is below 0.1: each turn wins two digits.
  for (let odd = 3; odd < 40; odd += 2) {
    power *= square;
    const next = sum + power / odd;
    if (next === sum) break;
    sum = next;
  }
  return sum;
}
