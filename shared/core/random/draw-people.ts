import type { RandomStream } from "./random-stream.ts";

/**
 * Draws `count` of the people 0 … n − 1 without replacement, each set equally likely; ascending.
 * As many as there are, or more, gives everyone without drawing.
 *
 * Cost: O(n). Source: shuffle of Fisher & Yates 1938, stopped after `count` steps.
 */
export function drawPeople(n: number, count: number, stream: RandomStream): Int32Array {
  const people = new Int32Array(n);
  for (let u = 0; u < n; u++) people[u] = u;
  if (count >= n) return people;
  for (let k = 0; k < count; k++) {
    const other = k + stream.below(n - k);
    const drawn = people[other]!;
    people[other] = people[k]!;
    people[k] = drawn;
  }
  return people.slice(0, count).sort();
}
