import { expect, it } from "vitest";
import {
  createStream,
  type NullModel,
  type ReplicatePlan,
  type Statistic,
  samplerOf,
  tracedDesign,
} from "../../shared/core/index.ts";
import { kept, PValues, traceWholeNetwork } from "./support.ts";

const STATISTICS: Statistic[] = [
  "groups",
  "largestGroup",
  "transitivity",
  "degreeAssortativity",
  "degreeVariance",
  "sizeSquares",
];

const planOf = (model: NullModel, seed: number, extra: Partial<ReplicatePlan> = {}) => ({
  seed,
  model,
  statistics: STATISTICS,
  degreeBins: 9,
  sizeBins: 0,
  attribute: null,
  ...extra,
});

const n = 60;
const classOf = Int32Array.from({ length: n }, (_, u) => u % 4);
const householdOf = Int32Array.from({ length: n }, (_, u) => (u < 48 ? Math.floor(u / 4) : -1));

it("G(n,p) with known p", () => {
  const values = new PValues();
  const model: NullModel = { kind: "gnp", n, p: 0.05 };
  const truth = samplerOf(model);
  for (let set = 0; set < 600; set++) {
    values.test(truth.sample(createStream(101, set)), planOf(model, 10_000 + set));
  }
  values.expectHonest();
});

it("G(n,m) given the observed number of pairs", () => {
  const values = new PValues();
  const truth = samplerOf({ kind: "gnp", n, p: 0.05 });
  for (let set = 0; set < 600; set++) {
    const observed = truth.sample(createStream(102, set));
    values.test(observed, planOf({ kind: "gnm", n, m: observed.length }, 20_000 + set));
  }
  values.expectHonest();
});

it("degrees kept, when the truth is random mixing", () => {
  const values = new PValues();
  const truth = samplerOf({ kind: "gnp", n: 30, p: 0.1 });
  for (let set = 0; set < 250; set++) {
    const observed = truth.sample(createStream(103, set));
    const model: NullModel = {
      kind: "degreePreserving",
      n: 30,
      pairs: kept(observed),
      isInterviewed: null,
      proposalsPerPair: 100,
    };
    const plan = planOf(model, 30_000 + set, { degreeBins: 0 });
    values.test(observed, plan);
  }
  values.expectHonest();
});

it("degrees kept with an interviewed end to every pair, when such graphs are alike", () => {
  const values = new PValues();
  const design = {
    population: 200,
    interviews: 15,
    pairProbability: 0.015,
    recall: 1,
    tracedShare: 0.7,
  };
  const traced = samplerOf({ kind: "traced", design });
  for (let set = 0; set < 250; set++) {
    const start = traced.sample(createStream(104, set));
    const flags = start.isInterviewed?.slice(0, start.people) ?? null;
    const modelOf = (pairs: ReturnType<typeof kept>): NullModel => ({
      kind: "degreePreserving",
      n: start.people,
      pairs,
      isInterviewed: flags,
      proposalsPerPair: 100,
    });
    const { people } = start;
    const observed = samplerOf(modelOf(kept(start))).sample(createStream(105, set));
    const plan = planOf(modelOf(kept(observed)), 40_000 + set, { degreeBins: 0 });
    values.test({ ...observed, people }, plan);
  }
  values.expectHonest();
});

it("mixing kept by class, when pairs fall at random inside and between the classes", () => {
  const values = new PValues();
  const start = samplerOf({ kind: "gnm", n, m: 90 }).sample(createStream(106, 0));
  const truth = samplerOf({ kind: "mixing", pairs: kept(start), classOf });
  for (let set = 0; set < 600; set++) {
    const observed = truth.sample(createStream(107, set));
    const model: NullModel = { kind: "mixing", pairs: kept(observed), classOf };
    values.test(observed, planOf(model, 50_000 + set));
  }
  values.expectHonest();
});

it("households kept, when everybody at home is more often met", () => {
  const values = new PValues();
  for (let set = 0; set < 600; set++) {
    const random = createStream(108, set);
    const ends: [number, number][] = [];
    for (let v = 1; v < n; v++) {
      for (let u = 0; u < v; u++) {
        const home = householdOf[u] === householdOf[v] && (householdOf[u] ?? -1) >= 0;
        if (random.next() < (home ? 0.7 : 0.03)) ends.push([u, v]);
      }
    }
    const pairs = {
      a: Int32Array.from(ends, ([u]) => u),
      b: Int32Array.from(ends, ([, v]) => v),
    };
    const observed = { ...pairs, people: n, length: ends.length, isInterviewed: null };
    values.test(observed, planOf({ kind: "household", pairs, householdOf }, 60_000 + set));
  }
  values.expectHonest();
});

// Source: methods C.7.6, calibration: c 0.9–2, i 50–100, σ 0.6–0.8, q 0.7–1, two-sided p.
it.each([
  { c: 0.9, i: 50, sigma: 0.8, q: 1 },
  { c: 1, i: 50, sigma: 0.8, q: 0.8 },
  { c: 1.5, i: 100, sigma: 0.6, q: 1 },
  { c: 2, i: 60, sigma: 0.7, q: 0.7 },
])("traced random mixing: c $c, i $i, σ $sigma, q $q, all read from the record", (setting) => {
  const { c, i, sigma, q } = setting;
  const values = new PValues();
  const population = 500;
  for (let set = 0; set < 300; set++) {
    const traced = traceWholeNetwork(population, c, i, sigma, q, 109 + Math.round(10 * c), set);
    const design = tracedDesign({
      population,
      people: traced.network.people,
      order: traced.order,
      tellings: traced.tellings,
      directed: true,
      recall: q,
    });
    expect(design).not.toBeNull();
    if (design === null) continue;
    const plan = planOf({ kind: "traced", design }, 70_000 + set, {
      statistics: ["people", ...STATISTICS],
    });
    values.test(traced.network, plan, "both");
  }
  values.expectHonest();
});

it("sees what is not random: traced networks held against G(n,m)", () => {
  // The same data sets as above pass their own baseline; against G(n,m) the design itself shows:
  // hardly anybody on record is without a pair (methods C.8, box: by construction).
  const values = new PValues();
  for (let set = 0; set < 200; set++) {
    const { network } = traceWholeNetwork(500, 2, 60, 0.8, 1, 130, set);
    const model: NullModel = { kind: "gnm", n: network.people, m: network.length };
    const plan = planOf(model, 80_000 + set, {
      statistics: ["isolates", "groups", "degreeAssortativity"],
      degreeBins: 0,
    });
    values.test({ ...network, isInterviewed: null }, plan, "both");
  }
  // Own simulation: 1, 1 and 0.86.
  expect(values.share("isolates, two-sided", 0.05)).toBeGreaterThan(0.9);
  expect(values.share("groups, two-sided", 0.05)).toBeGreaterThan(0.9);
  expect(values.share("degreeAssortativity, two-sided", 0.05)).toBeGreaterThan(0.6);
});
