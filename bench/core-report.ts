import { buildGraph, networkReport } from "../shared/core/index.ts";

/** Small fixed-seed generator (linear congruential): timings need repeatable input, not quality. */
function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 4294967296;
  };
}

/** Households of four with all their pairs, the rest at random: 3 pairs a person in the mean. */
function madeUpPairs(n: number, seed: number): { a: Int32Array; b: Int32Array } {
  const next = seeded(seed);
  const a = new Int32Array(3 * n);
  const b = new Int32Array(3 * n);
  let filled = 0;
  for (let home = 0; home + 3 < n; home += 4) {
    for (let u = home; u < home + 4; u++) {
      for (let v = u + 1; v < home + 4; v++) {
        a[filled] = u;
        b[filled++] = v;
      }
    }
  }
  while (filled < a.length) {
    const u = Math.floor(next() * n);
    const v = Math.floor(next() * n);
    if (u === v) continue;
    a[filled] = u;
    b[filled++] = v;
  }
  return { a, b };
}

const median = (values: number[]): number =>
  [...values].sort((x, y) => x - y)[Math.floor(values.length / 2)] ?? 0;

const RUNS = 9;
const results = [1_000, 10_000, 100_000].map((n) => {
  const ends = madeUpPairs(n, 20260101);
  const interviewed = Uint8Array.from({ length: n }, (_, k) => (k % 3 === 0 ? 1 : 0));
  const build: number[] = [];
  const report: number[] = [];
  let pairs = 0;
  for (let run = 0; run < RUNS; run++) {
    const start = performance.now();
    const graph = buildGraph(n, ends);
    const built = performance.now();
    networkReport(graph, interviewed, {
      declaredPopulation: null,
      presetWindow: true,
      recall: null,
    });
    report.push(performance.now() - built);
    build.push(built - start);
    pairs = graph.m;
  }
  const round = (ms: number) => Math.round(ms * 100) / 100;
  return {
    people: n,
    pairs,
    buildFirstMs: round(build[0] ?? 0),
    buildMedianMs: round(median(build)),
    reportFirstMs: round(report[0] ?? 0),
    reportMedianMs: round(median(report)),
  };
});
process.stdout.write(`${JSON.stringify({ bench: "core-report", runs: RUNS, results }, null, 2)}\n`);
