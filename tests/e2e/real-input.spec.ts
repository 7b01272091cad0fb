import { expect, type Locator, type Page, test } from "@playwright/test";
import type { NetworkSummary } from "../../shared/contracts/network.ts";
import { readApi } from "./support/api.ts";
import { bringIn } from "./support/bring-in.ts";
import { interviewedFiles, karateFiles, lesMiserablesFiles } from "./support/networks.ts";
import { watch } from "./support/watch.ts";

/** The report by the API, once the graph has followed the import. */
async function reportOf(
  page: Page,
  id: string,
  query: string,
  pairs: number,
): Promise<NetworkSummary> {
  const path = `/api/investigations/${id}/network/summary?${query}`;
  await expect
    .poll(async () => (await readApi<NetworkSummary>(page, path)).pairs, { timeout: 20_000 })
    .toBe(pairs);
  return readApi<NetworkSummary>(page, path);
}

/** What the table of measures says of one measure: value, interval, n. */
async function expectMeasure(page: Page, label: string, wanted: readonly string[]): Promise<void> {
  const table = page.getByRole("table", { name: "Measures of the network" });
  const row = table.getByRole("row").filter({
    has: page.getByRole("rowheader", { name: label, exact: true }),
  });
  // The figures of the question before stand there until those of the new one have come.
  for (const [column, text] of wanted.entries()) {
    await expect(row.getByRole("cell").nth(column), `${label}, ${column}`).toHaveText(text);
  }
}

/** A box of the question that every figure of Compare is about. */
function questionBox(page: Page, name: "people" | "exposures"): Locator {
  const question = page.getByRole("form", { name: "What the figures are about" });
  return question.getByRole("combobox", { name });
}

async function openCompare(page: Page, id: string, population: string): Promise<void> {
  await page.goto(`/i/${id}/compare`);
  await questionBox(page, "people").selectOption(population);
  await questionBox(page, "exposures").selectOption("all");
  await expect(page.getByRole("table", { name: "Measures of the network" })).toBeVisible();
}

test("Zachary's karate club as a complete network", async ({ page, context }) => {
  test.setTimeout(180_000);
  const watched = await watch(context);
  const id = await bringIn(page, "Karate club", karateFiles());
  const report = await reportOf(page, id, "population=all&window=all", 78);

  // Zachary 1977, by graphology-generators; computed with networkx and igraph (methods C.6.5).
  expect(report.people).toBe(34);
  expect(report.density).toBeCloseTo(0.139037433155, 11);
  expect(report.meanDegree).toBeCloseTo(4.588235294118, 11);
  expect(report.transitivity).toBeCloseTo(0.255681818182, 11);
  expect(report.componentSizes).toEqual([34]);
  expect(report.isolates).toBe(0);
  expect(report.largestShare).toBe(1);
  // Largest degree 17 and the sum of squared degrees 1212 (methods C.6.5).
  expect(report.degreeCounts.length - 1).toBe(17);
  expect(report.degreeCounts.reduce((sum, people, k) => sum + people * k * k, 0)).toBe(1212);
  // Wilson limits by scipy (methods C.2.3); the window is 34^(-1/3) = 1 − 0.691321.
  expect(report.threshold.population).toBe("complete");
  expect(report.threshold.pairsPerPerson).toBeCloseTo(4.588235294118, 11);
  expect(report.threshold.pairsPerPersonInterval?.[0]).toBeCloseTo(3.724189049823, 11);
  expect(report.threshold.pairsPerPersonInterval?.[1]).toBeCloseTo(5.614304183473, 11);
  expect(report.threshold.criticalHalfWidth).toBeCloseTo(1 - 0.691321, 6);
  // Methods C.2.4: karate lies above.
  expect(report.threshold.verdict).toBe("above");

  await openCompare(page, id, "all");
  await expect(page.getByText(/^Above the threshold of 1 contact pair per person/)).toBeVisible();
  await expectMeasure(page, "people", ["34", "", "34"]);
  await expectMeasure(page, "contact pairs", ["78", "", "34"]);
  await expectMeasure(page, "density, pairs of all possible pairs", ["0.139", "", "34"]);
  await expectMeasure(page, "transitivity", ["0.256", "", "34"]);
  await expectMeasure(page, "contact pairs per person, seen through the interviews", [
    "4.59",
    "3.72–5.61",
    "34",
  ]);
  watched.clear("importing and reading the karate club");
});

test("the Les Misérables network as a complete network", async ({ page, context }) => {
  test.setTimeout(180_000);
  const watched = await watch(context);
  const files = lesMiserablesFiles();
  const id = await bringIn(page, "Les Misérables", files);
  const report = await reportOf(page, id, "population=all&window=all", 254);

  // Knuth 1993, by vega-datasets; computed with networkx and igraph (methods C.6.5).
  expect(report.people).toBe(77);
  expect(report.density).toBeCloseTo(0.086807928913, 11);
  expect(report.meanDegree).toBeCloseTo(6.597402597403, 11);
  expect(report.threshold.pairsPerPerson).toBeCloseTo(6.597402597403, 11);
  expect(report.transitivity).toBeCloseTo(0.498931623932, 11);
  expect(report.componentSizes).toEqual([77]);
  expect(report.isolates).toBe(0);
  // Largest degree 36 (Valjean) and the sum of squared degrees 6124 (methods C.6.5).
  expect(report.degreeCounts.length - 1).toBe(36);
  expect(report.degreeCounts.reduce((sum, people, k) => sum + people * k * k, 0)).toBe(6124);
  expect(report.threshold.verdict).toBe("above");

  await openCompare(page, id, "all");
  await expectMeasure(page, "people", ["77", "", "77"]);
  await expectMeasure(page, "contact pairs", ["254", "", "77"]);
  await expectMeasure(page, "transitivity", ["0.499", "", "77"]);
  await expectMeasure(page, "density, pairs of all possible pairs", ["0.087", "", "77"]);

  // The same file twice adds nothing.
  await page.goto(`/i/${id}/trace/import`);
  await page.getByRole("radio", { name: "Contact pairs" }).check();
  await page.getByLabel("CSV file").setInputFiles({
    name: "again.csv",
    mimeType: "text/csv",
    buffer: Buffer.from(files.pairs),
  });
  await page.getByRole("button", { name: "Check the file" }).click();
  await expect(page.getByText("This very file is on record already.")).toBeVisible();
  expect((await reportOf(page, id, "population=all&window=all", 254)).people).toBe(77);
  watched.clear("importing and reading Les Misérables");
});

test("a network seen through 100 interviews of 1,000 people", async ({ page, context }) => {
  test.setTimeout(180_000);
  const watched = await watch(context);
  const id = await bringIn(page, "Seen through interviews", interviewedFiles());
  await reportOf(page, id, "population=all&window=all", 475);
  const report = await readApi<NetworkSummary>(
    page,
    `/api/investigations/${id}/network/summary?population=interviewed`,
  );

  // Methods C.8, box at its head: i 100, n 1000, 475 pairs; limits by scipy.
  expect(report.threshold).toMatchObject({ population: "interviewed", n: 1000, interviewed: 100 });
  expect(report.threshold.pairsPerPerson).toBeCloseTo(4.997630331754, 11);
  expect(report.threshold.pairsPerPersonInterval?.[0]).toBeCloseTo(4.568890972301, 11);
  expect(report.threshold.pairsPerPersonInterval?.[1]).toBeCloseTo(5.466380931629, 11);
  expect(report.threshold.verdict).toBe("above");
  expect(report.coverage).toBeCloseTo(0.1, 11);
  // Each of the 475 pairs has one interviewed end: 4.75 a person, and none within their own graph.
  expect(report.meanDegreeInterviewed).toBeCloseTo(4.75, 11);
  expect([report.people, report.pairs]).toEqual([100, 0]);

  await openCompare(page, id, "interviewed");
  await expectMeasure(page, "contact pairs per person, seen through the interviews", [
    "5.00",
    "4.57–5.47",
    "1,000",
  ]);
  await expect(page.getByText(/seen through interviews with 100 of 1,000 people/)).toBeVisible();
  // Everybody on record gets no verdict at this coverage.
  await questionBox(page, "people").selectOption("all");
  await expect(page.getByText(/^Numbers without a verdict, because/)).toBeVisible();
  watched.clear("importing and reading the interviewed fixture");
});
