import { afterAll, describe, expect, it } from "vitest";
import { createStream } from "../../shared/core/index.ts";
import { measureFolder, rows } from "./support/measure-run.ts";

const { write, run, remove } = measureFolder();
afterAll(remove);

/** A ring with chords, and somebody with one pair hanging from it for everyone else. */
const PEOPLE = 20_001;
const RING = 501;

describe("above 20,000 people", () => {
  it("says which figures are estimates, with their error", async () => {
    const stream = createStream(3, 0);
    const ring = Array.from({ length: RING }, (_, u) => [
      `${u},${(u + 1) % RING}`,
      `${u},${(u + 2 + stream.below(RING - 4)) % RING}`,
    ]);
    const hanging = Array.from({ length: PEOPLE - RING }, (_, k) => `${k % RING},h${k}`);
    write("pairs.csv", rows("ref_a,ref_b", [...ring.flat(), ...hanging]));
    const { report } = await run("--pairs", "pairs.csv", "--workers", "1");
    if (!report?.estimated) throw new Error("no estimates");
    expect(Object.keys(report.estimated).sort()).toEqual([
      "betweenness",
      "diameter",
      "efficiency",
      "harmonicCloseness",
      "meanPath",
    ]);
    expect(report.estimated.meanPath).toMatchObject({ sources: 512 });
    expect(report.estimated.meanPath?.standardError).toBeGreaterThan(0);
    expect(Object.keys(report.estimated.betweenness?.standardError ?? {})).toHaveLength(
      report.people,
    );
    expect(report).toMatchObject({ people: PEOPLE, reachableShare: 1, baselines: null });
    expect(report.reasons).toEqual({ baselines: "too_many_people" });
    const exact = await run("--pairs", "pairs.csv", "--workers", "1", "--only", "paths");
    expect(exact.report?.estimated).toEqual({});
    const [near = 0, far = 0] = [report.meanPath, exact.report?.meanPath].map(Number);
    const error = Number(report.estimated.meanPath?.standardError);
    expect(Math.abs(near - far)).toBeLessThan(4 * error);
    expect(report.diameter).toBeLessThanOrEqual(Number(exact.report?.diameter));
  }, 60_000);
});
