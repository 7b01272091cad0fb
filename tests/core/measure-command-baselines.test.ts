import { afterAll, describe, expect, it } from "vitest";
import type { BaselineFigure } from "../../scripts/measure/baseline-figures.ts";
import { measureFolder, rows } from "./support/measure-run.ts";
import { karate, karateClubs } from "./support/published-networks.ts";

const { write, run, remove } = measureFolder();
afterAll(remove);

const REPLICATES = 199;

function writeKarate() {
  const pairs = karate().links.map(([a, b]) => `${a},${b}`);
  write("pairs.csv", rows("ref_a,ref_b", pairs));
  const people = Array.from(karateClubs(), (club, u) => `${u},c${club}`);
  write("people.csv", rows("ref,club", people));
  return ["--pairs", "pairs.csv", "--people", "people.csv", "--attribute", "club"];
}

describe("baselines of the karate club", () => {
  // Source: methods C.7.5, own simulation of 4000 replicates: mean, its SE, SD of a replicate.
  const reference = {
    gnm: {
      transitivity: [0.13567, 0.00048, 0.0305],
      triangles: [15.553488, 0, 3.82],
      averageClustering: [0.13359, 0.00059, 0.0376],
      degreeAssortativity: [-0.06788, 0.0016, 0.0996],
      largestGroup: [33.786, 0.0074, 0.467],
      maxDegree: [9.012, 0.017, 1.08],
      meanPath: [2.39593, 0.00078, 0.0492],
      maxBetweenness: [80.73, 0.27, 17.4],
      attributeModularity: [-0.01737, 0.00085, 0.0536],
    },
    degreePreserving: {
      transitivity: [0.22354, 0.00041, 0.026],
      triangles: [39.344, 0.072, 4.57],
      averageClustering: [0.35599, 0.00082, 0.0517],
      degreeAssortativity: [-0.30184, 0.00077, 0.0486],
      meanPath: [2.24994, 0.00072, 0.0458],
      maxBetweenness: [172.63, 0.23, 14.8],
      attributeModularity: [-0.01898, 0.00075, 0.0475],
    },
  } as const;

  it("lie at the reference, and the club is extreme until degrees are kept", async () => {
    const args = [...writeKarate(), "--replicates", `${REPLICATES}`, "--seed", "5"];
    const { report } = await run(...args, "--only", "baselines");
    const baselines = report?.baselines;
    if (!baselines) throw new Error("no baselines");
    for (const kind of ["gnm", "degreePreserving"] as const) {
      for (const [name, [mean, error, sd]] of Object.entries(reference[kind])) {
        const figure = baselines[kind][name] as BaselineFigure;
        const standardError = Math.hypot(error, sd / Math.sqrt(REPLICATES));
        expect(Math.abs((figure.mean ?? 99) - mean), name).toBeLessThan(4 * standardError);
        // The standard error of a standard deviation is near sd/√(2N); tails make it larger.
        expect(figure.sd ?? 0, name).toBeGreaterThan(sd * 0.7);
        expect(figure.sd ?? 0, name).toBeLessThan(sd * 1.4);
        expect(figure.low ?? 0).toBeLessThanOrEqual(figure.high ?? 0);
      }
    }
    const { gnm, degreePreserving, mixing } = baselines;
    expect(gnm.transitivity?.pUpper).toBe(1 / (REPLICATES + 1));
    expect(degreePreserving.transitivity?.pUpper).toBeGreaterThan(0.05);
    expect(degreePreserving.maxDegree).toMatchObject({ mean: 17, sd: 0, pUpper: 1, pLower: 1 });
    // Mixing is kept, so what is made of it does not move.
    expect(mixing?.ei?.mean).toBeCloseTo(-0.717948717949, 11);
    expect(mixing?.ei?.sd).toBeCloseTo(0, 11);
    expect(baselines).not.toHaveProperty("traced");
  });

  it("are the same bytes with 1, 2 and 8 workers, and others with another seed", async () => {
    const args = [...writeKarate().slice(0, 2), "--replicates", "40", "--seed"];
    const outputs = [];
    for (const workers of ["1", "2", "8"]) {
      outputs.push((await run(...args, "5", "--workers", workers)).output);
    }
    expect(outputs[0]).not.toBeNull();
    expect(outputs[1]).toBe(outputs[0]);
    expect(outputs[2]).toBe(outputs[0]);
    expect((await run(...args, "6", "--workers", "1")).output).not.toBe(outputs[0]);
  }, 90_000);
});

describe("a network seen through interviews", () => {
  // A chain of tracing: each interview names the next person and two more.
  const interviews = Array.from({ length: 30 }, (_, k) => k);
  const told = interviews.flatMap((k) => [
    `i${k},i${(k + 1) % 30},i${k}`,
    `i${k},c${2 * k},i${k}`,
    `i${k},c${2 * k + 1},i${k}`,
  ]);
  const day = (k: number) => `2026-03-${String(k + 1).padStart(2, "0")}`;
  const contacts = Array.from({ length: 60 }, (_, k) => `c${k},no,`);
  const unseen = Array.from({ length: 10 }, (_, k) => `u${k},,`);
  const only = ["--only", "baselines", "--replicates", "60"];
  const files = ["--pairs", "pairs.csv", "--people", "people.csv", "--population", "2000"];

  it("is compared with random mixing through the same interviews", async () => {
    write("pairs.csv", rows("ref_a,ref_b,named_by", told));
    const dated = interviews.map((k) => `i${k},yes,${day(k)}`);
    write("people.csv", rows("ref,interviewed,interview_date", [...dated, ...contacts, ...unseen]));
    const { report, output } = await run(...files, ...only);
    const traced = report?.baselines?.traced;
    // 90 pairs of 30·29/2 + 30·1970 eligible ones; every interview names somebody to be asked next.
    expect(traced?.pairs?.mean).toBeGreaterThan(75);
    expect(traced?.pairs?.mean).toBeLessThan(105);
    expect(traced?.meanDegree?.pUpper).not.toBeNull();
    // The chain closes: one group, no triangle, as random mixing would have it too.
    expect(traced?.triangles?.pUpper).toBe(1);
    expect(report?.baselines).not.toHaveProperty("mixing");

    // Interview days decide the order, so the rows may come in any.
    const backwards = [...dated].reverse();
    write(
      "people.csv",
      rows("ref,interviewed,interview_date", [...backwards, ...contacts, ...unseen]),
    );
    const again = await run(...files, ...only);
    expect(again.report?.baselines?.traced).toEqual(traced);
    expect(output).not.toBeNull();

    // Without days the rows do: backwards nobody was named before being asked, except the last.
    const undated = backwards.map((row) => row.replace(/2026.*/, ""));
    write(
      "people.csv",
      rows("ref,interviewed,interview_date", [...undated, ...contacts, ...unseen]),
    );
    const other = await run(...files, ...only);
    expect(other.report?.baselines?.traced).not.toEqual(traced);
  }, 20_000);

  it("says so when nobody was interviewed", async () => {
    write("pairs.csv", rows("ref_a,ref_b", ["i0,i1", "i1,i2"]));
    write("people.csv", rows("ref,interviewed", ["i0,no", "i1,", "i2,refused"]));
    const { report } = await run(...files, ...only);
    expect(report?.baselines?.traced).toBeNull();
    expect(report?.reasons["baselines.traced"]).toBe("no_one_interviewed");
  });
});

describe("options of the baselines", () => {
  it.each([
    [["--replicates", "0"], "--replicates: must be at least 1"],
    [["--replicates", "1000001"], "--replicates: must be at most 1000000"],
    [["--workers", "0"], "--workers: must be at least 1"],
    [["--workers", "65"], "--workers: must be at most 64"],
    [["--attribute", "club"], "--attribute: needs --people, whose column it names"],
  ])("refuses %j in one line", async (args, complaint) => {
    writeKarate();
    const ended = await run("--pairs", "pairs.csv", ...args);
    expect(ended).toMatchObject({ code: 2, output: null, complaints: [complaint] });
  });

  it("refuses an attribute that is no column", async () => {
    const args = writeKarate().slice(0, 4);
    const ended = await run(...args, "--attribute", "colour");
    expect(ended).toMatchObject({
      code: 2,
      complaints: ['--attribute: the people file has no column "colour"'],
    });
  });
});
