import { execFile } from "node:child_process";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, describe, expect, it } from "vitest";
import { HAND_GRAPHS } from "./support/hand-graphs.ts";
import { measureFolder, rows } from "./support/measure-run.ts";
import { karate, lesMiserables } from "./support/published-networks.ts";

const ROOT = fileURLToPath(new URL("../..", import.meta.url));
const SCRIPT = join(ROOT, "scripts/measure.mjs");
const { folder, write, run, remove } = measureFolder();
afterAll(remove);

type Ended = { code: number; stdout: string; stderr: string };

/** Runs the command itself as a process of its own. */
function spawn(program: string, args: string[], cwd: string, env = process.env): Promise<Ended> {
  return new Promise((resolve) => {
    execFile(program, args, { cwd, env }, (error, stdout, stderr) => {
      const code = error ? Number(error.code) : 0;
      resolve({ code, stdout, stderr });
    });
  });
}

describe("the command as a process", () => {
  it("prints one JSON object and nothing else, paths relative to the caller's folder", async () => {
    write("own.csv", "ref_a,ref_b\na,b\n");
    const ended = await spawn("node", [SCRIPT, "--pairs", "own.csv"], folder);
    expect(ended).toMatchObject({ code: 0, stderr: "" });
    expect(JSON.parse(ended.stdout)).toMatchObject({ people: 2, pairs: 1 });
  });

  it("under npm reads the folder npm was called from", async () => {
    write("own.csv", "ref_a,ref_b\na,b\n");
    const env = { ...process.env, npm_lifecycle_event: "measure", INIT_CWD: folder };
    const ended = await spawn("node", [SCRIPT, "--pairs", "own.csv"], ROOT, env);
    expect(ended).toMatchObject({ code: 0, stderr: "" });
  });

  it("names bad rows on standard error and exits 2", async () => {
    write("bad.csv", "ref_a,ref_b\na,a\n");
    const ended = await spawn("node", [SCRIPT, "--pairs", "bad.csv"], folder);
    expect(ended).toEqual({ code: 2, stdout: "", stderr: "line 2: ref_b: self_contact\n" });
  });

  it("gives the same bytes twice", async () => {
    write("own.csv", "ref_a,ref_b\na,b\nb,c\nc,a\n");
    const args = [SCRIPT, "--pairs", "own.csv", "--seed", "7"];
    const [first, second] = [await spawn("node", args, folder), await spawn("node", args, folder)];
    expect(first.code).toBe(0);
    expect(second).toEqual(first);
  }, 60_000);
});

// Source: methods D.3, exact. Isolates are on record through the people file.
describe.each(HAND_GRAPHS)("$name through the command", (hand) => {
  it("has its values", async () => {
    write(
      "pairs.csv",
      rows(
        "ref_a,ref_b",
        hand.links.map(([a, b]) => `p${a},p${b}`),
      ),
    );
    write(
      "people.csv",
      rows(
        "ref",
        Array.from({ length: hand.n }, (_, k) => `p${k}`),
      ),
    );
    const { report, code } = await run("--pairs", "pairs.csv", "--people", "people.csv");
    expect(code).toBe(0);
    expect(report).toMatchObject({
      people: hand.n,
      pairs: hand.links.length,
      componentSizes: hand.groups,
      threshold: { population: "complete", n: hand.n, verdict: null },
      reasons: { "threshold.verdict": "too_few_people" },
    });
    expect(report?.meanDegree).toBeCloseTo(hand.c, 14);
    expect(report?.density).toBeCloseTo(hand.density, 14);
    expect(report?.transitivity).toBeCloseTo(hand.transitivity, 14);
    expect(report?.threshold.pairsPerPerson).toBeCloseTo(hand.c, 14);
  });
});

describe("complete networks through the command", () => {
  // Source: methods C.6.5 and C.2.3, computed with networkx 2.8.8 and scipy 1.10.1.
  it("karate club", async () => {
    write(
      "pairs.csv",
      rows(
        "ref_a,ref_b",
        karate().links.map(([a, b]) => `${a},${b}`),
      ),
    );
    const { report } = await run("--pairs", "pairs.csv");
    expect(report).toMatchObject({ people: 34, pairs: 78, isolates: 0, reasons: {} });
    expect(report?.threshold).toMatchObject({ population: "complete", verdict: "above" });
    expect(report?.threshold.pairsPerPerson).toBeCloseTo(4.588235294118, 11);
    expect(report?.threshold.pairsPerPersonInterval?.[0]).toBeCloseTo(3.724189049823, 11);
    expect(report?.threshold.pairsPerPersonInterval?.[1]).toBeCloseTo(5.614304183473, 11);
    expect(report?.transitivity).toBeCloseTo(45 / 176, 14);
  });

  it("Les Misérables", async () => {
    write(
      "pairs.csv",
      rows(
        "ref_a,ref_b",
        lesMiserables().links.map(([a, b]) => `${a},${b}`),
      ),
    );
    const { report } = await run("--pairs", "pairs.csv");
    expect(report).toMatchObject({ people: 77, pairs: 254, componentSizes: [77] });
    expect(report?.density).toBeCloseTo(0.086807928913, 11);
    expect(report?.transitivity).toBeCloseTo(0.498931623932, 11);
  });
});

describe("interviewed people through the command", () => {
  // Source: methods, box at the head of C.8 (scipy 1.10.1): i 100, n 1000, 475 pairs.
  const interviewed = Array.from({ length: 100 }, (_, k) => `i${k},yes`);
  const others = Array.from({ length: 300 }, (_, k) => `c${k},no`);
  // The k-th hundred of tellings moves one contact on, so no pair is told twice.
  const told = Array.from({ length: 475 }, (_, k) => {
    const contact = ((k % 100) * 3 + Math.floor(k / 100)) % 300;
    return `i${k % 100},c${contact}`;
  });

  it("gives the fixture, once with the population declared and once with it on record", async () => {
    write("pairs.csv", rows("ref_a,ref_b", told));
    write("people.csv", rows("ref,interviewed", [...interviewed, ...others]));
    const declared = await run(
      "--pairs",
      "pairs.csv",
      "--people",
      "people.csv",
      "--population",
      "1000",
    );
    expect(declared.report).toMatchObject({ people: 400, pairs: 475, reasons: {} });
    expect(declared.report?.threshold).toMatchObject({
      population: "interviewed",
      n: 1000,
      interviewed: 100,
      verdict: "above",
    });
    expect(declared.report?.threshold.pairsPerPerson).toBeCloseTo(4.997630331754, 11);
    expect(declared.report?.threshold.pairsPerPersonInterval?.[0]).toBeCloseTo(4.568890972301, 11);
    expect(declared.report?.threshold.pairsPerPersonInterval?.[1]).toBeCloseTo(5.466380931629, 11);

    const rest = Array.from({ length: 600 }, (_, k) => `r${k},`);
    write("people.csv", rows("ref,interviewed", [...interviewed, ...others, ...rest]));
    const recorded = await run("--pairs", "pairs.csv", "--people", "people.csv");
    expect(recorded.report?.people).toBe(1000);
    expect(recorded.report?.threshold).toEqual(declared.report?.threshold);
  });

  it("leaves pairs nobody interviewed could have told out of the threshold only", async () => {
    write("pairs.csv", "ref_a,ref_b\na,b\nb,c\n");
    write("people.csv", "ref,interviewed\na,yes\nb,unknown\nc,refused\n");
    const { report } = await run("--pairs", "pairs.csv", "--people", "people.csv");
    // X = 0 + 1·2, one pair told: c = 2 · 1/2.
    expect(report).toMatchObject({ pairs: 2, threshold: { interviewed: 1, pairsPerPerson: 1 } });
  });

  it("estimates recall when the pairs say who named whom", async () => {
    // Source of q: methods C.8.2, exact: named by both 6, by one 4 → 0.75.
    const pair = (k: number) => [`i${k}`, `i${k + 10}`] as const;
    const tellings = Array.from({ length: 10 }, (_, k) => {
      const [a, b] = pair(k);
      return k < 6 ? [`${a},${b},${a}`, `${b},${a},${b}`] : [`${a},${b},${b}`, `${a},${b},${b}`];
    }).flat();
    write("pairs.csv", rows("ref_a,ref_b,named_by", [...tellings, "i90,c1,i90", "i91,i92,"]));
    write("people.csv", rows("ref,interviewed", [...interviewed, ...others]));
    const { report } = await run("--pairs", "pairs.csv", "--people", "people.csv");
    expect(report).toMatchObject({ pairs: 12, threshold: { recall: 0.75, verdict: "below" } });
  });

  it("without double reports never says below, and says why", async () => {
    write("pairs.csv", "ref_a,ref_b,named_by\ni0,i1,i0\n");
    write("people.csv", rows("ref,interviewed", [...interviewed, ...others]));
    const { report } = await run("--pairs", "pairs.csv", "--people", "people.csv");
    expect(report?.threshold.verdict).toBe("not_distinguishable");
    expect(report?.threshold).not.toHaveProperty("recall");
    expect(report?.reasons).toMatchObject({ "threshold.verdict": "recall_unknown" });
  });
});
