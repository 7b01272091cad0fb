import { randomUUID } from "node:crypto";
import { expect, type Page, test } from "@playwright/test";
import { signIn } from "./support/accounts.ts";
import { readApi } from "./support/api.ts";
import { expectAccessible } from "./support/axe.ts";
import { watch } from "./support/watch.ts";

/** Semicolons, UTF-16 with a mark, and headings that are not ours. */
function germanFile(mark: string): Buffer {
  const lines = [
    "Kennung;Name;Rufnummer;Geburtstag;Erkrankt am;Bemerkung",
    `${mark}-1;Jördis ${mark};0161 496 0311;1980-02-03;2025-11-05;a`,
    `${mark}-2;Ludo ${mark};-;1991-04-04;05.11.2025;b`,
    `${mark}-3;Joerdis ${mark};+44 161 496 0311;;;c`,
    `${mark}-4;Jördis ${mark};0161 496 0311;;unknown;d`,
  ];
  return Buffer.from(`\uFEFF${lines.join("\r\n")}\r\n`, "utf16le");
}

async function choose(page: Page, buffer: Buffer): Promise<void> {
  await page.getByRole("radio", { name: "People" }).check();
  await page.getByLabel("CSV file").setInputFiles({
    name: "Liste.csv",
    mimeType: "text/csv",
    buffer,
  });
}

test("columns of a spreadsheet are chosen, and doubtful rows decided", async ({
  page,
  context,
}) => {
  test.setTimeout(120_000);
  const watched = await watch(context);
  const { investigationId: id } = await signIn(page, "supervisor");
  const people = `/api/investigations/${id}/people?pageSize=1`;
  const { total } = await readApi<{ total: number }>(page, people);
  // Letters only, so that the names are names and nobody else's.
  const mark = `Q${randomUUID().replace(/[^a-f]/g, "")}`;

  await page.goto(`/i/${id}/trace/import`);
  await choose(page, germanFile(mark));
  await expect(
    page.getByText(/^Read as UTF-16 \(little end first\) .* separated by semicolons\./),
  ).toBeVisible();
  await expect(page.getByLabel("Column 2 is taken for")).toHaveValue("name");
  await expect(page.getByLabel("Column 6 is taken for")).toHaveValue("");
  await page.getByRole("button", { name: "Check the file" }).click();
  await expect(page.getByRole("alert")).toContainText("No column is taken for ref");
  await expectAccessible(page, "choosing the columns of a file");
  for (const [at, column] of Object.entries({
    1: "ref",
    3: "phone",
    4: "birth_date",
    5: "onset_date",
  })) {
    await page.getByLabel(`Column ${at} is taken for`).selectOption(column);
  }
  await page.getByRole("button", { name: "Check the file" }).click();

  await expect(page.getByText("4 rows in the file.")).toBeVisible();
  await expect(page.getByText("1 person would be added.")).toBeVisible();
  await expect(page.getByText(/^2 rows may be somebody on record/)).toBeVisible();
  await expect(page.getByText("1 row has an error and would be left out.")).toBeVisible();
  await page.getByRole("button", { name: "Put 1 row on record" }).click();
  await expect(page.getByText("On record.", { exact: true })).toBeVisible({ timeout: 30_000 });

  const list = page.getByRole("list", { name: "Rows to decide" });
  await expect(list.getByRole("heading", { name: /^Line/ })).toHaveText([
    "Line 4 of the file",
    "Line 5 of the file",
  ]);
  await expectAccessible(page, "rows of a file to decide");
  await page.getByRole("button", { name: "Another person, line 4" }).click();
  await expect(page.getByText("1 row decided.")).toBeVisible();
  await page.getByRole("button", { name: "Same person, line 5" }).click();
  await expect(page.getByText("nothing waits")).toBeVisible();
  await expect(
    page.getByText("2 rows were set aside: 1 joined since, 1 added since, 0 to decide."),
  ).toBeVisible();
  expect((await readApi<{ total: number }>(page, people)).total).toBe(total + 2);
  watched.clear("importing a spreadsheet with headings of its own");
});
