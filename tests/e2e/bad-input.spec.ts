import { expect, type Page, test } from "@playwright/test";
import { signIn } from "./support/accounts.ts";
import { callApi, readApi } from "./support/api.ts";
import { expectAccessible } from "./support/axe.ts";
import { watch } from "./support/watch.ts";

async function checkFile(page: Page, kind: string, lines: readonly string[]): Promise<void> {
  await page.getByRole("radio", { name: kind }).check();
  await page.getByLabel("CSV file").setInputFiles({
    name: "list.csv",
    mimeType: "text/csv",
    buffer: Buffer.from(`${lines.join("\n")}\n`),
  });
  await page.getByRole("button", { name: "Check the file" }).click();
}

/** Problems as they are listed: line, column, meaning. */
async function problems(page: Page): Promise<string[][]> {
  const rows = page.getByRole("table", { name: /^Problems by line/ }).getByRole("row");
  await expect(rows.nth(1)).toBeVisible();
  const texts: string[][] = [];
  for (const row of (await rows.all()).slice(1)) {
    texts.push(await row.getByRole("cell").allTextContents());
  }
  return texts;
}

test("a file with errors is listed line by line, and nothing of it is stored", async ({
  page,
  context,
}) => {
  test.setTimeout(90_000);
  // The browser itself notes the refusal of the second file.
  const watched = await watch(context, { expected: /status of 422/ });
  const { investigationId: id } = await signIn(page, "supervisor");
  const people = `/api/investigations/${id}/people?pageSize=1`;
  const { total } = await readApi<{ total: number }>(page, people);

  await page.goto(`/i/${id}/trace/import`);
  await checkFile(page, "People", [
    "ref,name,onset_date,classification,phone",
    "BAD-1,Wendeline Marsh,2026-02-30,confirmed,",
    "BAD-2,Corin Reedbed,,perhaps,0161 496 0811",
    "BAD-3,Tamsin Oxbow,2026-01,contact,not a number",
    "BAD-3,Tamsin Oxbow,2026-01,contact,",
    "BAD-4,too,few",
    "GOOD-1,Ivo Saltpan,2026-01-04,suspected,refused",
  ]);
  await expect(page.getByText("6 rows in the file.")).toBeVisible();
  const notADay = "Not a calendar day (YYYY-MM-DD, or YYYY-MM)";
  expect(await problems(page)).toEqual([
    ["2", "onset_date", notADay],
    ["3", "classification", "Not one of the choices"],
    ["4", "phone", "Not a telephone number"],
    ["5", "ref", "This reference appears twice in the file"],
    ["6", "whole row", "This row has too few or too many cells"],
  ]);
  await expect(page.getByRole("button", { name: "Put 1 row on record" })).toBeVisible();
  // The list says where and what, never the value that stood there.
  await expect(page.getByRole("main")).not.toContainText("Wendeline");
  await expectAccessible(page, "an import with problems");

  await page.goto(`/i/${id}/trace/import`);
  await checkFile(page, "People", ["list number,surname", "X-1,Marsh"]);
  const refusal = page.getByRole("alert");
  await expect(refusal).toContainText("No column is taken for ref");
  await page.getByLabel("Column 1 is taken for").selectOption("ref");
  await expect(refusal).toHaveCount(0);
  await checkFile(page, "People", ["ref,name", 'X-1,"Marsh']);
  await expect(refusal).toContainText("The file was not taken.");
  await expect(refusal).toContainText("Line 2: A quotation mark is not closed");

  await checkFile(page, "Contact pairs", ["ref_a,ref_b,named_by", "NOWHERE-1,NOWHERE-2,NOWHERE-3"]);
  expect(await problems(page)).toContainEqual([
    "2",
    "named_by",
    "Must be one of the two references, or blank",
  ]);
  expect((await readApi<{ total: number }>(page, people)).total).toBe(total);
  watched.clear("importing bad files");
});

test("references not on record are errors until creating them is chosen", async ({ page }) => {
  const { investigationId: id } = await signIn(page, "supervisor");
  await page.goto(`/i/${id}/trace/import`);
  await checkFile(page, "Contact pairs", ["ref_a,ref_b", "MISSING-1,MISSING-2"]);
  expect(await problems(page)).toEqual([
    ["2", "ref_a", "This reference is not on record"],
    ["2", "ref_b", "This reference is not on record"],
  ]);
  await expect(page.getByText("No row of this file can be put on record as it is.")).toBeVisible();
  const create = page.getByLabel("Create missing people");
  await expect(create).not.toBeChecked();
  await create.check();
  await expect(page.getByRole("button", { name: "Put 1 row on record" })).toBeVisible();
});

test("a bad date is named beside its field, and everything typed stays", async ({ page }) => {
  const { investigationId: id } = await signIn(page, "tracer");
  const people = `/api/investigations/${id}/people?pageSize=1`;
  const { total } = await readApi<{ total: number }>(page, people);
  await page.goto(`/i/${id}/trace/people/new`);
  await page.getByLabel("Name", { exact: true }).fill("Hollis Dunegrass");
  await page.getByLabel("Telephone", { exact: true }).fill("0161 496 0622");
  await page.getByLabel("Classification").selectOption("suspected");
  const onset = page.getByLabel("Onset of illness", { exact: true });
  const register = page.getByRole("button", { name: "Register", exact: true });

  async function expectKept(value: string, meaning: RegExp): Promise<void> {
    await expect(onset).toHaveAttribute("aria-invalid", "true");
    await expect(onset).toHaveAccessibleDescription(meaning);
    await expect(onset).toHaveValue(value);
    await expect(page.getByLabel("Name", { exact: true })).toHaveValue("Hollis Dunegrass");
    await expect(page.getByLabel("Telephone", { exact: true })).toHaveValue("0161 496 0622");
    await expect(page.getByLabel("Classification")).toHaveValue("suspected");
    await expect(page).toHaveURL(`/i/${id}/trace/people/new`);
  }

  // No day of the calendar: the page itself knows.
  await onset.fill("2026-02-30");
  await register.click();
  await expectKept("2026-02-30", /Check: /);
  // Only the server knows what today is in the investigation's zone.
  await onset.fill("2031-01-01");
  await register.click();
  await expectKept("2031-01-01", /Check: In the future/);
  await expectAccessible(page, "a form with an error");
  expect((await readApi<{ total: number }>(page, people)).total).toBe(total);
});

test("a save over somebody else's is noticed, and both values are shown", async ({ page }) => {
  test.setTimeout(90_000);
  const { investigationId: id } = await signIn(page, "supervisor");
  const people = `/api/investigations/${id}/people`;
  const made = await callApi<{ id: string; version: number }>(page, "POST", people, {
    name: "Orla Tidewrack",
    classification: "suspected",
    occupation: "lock keeper",
    area: "Quayside",
  });
  await page.goto(`/i/${id}/trace/people/${made.id}`);
  await page.getByRole("button", { name: "Change Who" }).click();
  await page.getByLabel("Occupation").fill("ferry hand");

  // Meanwhile somebody saves another occupation, and an area nobody here touched.
  const { version } = await readApi<{ version: number }>(page, `${people}/${made.id}`);
  await callApi(page, "PATCH", `${people}/${made.id}`, {
    version,
    occupation: "rope maker",
    area: "Farshore",
  });
  await page.getByRole("button", { name: "Save", exact: true }).click();
  const conflict = page.getByRole("alert").filter({ hasText: "Someone else saved this record" });
  await expect(conflict).toBeVisible();
  const row = page.getByRole("table", { name: "The fields you changed" }).getByRole("row").nth(1);
  await expect(row.getByRole("rowheader")).toHaveText("Occupation");
  await expect(row.getByRole("cell")).toHaveText(["lock keeper", "rope maker", "ferry hand"]);
  await expect(page.getByLabel("Occupation")).toHaveValue("ferry hand");
  await expectAccessible(page, "a conflict");

  await page.getByRole("button", { name: "Save mine over it" }).click();
  await expect(page.getByText("Saved.")).toBeVisible();
  const saved = await readApi<{ occupation: string; area: string }>(page, `${people}/${made.id}`);
  expect(saved).toMatchObject({ occupation: "ferry hand", area: "Farshore" });
});
