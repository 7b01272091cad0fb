import { afterAll, describe, expect, it } from "vitest";
import { measureFolder } from "./support/measure-run.ts";

const { write, run, remove } = measureFolder();
afterAll(remove);

describe("reading files", () => {
  it("takes byte-order mark, CRLF, quotes, blank lines, spaces and columns it does not know", async () => {
    write(
      "pairs.csv",
      '\ufeffref_b, ref_a ,colour\r\n"x, y"," z ",red\r\n\r\nz,"x, y",\r\nq,z,\r\n',
    );
    expect((await run("--pairs", "pairs.csv")).report).toMatchObject({ people: 3, pairs: 2 });
  });

  it("tells references by case", async () => {
    write("pairs.csv", "ref_a,ref_b\na,A\n");
    expect((await run("--pairs", "pairs.csv")).report).toMatchObject({ people: 2, pairs: 1 });
  });

  it("takes files without rows as nobody", async () => {
    write("pairs.csv", "ref_a,ref_b\n");
    const { report, code } = await run("--pairs", "pairs.csv");
    expect(code).toBe(0);
    expect(report).toMatchObject({
      people: 0,
      meanDegree: null,
      reasons: { density: "no_people" },
    });
  });

  it.each([
    ["a missing column", "ref_a,other\na,b\n", ["line 1: ref_b: required_column"]],
    ["a column twice", "ref_a,ref_b,ref_a\na,b,c\n", ["line 1: ref_a: duplicate_column"]],
    ["an empty file", "", ["line 1: row: empty_file"]],
    [
      "blank references",
      "ref_a,ref_b\n,b\na, \n",
      ["line 2: ref_a: required", "line 3: ref_b: required"],
    ],
    ["a row too long", "ref_a,ref_b\na,b,c\n", ["line 2: row: ragged_row"]],
    ["a row too short", "ref_a,ref_b\na\n", ["line 2: row: ragged_row"]],
    ["an open quote", 'ref_a,ref_b\n"a,b\n', ["line 2: row: unclosed_quote"]],
    ["a stray quote", 'ref_a,ref_b\n"a"x,b\n', ["line 2: row: not_csv"]],
    [
      "cells the import would refuse",
      "ref_a,ref_b,first_exposure,last_exposure,setting,minutes,distance_m\n" +
        "a,b,2026-02-30,,pub,many,\nb,c,2026-03-02,2026-03-01,unknown,15,1.5\nc,d,2026-03,refused,,,\n",
      [
        "line 2: first_exposure: not_a_day",
        "line 2: setting: not_in_list",
        "line 2: minutes: not_a_number",
        "line 3: last_exposure: last_before_first",
      ],
    ],
    [
      "somebody else naming the pair",
      "ref_a,ref_b,named_by\na,b,c\n",
      ["line 2: named_by: named_by_other"],
    ],
    [
      "lines after a quoted line break and a blank line",
      'ref_a,ref_b\r\n"a\r\nb",c\r\n\r\nd,d\r\n',
      ["line 5: ref_b: self_contact"],
    ],
  ])("refuses %s", async (_, content, complaints) => {
    write("pairs.csv", content);
    expect(await run("--pairs", "pairs.csv")).toEqual({
      code: 2,
      complaints,
      output: null,
      report: null,
    });
  });

  it("refuses text that is not UTF-8", async () => {
    write("pairs.csv", Uint8Array.of(0x72, 0xff, 0x0a));
    expect((await run("--pairs", "pairs.csv")).complaints).toEqual(["line 1: row: encoding"]);
  });

  it("lists what is wrong in both files, in order, without repeating values", async () => {
    write("pairs.csv", "ref_a,ref_b\nanna,zoe\nanna,anna\n");
    write("people.csv", "ref,interviewed\nanna,maybe\nanna,yes\n,no\n");
    expect((await run("--pairs", "pairs.csv", "--people", "people.csv")).complaints).toEqual([
      "people file",
      "line 2: interviewed: not_in_list",
      "line 3: ref: duplicate_ref",
      "line 4: ref: required",
      "pairs file",
      "line 2: ref_b: unknown_ref",
      "line 3: ref_b: self_contact",
    ]);
  });
});

describe("options", () => {
  const first = async (...args: string[]) => {
    write("pairs.csv", "ref_a,ref_b\na,b\n");
    const { code, complaints } = await run(...args);
    expect(code).toBe(2);
    return complaints[0];
  };

  it("need a pairs file that can be read", async () => {
    expect(await first()).toBe("--pairs: is needed");
    expect(await first("--pairs", "none.csv")).toBe("--pairs: no such file: none.csv");
    expect(await first("--pairs", ".")).toBe("--pairs: is a folder: .");
    expect(await first("--pairs", "pairs.csv", "--people", "none.csv")).toContain(
      "--people: no such file",
    );
  });

  it("refuse what they do not know", async () => {
    expect(await first("--pairs", "pairs.csv", "--pears", "x")).toContain("--pears");
    expect(await first("--pairs", "pairs.csv", "more")).toContain("more");
    expect(await first("--pairs")).toContain("--pairs");
    expect(await first("--pairs", "pairs.csv", "--pairs", "pairs.csv")).toBe(
      "--pairs: given more than once",
    );
  });

  it.each(["x", "1.5", "-1", "1e3", "", "99999999999999999999"])(
    "refuse the number %j",
    async (text) => {
      expect(await first("--pairs", "pairs.csv", `--population=${text}`)).toContain("--population");
      for (const name of ["--seed", "--replicates", "--workers"]) {
        expect(await first("--pairs", "pairs.csv", `${name}=${text}`)).toContain(name);
      }
    },
  );

  it("refuse a population smaller than the people in the files", async () => {
    expect(await first("--pairs", "pairs.csv", "--population", "1")).toBe(
      "--population: 1 is fewer than the 2 people in the files",
    );
  });

  it("take a population of exactly the people in the files", async () => {
    write("pairs.csv", "ref_a,ref_b\na,b\n");
    const { report } = await run("--pairs", "pairs.csv", "--population", "2");
    expect(report?.threshold.n).toBe(2);
  });
});
