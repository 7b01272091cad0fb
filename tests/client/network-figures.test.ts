import { parse } from "csv-parse/sync";
import { describe, expect, it } from "vitest";
import { degreeBars, sizeBars } from "../../src/features/compare/count-bars.ts";
import { measureRows } from "../../src/features/compare/measure-rows.ts";
import { pictureElements, pictureStyle } from "../../src/features/compare/picture-elements.ts";
import { pictureNodes } from "../../src/features/compare/picture-nodes.ts";
import { reportCsv } from "../../src/features/compare/report-csv.ts";
import { isReversed, readQuestion } from "../../src/features/compare/use-question.ts";
import { growthText } from "../../src/features/review/group-columns.tsx";
import { growthSentence } from "../../src/features/review/growth-sentence.ts";
import { groupCode, groupColor, groupPlaces } from "../../src/lib/group-places.ts";
import { questionParameters } from "../../src/lib/network-summary-query.ts";
import { toCsv } from "../../src/lib/to-csv.ts";
import { graphOf, ids, summaryOf } from "./support/network-answers.ts";

describe("degree bars", () => {
  it("keep gaps, drop empty ends, and sum the tail", () => {
    expect(degreeBars([3, 0, 2, 0, 0])).toEqual([
      { label: "0", value: 3 },
      { label: "1", value: 0 },
      { label: "2", value: 2 },
    ]);
    const long = Array.from({ length: 41 }, () => 1);
    expect(degreeBars(long)).toHaveLength(22);
    expect(degreeBars(long).at(-1)).toEqual({ label: "21+", value: 20 });
    expect(degreeBars([])).toEqual([]);
    expect(degreeBars([0, 0])).toEqual([]);
  });
});

describe("size bars", () => {
  it("count every group once, in classes that do not overlap", () => {
    const bars = sizeBars([12, 6, 5, 2, 1, 1]);
    expect(bars.map(({ label, value }) => [label, value])).toEqual([
      ["1", 2],
      ["2", 1],
      ["3", 0],
      ["4", 0],
      ["5", 1],
      ["6–10", 1],
      ["11–20", 1],
    ]);
    expect(sizeBars([20_000]).at(-1)).toEqual({ label: "10001+", value: 1 });
    expect(sizeBars([])).toEqual([]);
  });
});

describe("measures", () => {
  const row = (id: string, summary = summaryOf()) => {
    const found = measureRows(summary).find((candidate) => candidate.id === id);
    if (!found) throw new Error(`no row ${id}`);
    return found;
  };

  it("hold only the figure of the strip against the threshold", () => {
    expect(row("pairsPerPerson")).toMatchObject({ value: 1.52, interval: [1.28, 1.78], n: 1036 });
    expect(row("meanDegree").remark).toContain("not to be held against 1");
    expect(row("meanDegreeInterviewed")).toMatchObject({ value: 2.4, n: 214 });
    expect(row("meanDegreeInterviewed").remark).toContain("about 1 too high");
  });

  it("leave the expected share out below 90 % coverage, with the reason", () => {
    expect(row("expectedGiantShare")).toMatchObject({
      value: null,
      remark: "not compared: fewer than 90 % of the people were interviewed",
    });
    expect(row("expectedGiantShare", summaryOf({ coverage: 0.95 })).value).toBe(0.594);
  });

  it("give the reason of what is undefined", () => {
    const summary = summaryOf({ transitivity: null, reasons: { transitivity: "no_two_paths" } });
    expect(row("transitivity", summary)).toMatchObject({
      value: null,
      remark: "nobody here has two contact pairs",
    });
  });

  it("count groups of two or more only", () => {
    expect(row("groups").value).toBe(5);
  });
});

describe("report as CSV", () => {
  const rows: Record<string, string>[] = parse(reportCsv(summaryOf({ transitivity: null })), {
    columns: true,
  });

  it("carries people, days, cut-off and version with each figure", () => {
    const figure = rows.find((row) => row.figure?.startsWith("contact pairs per person"));
    expect(figure).toMatchObject({
      value: "1.52",
      low: "1.28",
      high: "1.78",
      n: "1036",
      exposures_from: "2026-05-15",
      cut_off: "2026-05-27T18:00:00.000Z",
      graph_version: "1482",
    });
    expect(rows.find((row) => row.figure === "transitivity")?.value).toBe("");
  });

  it("counts people by pairs and groups by size, and holds no person", () => {
    const degrees = rows.filter((row) => row.figure === "people by number of contact pairs");
    expect(degrees.map((row) => row.value)).toEqual(["123", "40", "30", "21"]);
    const sizes = rows.filter((row) => row.figure === "connected groups by size");
    expect(sizes.map((row) => [row.item, row.value])).toEqual([
      ["1", "123"],
      ["2", "2"],
      ["7", "1"],
      ["20", "1"],
      ["60", "1"],
    ]);
    expect(Object.keys(rows[0] ?? {})).not.toContain("study_number");
  });
});

describe("CSV text", () => {
  it("quotes what must be quoted and defuses formulas", () => {
    expect(
      toCsv(
        ["a", "b"],
        [
          ['say "x"', "=1+1"],
          [null, -2],
        ],
      ),
    ).toBe('a,b\r\n"say ""x""",\'=1+1\r\n,-2\r\n');
  });
});

describe("groups", () => {
  const group = (id: string, size: number, grownSince = 0) => ({
    id,
    size,
    cases: 1,
    contacts: size - 1,
    grownSince,
  });

  it("have places by size that decide colours, and codes that stay", () => {
    const places = groupPlaces([group(ids.small, 2), group(ids.large, 9)]);
    expect(groupColor(places, ids.large)).toBe(0);
    expect(groupColor(places, ids.small)).toBe(1);
    expect(groupColor(places, ids.one)).toBe("rest");
    expect(groupCode(ids.large)).toBe("G-AAAAA");
    expect(groupCode(`${ids.large}-2`)).toBe("G-AAAAA-2");
  });

  it("say what grew, and when it is the least that grew", () => {
    const since = "today, 00:00";
    expect(growthSentence([], 0, since)).toContain("no connected group yet");
    expect(growthSentence([group("x", 4)], 1, since)).toBe(
      "No group changed since today, 00:00; 1 connected group on record.",
    );
    expect(growthSentence([group("x", 4, 3), group("y", 2, 0)], 9, since)).toBe(
      "1 group grew by 3 people since today, 00:00; 9 connected groups on record.",
    );
    expect(growthSentence([group("x", 4, 3), group("y", 2, 1)], 9, since)).toBe(
      "At least 2 groups grew by at least 4 people since today, 00:00; 9 connected groups on record.",
    );
    expect([growthText(3), growthText(0), growthText(-2)]).toEqual(["+3", "0", "−2"]);
  });
});

describe("question in the address", () => {
  it("falls back to interviewed people in the preset window", () => {
    const read = readQuestion(
      new URLSearchParams("population=everyone&from=2026-02-30&asOf=0026-05-01"),
    );
    expect(read).toEqual({
      question: {
        population: "interviewed",
        window: "preset",
        from: undefined,
        to: undefined,
        asOf: undefined,
      },
      drawn: { population: "all", exposures: "all", unpaired: false, group: undefined },
    });
  });

  it("sends days with a free range only, and no window beside them", () => {
    const free = { population: "all", window: "free", from: "2026-05-01" } as const;
    expect(questionParameters(free)).toMatchObject({ window: undefined, from: "2026-05-01" });
    expect(questionParameters({ ...free, window: "all" })).toMatchObject({
      window: "all",
      from: undefined,
    });
    expect(isReversed({ ...free, to: "2026-04-30" })).toBe(true);
    expect(isReversed({ ...free, to: "2026-05-01" })).toBe(false);
  });
});

describe("network picture", () => {
  const places = new Map([[ids.large, 4]]);
  const nodes = pictureNodes(graphOf(), places);

  it("lists people by group, then by study number as a number", () => {
    expect(nodes.map(({ label }) => label)).toEqual(["S-9", "S-10", "S-2"]);
    expect(nodes.map(({ pairs }) => pairs)).toEqual([1, 1, 0]);
    expect(nodes.map(({ words }) => words)).toEqual([
      "confirmed case",
      "contact",
      "not classified",
    ]);
  });

  it("colours by the group's place in the whole record, others grey", () => {
    expect(nodes.map(({ color }) => color)).toEqual([4, 4, "rest"]);
  });

  it("puts marks where the server says, with a line a pair", () => {
    const elements = pictureElements(nodes, graphOf().pairs, {
      theme: "light",
      markUrl: (mark) => `blob:${mark.classification}`,
    });
    expect(elements).toHaveLength(4);
    expect(elements[1]).toMatchObject({
      data: { id: ids.two, label: "S-10", mark: "blob:contact" },
      position: { x: 40, y: 0 },
    });
    expect(elements[3]?.data).toEqual({ id: "pair-0", source: ids.one, target: ids.two });
  });

  it("draws groups as discs whose area is their people", () => {
    const group = graphOf()
      .nodes.slice(0, 1)
      .map((node) => ({ ...node, size: 100 }));
    const graph = graphOf({ level: "groups", nodes: group, pairs: [] });
    const [disc] = pictureElements(pictureNodes(graph, places), [], {
      theme: "dark",
      markUrl: () => "",
    });
    expect(disc?.data).toMatchObject({ label: "G-AAAAA · 100", side: 220, fill: "#aa4499" });
  });

  it("has a look of its own in each theme", () => {
    expect(pictureStyle("light")).not.toEqual(pictureStyle("dark"));
  });
});
