import { describe, expect, it } from "vitest";
import { runInWorkers } from "../../server/analysis/replicates/run-in-workers.ts";
import {
  BURN_IN_PER_PAIR,
  createStream,
  type NullModel,
  observedRow,
  type ReplicatePlan,
  replicateRange,
  replicateRunner,
  rowWidth,
  sampleQuantile,
  samplerOf,
  summariseReplicates,
} from "../../shared/core/index.ts";
import { endsOf } from "./support/graphs.ts";
import { karate } from "./support/published-networks.ts";

const { n, links } = karate();
const pairs = endsOf(links);
const classOf = Int32Array.from({ length: n }, (_, u) => u % 3);

const MODELS: NullModel[] = [
  { kind: "gnp", n, p: 0.14 },
  { kind: "gnm", n, m: 78 },
  { kind: "degreePreserving", n, pairs, isInterviewed: null, proposalsPerPair: BURN_IN_PER_PAIR },
  { kind: "mixing", pairs, classOf },
  { kind: "household", pairs, householdOf: classOf },
  {
    kind: "traced",
    design: {
      population: 500,
      interviews: 40,
      pairProbability: 0.006,
      recall: 0.8,
      tracedShare: 0.7,
    },
  },
];

const planOf = (model: NullModel, seed = 9): ReplicatePlan => ({
  seed,
  model,
  statistics: ["groups", "largestGroup", "transitivity", "degreeAssortativity", "degreeVariance"],
  degreeBins: 8,
  sizeBins: 5,
  attribute: null,
});

const bytesOf = (table: Float64Array) =>
  Buffer.from(table.buffer, table.byteOffset, table.byteLength).toString("hex");

/** The table filled by ranges that end at the given replicates, taken in the given order. */
function inRanges(plan: ReplicatePlan, cuts: readonly number[], backwards = false): Float64Array {
  const width = rowWidth(plan);
  const table = new Float64Array((cuts.at(-1) ?? 0) * width);
  const ranges = cuts.map((to, at) => [at === 0 ? 0 : (cuts[at - 1] ?? 0), to] as const);
  if (backwards) ranges.reverse();
  for (const [from, to] of ranges) {
    replicateRange(plan, from, to, (replicate, row) => {
      table.set(row, replicate * width);
      return true;
    });
  }
  return table;
}

describe.each(MODELS)("replicates of $kind", (model) => {
  it("are the same bytes however they are shared out, and change with the seed", () => {
    const whole = bytesOf(inRanges(planOf(model), [24]));
    expect(bytesOf(inRanges(planOf(model), [12, 24], true))).toBe(whole);
    expect(bytesOf(inRanges(planOf(model), [1, 4, 7, 8, 15, 16, 23, 24], true))).toBe(whole);
    expect(bytesOf(inRanges(planOf(model, 10), [24]))).not.toBe(whole);
  });
});

describe("replicateRange", () => {
  it("stops when told to, and refuses a range that is none", () => {
    const plan = planOf(MODELS[1] as NullModel);
    const seen: number[] = [];
    replicateRange(plan, 3, 10, (replicate) => {
      seen.push(replicate);
      return replicate < 5;
    });
    expect(seen).toEqual([3, 4, 5]);
    expect(() => replicateRange(plan, 2, 1, () => true)).toThrow(RangeError);
    expect(() => replicateRunner({ ...plan, seed: -1 })).toThrow(/seed/);
    expect(() => replicateRunner({ ...plan, degreeBins: 0.5 })).toThrow(/bins/);
  });
});

describe("summariseReplicates", () => {
  it("gives every figure and both curves of a run", () => {
    const plan = planOf(MODELS[1] as NullModel);
    const width = rowWidth(plan);
    const table = inRanges(plan, [199]);
    const network = { ...pairs, people: n, length: links.length, isInterviewed: null };
    const summary = summariseReplicates(plan, observedRow(plan, network), table);
    expect(summary.replicates).toBe(199);
    expect([...summary.figures.keys()]).toEqual(plan.statistics);
    // Source: methods C.7.5: transitivity .13567, sd .0305, upper p <= .00025.
    const closed = summary.figures.get("transitivity");
    expect(Math.abs((closed?.mean ?? 0) - 0.13567)).toBeLessThan((4 * 0.0305) / Math.sqrt(199));
    expect(closed?.pUpper).toBe(1 / 200);
    const column = Float64Array.from({ length: 199 }, (_, k) => table[k * width + 2] ?? 0).sort();
    expect(closed?.low).toBe(sampleQuantile(column, 0.025));
    const degrees = summary.degreeCurve;
    expect([...(degrees?.observed ?? [])]).toEqual([0, 1, 11, 6, 6, 3, 2, 5]);
    expect(degrees?.mean.reduce((sum, people) => sum + people, 0)).toBeCloseTo(34, 10);
    expect(degrees?.global.outside).toBe(true);
    expect(degrees?.global.quickLook).toBe(true);
    expect([...(summary.sizeCurve?.observed ?? [])]).toEqual([0, 0, 0, 0, 1]);
  });

  it("has no curve without replicates, and refuses rows of another choice", () => {
    const plan = planOf(MODELS[1] as NullModel);
    const empty = summariseReplicates(plan, new Float64Array(18), new Float64Array(0));
    expect([empty.replicates, empty.degreeCurve]).toEqual([0, null]);
    expect(() => summariseReplicates(plan, new Float64Array(17), new Float64Array(18))).toThrow(
      RangeError,
    );
  });
});

describe("worker threads", () => {
  const plan = planOf({ kind: "gnm", n: 400, m: 800 });

  it("fill the same table with 1, 2 and 8 of them, and with none", async () => {
    const alone = bytesOf(inRanges(plan, [60]));
    for (const workers of [1, 2, 8]) {
      const progress: number[] = [];
      const run = await runInWorkers(plan, {
        replicates: 60,
        workers,
        onProgress: (done) => progress.push(done),
      });
      expect([run.reached, run.stopped, run.width]).toEqual([60, null, 18]);
      expect(bytesOf(run.table)).toBe(alone);
      expect(progress.at(-1)).toBe(60);
      expect([...progress].sort((x, y) => x - y)).toEqual(progress);
    }
  });

  /** Far more work than a test waits for. */
  const endless = { replicates: 100_000, workers: 2 };
  const slow = planOf({ kind: "gnm", n: 20_000, m: 40_000 });

  it("keep a beginning without gaps when cancelled", async () => {
    const cancel = new AbortController();
    const run = await runInWorkers(slow, {
      ...endless,
      signal: cancel.signal,
      onProgress: (done) => {
        if (done > 3) cancel.abort();
      },
    });
    expect(run.stopped).toBe("cancel");
    expect(run.reached).toBeGreaterThan(3);
    expect(run.reached).toBeLessThan(endless.replicates);
    expect(bytesOf(run.table.subarray(0, 4 * run.width))).toBe(bytesOf(inRanges(slow, [4])));
    // The last row reached is whole, too.
    const last = run.reached - 1;
    replicateRange(slow, last, run.reached, (_, row) => {
      expect(bytesOf(run.table.slice(last * run.width))).toBe(bytesOf(row));
      return true;
    });
  });

  it("stop at the time cap and say how far they came", async () => {
    const run = await runInWorkers(slow, { ...endless, capMs: 1500 });
    expect(run.stopped).toBe("cap");
    expect(run.reached).toBeLessThan(endless.replicates);
    expect(run.table.length).toBe(run.reached * run.width);
  });

  it("do nothing when cancelled beforehand or asked for nothing", async () => {
    const early = await runInWorkers(plan, { ...endless, signal: AbortSignal.abort() });
    expect([early.reached, early.stopped]).toEqual([0, "cancel"]);
    const none = await runInWorkers(plan, { replicates: 0, workers: 2 });
    expect([none.reached, none.stopped, none.table.length]).toEqual([0, null, 0]);
  });

  it("pass on what is wrong with a plan", async () => {
    const impossible = planOf({ kind: "gnm", n: 3, m: 9 });
    await expect(runInWorkers(impossible, { replicates: 5, workers: 2 })).rejects.toThrow(
      /possible pairs/,
    );
    await expect(runInWorkers(plan, { replicates: 5, workers: 0 })).rejects.toThrow(/workers/);
    await expect(runInWorkers(plan, { replicates: 0.5, workers: 1 })).rejects.toThrow(RangeError);
  });
});

describe("whose degrees are counted", () => {
  it("are those of the people seen, on drawn networks as on the record", () => {
    const seen = Uint8Array.from({ length: n }, (_, u) => (u < 5 ? 1 : 0));
    for (const model of MODELS.slice(0, 5)) {
      const plain = samplerOf(model).sample(createStream(3, 0));
      const drawn = samplerOf({ ...model, seen }).sample(createStream(3, 0));
      expect(drawn.isInterviewed).toBe(seen);
      expect([...drawn.a.subarray(0, drawn.length)]).toEqual([
        ...plain.a.subarray(0, plain.length),
      ]);
      const row = observedRow({ ...planOf(model), statistics: ["meanDegree"] }, drawn);
      expect(row.subarray(1, 9).reduce((sum, people) => sum + people, 0)).toBe(5);
    }
    const short = samplerOf({ kind: "gnm", n, m: 9, seen: new Uint8Array(3) });
    expect(() => short.sample(createStream(3, 0))).toThrow(/seen/);
  });
});
