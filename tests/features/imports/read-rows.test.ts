import { describe, expect, it } from "vitest";
import { pairsChecker } from "../../../server/features/imports/check-pairs.ts";
import { peopleChecker } from "../../../server/features/imports/check-people.ts";
import { planReading } from "../../../server/features/imports/read-headings.ts";
import { type FileRow, readRows } from "../../../server/features/imports/read-rows.ts";
import { COLUMNS_OF, type ImportKind } from "../../../server/features/imports/staged-row.ts";
import type { HttpProblem } from "../../../server/http/problem.ts";

const TODAY = "2026-03-10";
const ZONE = "Europe/London";

async function rowsOf(bytes: Buffer | string, kind: ImportKind = "people"): Promise<FileRow[]> {
  const out: FileRow[] = [];
  const file = Buffer.isBuffer(bytes) ? bytes : Buffer.from(bytes);
  const reading = await planReading(file, kind);
  for await (const row of readRows(file, COLUMNS_OF[kind].all, reading)) out.push(row);
  return out;
}

async function refusal(bytes: Buffer | string, kind: ImportKind = "people") {
  const error = await rowsOf(bytes, kind).then(
    () => undefined,
    (thrown: unknown) => thrown as HttpProblem,
  );
  return error?.errors?.map(({ path, code }) => `${path} ${code}`);
}

async function people(text: string | Buffer) {
  const check = peopleChecker(TODAY, ZONE);
  const checked = (await rowsOf(text)).map(check);
  return {
    rows: checked.flatMap(({ row }) => row ?? []),
    problems: checked.flatMap(({ problems }) =>
      problems.map(({ line, column, code }) => `${line} ${column} ${code}`),
    ),
  };
}

async function pairs(text: string) {
  const check = pairsChecker(TODAY, ZONE);
  const checked = (await rowsOf(text, "pairs")).map(check);
  return {
    rows: checked.flatMap(({ row }) => row ?? []),
    problems: checked.flatMap(({ problems }) =>
      problems.map(({ line, column, code }) => `${line} ${column} ${code}`),
    ),
  };
}

describe("files that are accepted whole", () => {
  it.each([
    ["byte-order mark", "\uFEFFref,name\nA,Ann\nB,Bo\n"],
    ["CRLF", "ref,name\r\nA,Ann\r\nB,Bo\r\n"],
    ["CR alone", "ref,name\rA,Ann\rB,Bo\r"],
    ["mixed line ends", "ref,name\r\nA,Ann\nB,Bo\r"],
    ["no final line end", "ref,name\nA,Ann\nB,Bo"],
    ["blank lines and rows of commas only", "ref,name\n\nA,Ann\n,\n\n\nB,Bo\n\n\n"],
    ["blank surplus cells", "ref,name\nA,Ann,,\nB,Bo\n"],
    ["spaces about headings and cells", " ref , name \n A , Ann\nB,Bo \n"],
  ])("%s", async (_name, text) => {
    const { rows, problems } = await people(text);
    expect(problems).toEqual([]);
    expect(rows.map((row) => row.cells)).toEqual([
      { ref: "A", name: "Ann" },
      { ref: "B", name: "Bo" },
    ]);
  });

  it("keeps quoted commas, line feeds and doubled quotation marks, and counts lines by them", async () => {
    const { rows } = await people('ref,address\nA,"Mill Lane 1,\r\nrear ""B"""\nB,x\n');
    expect(rows).toEqual([
      { line: 2, cells: { ref: "A", address: 'Mill Lane 1,\nrear "B"' } },
      { line: 4, cells: { ref: "B", address: "x" } },
    ]);
  });

  it("keeps markup, formulas, other scripts and astral characters as they are", async () => {
    const names = [
      "<img src=x onerror=alert(1)>",
      "=1+1",
      "+x",
      "-x",
      "@x",
      "＝1",
      "مريم",
      "🧑🏽‍🚀",
    ];
    const text = `ref,name\n${names.map((name, at) => `${at},${name}`).join("\n")}`;
    const { rows, problems } = await people(text);
    expect(problems).toEqual([]);
    expect(rows.map((row) => row.cells.name)).toEqual(names);
  });

  it("splits a file into slices without breaking characters or line ends", async () => {
    // 64 kB slices fall at every offset of a four-byte character and of a CRLF.
    for (let shift = 0; shift < 6; shift++) {
      const first = `ref,name\r\n${"x".repeat(shift)}`;
      const line = (at: number) => `R${at},${"🧑é".repeat(4)}\r\n`;
      const text = first + Array.from({ length: 3000 }, (_, at) => line(at)).join("");
      const { rows, problems } = await people(text);
      expect(problems).toEqual([]);
      expect(rows).toHaveLength(3000);
      expect(rows.every((row) => row.cells.name === "🧑é".repeat(4))).toBe(true);
      expect(rows.at(-1)?.line).toBe(3001);
    }
  });
});

describe("files that are refused whole", () => {
  it.each([
    ["latin-1", Buffer.from("ref,name\nA,Ren\xe9\n", "latin1"), ["file.line.2.byte.15 encoding"]],
    [
      "half a UTF-16 character",
      Buffer.from("\uFEFFref,name\nA,B\n", "utf16le").subarray(0, -1),
      ["file.line.2.byte.27 encoding"],
    ],
    ["UTF-16 without mark", Buffer.from("ref,name\nA,B\n", "utf16le"), ["file encoding"]],
    ["zip", Buffer.from("504b0304aabb", "hex"), ["file not_csv"]],
    ["gzip", Buffer.from("1f8b0800aabb", "hex"), ["file not_csv"]],
    ["PDF", Buffer.from("%PDF-1.7\n"), ["file not_csv"]],
    ["older office file", Buffer.from("d0cf11e0a1b11ae1", "hex"), ["file not_csv"]],
    ["nothing", Buffer.alloc(0), ["file empty_file"]],
    ["blank lines only", Buffer.from("\n\n\n"), ["file empty_file"]],
    ["a heading only", Buffer.from("ref,name\n"), ["file empty_file"]],
    ["bars", Buffer.from("ref|name\nA|B\n"), ["file wrong_delimiter"]],
    [
      "unclosed quote",
      Buffer.from('ref,name\nA,Ann\nB,"Bo\nC,Cy\n'),
      ["file.line.3 unclosed_quote"],
    ],
    ["stray quote", Buffer.from('ref,name\nA,An"n\n'), ["file.line.2 stray_quote"]],
    [
      "endless cell",
      Buffer.from(`ref,name\nA,${"x".repeat(300_000)}\n`),
      ["file.line.2 row_too_long"],
    ],
    ["unknown column", Buffer.from("ref,shoe_size\nA,44\n"), ["file.columns.2 unknown_column"]],
    ["missing column", Buffer.from("name\nAnn\n"), ["file.columns.ref required_column"]],
    [
      "a column twice",
      Buffer.from("ref,name,name\nA,B,C\n"),
      ["file.columns.name duplicate_column"],
    ],
  ])("%s", async (_name, bytes, errors) => {
    expect(await refusal(bytes)).toEqual(errors);
  });

  it("does not repeat a heading that may be somebody's data", async () => {
    const errors = await refusal("Zelda Quist,+44 7700 900123\nB,C\n");
    expect(errors).toEqual([
      "file.columns.1 unknown_column",
      "file.columns.2 unknown_column",
      "file.columns.ref required_column",
    ]);
  });

  it("takes headings that name the prototype for unknown columns", async () => {
    expect(await refusal("ref,__proto__,constructor\nA,x,y\n")).toEqual([
      "file.columns.2 unknown_column",
      "file.columns.3 unknown_column",
    ]);
    expect(({} as Record<string, unknown>).x).toBeUndefined();
  });

  it("names both missing columns of a pairs file", async () => {
    expect(await refusal("setting\nsocial\n", "pairs")).toEqual([
      "file.columns.ref_a required_column",
      "file.columns.ref_b required_column",
    ]);
  });
});

describe("rows that are refused", () => {
  it("ragged rows, short and long", async () => {
    const { rows, problems } = await people("ref,name,area\nA,Ann\nB,Bo,North,more\nC,Cy,\n");
    expect(problems).toEqual(["2 row ragged_row", "3 row ragged_row"]);
    expect(rows.map((row) => row.cells.ref)).toEqual(["C"]);
  });

  it("dates that are no days, and days to come", async () => {
    const dates = [
      ["2024-02-29", null],
      ["2023-02-29", "not_a_day"],
      ["2024-13-01", "not_a_day"],
      ["2024-04-31", "not_a_day"],
      ["03/04/2024", "not_a_day"],
      ["24-04-03", "not_a_day"],
      ["0001-01-01", "not_a_day"],
      ["9999-01-01", "not_a_day"],
      ["45351", "not_a_day"],
      ["2024-04", null],
      ["2026-03", null],
      ["2026-03-10", null],
      ["2026-03-11", "in_future"],
      ["2026-04", "in_future"],
      ["unknown", null],
      ["refused", null],
    ] as const;
    const text = `ref,onset_date\n${dates.map(([day], at) => `${at},${day}`).join("\n")}`;
    const { rows, problems } = await people(text);
    expect(problems).toEqual(
      dates.flatMap(([, code], at) => (code ? [`${at + 2} onset_date ${code}`] : [])),
    );
    expect(rows.map((row) => row.cells.onset_date)).toEqual(
      dates.flatMap(([day, code]) => (code ? [] : [day])),
    );
  });

  it("control characters, over-long cells, wrong words, addresses and telephones", async () => {
    const { problems } = await people(
      [
        "ref,name,phone,email,sex,classification,interviewed",
        "A,An\0n,,,,,",
        `B,${"x".repeat(121)},,,,,`,
        "C,,1.23E+11,not-an-address,woman,case,maybe",
        "D,,+44 7700 900123,ann@example.org,unknown,not_a_case,yes",
        ",Ann,,,,,",
        "unknown,Ann,,,,,",
      ].join("\n"),
    );
    expect(problems).toEqual([
      "2 name bad_character",
      "3 name too_long",
      "4 phone not_a_phone",
      "4 email not_an_email",
      "4 sex not_in_list",
      "4 classification not_in_list",
      "4 interviewed not_in_list",
      "6 ref required",
      "7 ref required",
    ]);
  });

  it("a reference that appears again; case counts, spaces about it do not", async () => {
    const { rows, problems } = await people("ref\nA\na\n A \nB\n");
    expect(problems).toEqual(["4 ref duplicate_ref"]);
    expect(rows.map((row) => row.cells.ref)).toEqual(["A", "a", "B"]);
  });

  it("a result before its specimen", async () => {
    const { problems } = await people(
      "ref,specimen_date,result_date\nA,2026-02-03,2026-02-02\nB,2026-02-03,2026-02\n",
    );
    expect(problems).toEqual(["2 result_date result_before_specimen"]);
  });

  it("pairs with oneself, told by a third, out of order, or with bad numbers", async () => {
    const { rows, problems } = await pairs(
      [
        "ref_a,ref_b,first_exposure,last_exposure,minutes,distance_m,named_by,setting",
        "A,A,,,,,,",
        "A,B,,,,,C,",
        "A,B,2026-02-03,2026-02-01,,,,",
        'A,B,,,15.5,"1,5",,pub',
        "A,B,,,-1,1001,,",
        "A,B,2026-02,unknown,refused,1.50,B,health_care",
      ].join("\n"),
    );
    expect(problems).toEqual([
      "2 ref_b self_contact",
      "3 named_by named_by_other",
      "4 last_exposure last_before_first",
      "5 setting not_in_list",
      "5 minutes not_a_whole_number",
      "5 distance_m not_a_number",
      "6 minutes too_small",
      "6 distance_m too_big",
    ]);
    expect(rows.map((row) => row.cells)).toEqual([
      {
        ref_a: "A",
        ref_b: "B",
        first_exposure: "2026-02",
        last_exposure: "unknown",
        minutes: "refused",
        distance_m: "1.5",
        named_by: "B",
        setting: "health_care",
      },
    ]);
  });
});

describe("a large file", () => {
  it("is read and checked without holding the event loop", async () => {
    const rows = Array.from(
      { length: 40_000 },
      (_, at) => `R${at},Name ${at},+44 7700 90${String(at % 10_000).padStart(4, "0")},2026-01-05`,
    );
    const file = Buffer.from(`ref,name,phone,onset_date\n${rows.join("\n")}\n`);
    let turns = 0;
    let running = true;
    const turn = () => {
      turns += 1;
      if (running) setImmediate(turn);
    };
    setImmediate(turn);
    const reading = await planReading(file, "people");
    const check = peopleChecker(TODAY, ZONE);
    let good = 0;
    for await (const row of readRows(file, COLUMNS_OF.people.all, reading))
      if (check(row).row) good += 1;
    running = false;
    expect(good).toBe(40_000);
    // Not a timing: the file is 40 slices long, and others had their turn after each.
    expect(turns).toBeGreaterThanOrEqual(Math.floor(file.length / 65_536));
  });
});
