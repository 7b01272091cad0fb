import { afterAll, describe, expect, it } from "vitest";
import { createStream } from "../../shared/core/index.ts";
import { measureFolder, rows } from "./support/measure-run.ts";

const { write, run, remove } = measureFolder();
afterAll(remove);

/** A ring, in which paths are known: mean (n + 1)/4 for odd n, diameter (n − 1)/2. */
const PEOPLE = 20_001;
const ring = Array.from({ length: PEOPLE }, (_, u) => `${u},${(u + 1) % PEOPLE}`);

describe("above 20,000 people", () => {
  it("says which figures are estimates, with their error", async () => {
    const stream = createStream(3, 0);
    const chords = Array.from({ length: PEOPLE }, (_, u) => `${u},x${stream.below(PEOPLE)}`);
    write("pairs.csv", rows("ref_a,ref_b", [...ring, ...chords]));
    const names = "--pairs pairs.csv --workers 1".split(" ");
    const { report } = await run(...names);
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
    expect(report).toMatchObject({ reachableShare: 1, baselines: null });
    expect(report.reasons).toEqual({
      ...report.reasons,
      baselines: "too_many_people",
    });
  }, 60_000);
});
