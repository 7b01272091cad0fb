/** What one run answered with, and the median of its times. */
export type Timed<T> = { readonly ms: number; readonly value: T };

/** Fewest runs that count. */
const RUNS = 5;
/** Short measures are run more often, for as long as this, in ms. */
const MOST_TIME = 400;
const MOST_RUNS = 25;
const WARM_UP = { runs: 2, ms: 300, mostMs: 1500 };

/** Median of at least five runs after a warm-up, in ms. */
export async function medianMs<T>(work: () => T | Promise<T>): Promise<Timed<T>> {
  const now = () => performance.now();
  const began = now();
  let value = await work();
  for (let runs = 1; now() - began < WARM_UP.mostMs; runs++) {
    if (runs >= WARM_UP.runs && now() - began >= WARM_UP.ms) break;
    value = await work();
  }
  const times: number[] = [];
  let spent = 0;
  while (times.length < RUNS || (spent < MOST_TIME && times.length < MOST_RUNS)) {
    const start = now();
    value = await work();
    const took = now() - start;
    times.push(took);
    spent += took;
  }
  times.sort((x, y) => x - y);
  const middle = times.length >> 1;
  const median =
    times.length % 2 === 1
      ? (times[middle] ?? 0)
      : ((times[middle - 1] ?? 0) + (times[middle] ?? 0)) / 2;
  return { ms: median, value };
}
