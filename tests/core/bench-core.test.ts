import { afterAll, describe, expect, it } from "vitest";
import { benchCore } from "../../bench/core/bench-core.ts";
import { CORE_NAMES } from "../../bench/core/core-measures.ts";
import { measureFolder, rows } from "./support/measure-run.ts";
import { karate } from "./support/published-networks.ts";

const { folder, write, remove } = measureFolder();
afterAll(remove);
write(
  "pairs.csv",
  rows(
    "ref_a,ref_b",
    karate().links.map(([a, b]) => `${a},${b}`),
  ),
);

type Times = Record<string, { ms: number; msAllWorkers: number | null; value: unknown }>;

describe("bench:core", () => {
  it("prints every name with its times and a value", async () => {
    const { output, code } = await benchCore(["--pairs", "pairs.csv"], folder);
    expect(code).toBe(0);
    const times = JSON.parse(output ?? "null") as Times;
    expect(Object.keys(times)).toEqual(CORE_NAMES);
    for (const [name, time] of Object.entries(times)) {
      expect(Object.keys(time), name).toEqual(["ms", "msAllWorkers", "value"]);
      expect(time.ms, name).toBeGreaterThan(0);
      const isShared = ["paths", "betweenness", "closeness", "baseline"].includes(name);
      if (isShared) expect(time.msAllWorkers, name).toBeGreaterThan(0);
      else expect(time.msAllWorkers, name).toBeNull();
    }
    // Source: methods C.6.5.
    expect(times.build?.value).toEqual({ people: 34, pairs: 78 });
    expect(times.components?.value).toEqual({ count: 1, largest: 34 });
    expect(times.clustering?.value).toEqual({
      transitivity: expect.closeTo(45 / 176, 12),
      averageClustering: expect.closeTo(0.570638478208, 11),
    });
    expect(times.cores?.value).toBe(4);
    expect(times.articulation?.value).toEqual({ people: 1, bridges: 1 });
    expect(times.assortativity?.value).toBeCloseTo(-0.475613097685, 11);
    expect(times.paths?.value).toMatchObject({ diameter: 5 });
    expect(times.betweenness?.value).toBeCloseTo(231.071428571429, 9);
    expect(times.closeness?.value).toBeCloseTo(0.704545454545, 11);
  }, 60_000);

  it("runs what is named, from quoted files too", async () => {
    write("quoted.csv", 'ref_b,"ref_a",minutes\n"x, y",z,15\nz,q,\n');
    const args = ["--pairs", "quoted.csv", "--only", "cores, build"];
    const times = JSON.parse((await benchCore(args, folder)).output ?? "null") as Times;
    expect(Object.keys(times)).toEqual(["build", "cores"]);
    expect(times.build?.value).toEqual({ people: 3, pairs: 2 });
  });

  it.each([
    [[], "--pairs: is needed"],
    [["--pairs", "none.csv"], "--pairs: no such file"],
    [["--pairs", "bad.csv"], "line 3: ref_b: self_contact"],
    [["--pairs", "pairs.csv", "--only", "luck"], '--only: no measure is called "luck"'],
    [["--pairs", "pairs.csv", "--seed", "1"], "Unknown option '--seed'"],
  ])("refuses %j in one line", async (args, complaint) => {
    write("bad.csv", "ref_a,ref_b\na,b\nc,c\n");
    const { output, complaints, code } = await benchCore(args, folder);
    expect({ output, code, complaints }).toEqual({
      output: null,
      code: 2,
      complaints: [complaint],
    });
  });
});
