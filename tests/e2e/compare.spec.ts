import { readFile } from "node:fs/promises";
import { expect, type Page, test } from "@playwright/test";
import type { CompareRun } from "../../shared/contracts/compare.ts";
import { investigationOf, signIn } from "./support/accounts.ts";
import { readApi } from "./support/api.ts";
import { expectAccessible } from "./support/axe.ts";
import { bringIn } from "./support/bring-in.ts";
import { karateFiles } from "./support/networks.ts";
import { watch } from "./support/watch.ts";

/** Asks for a comparison in the form of the room; ends on its page. */
async function ask(page: Page, name: string, exposures: "preset" | "all"): Promise<void> {
  await page.getByRole("button", { name: "New comparison" }).click();
  const form = page.getByRole("form", { name: "New comparison" });
  await form.getByLabel(/^Name/).fill(name);
  await form.getByLabel("People", { exact: true }).selectOption("all");
  await form.getByLabel("Exposures").selectOption(exposures);
  await form.getByRole("radio", { name: /^199/ }).check();
  await form.getByRole("button", { name: "Compare", exact: true }).click();
  await expect(page).toHaveURL(/\/compare\/runs\/[0-9a-f-]{36}$/);
  await expect(page.getByRole("heading", { level: 1, name })).toBeVisible();
}

const measures = (page: Page) =>
  page.getByRole("table", { name: "Measures against random networks" });

test("the epidemiologist compares the demo, leaves, returns and takes the run out", async ({
  page,
  context,
}) => {
  test.setTimeout(180_000);
  const watched = await watch(context);
  await signIn(page, "epidemiologist");
  const id = await investigationOf(page);
  await page.goto(`/i/${id}/compare`);
  const name = `Quick look ${Date.now() % 100_000}`;
  await ask(page, name, "preset");
  const address = page.url();
  await expect(page.getByRole("progressbar").or(measures(page)).first()).toBeVisible();

  // Left and reloaded while it runs, or just after: it is found in the list again.
  await page.goto(`/i/${id}/review`);
  await page.goto(`/i/${id}/compare`);
  const list = page.getByRole("table", { name: /^Comparisons/ });
  const row = list.getByRole("row").filter({ hasText: name });
  await expect(row).toContainText(/running|waiting|ready/);
  await expect(row.getByRole("cell", { name: "ready" })).toBeVisible({ timeout: 120_000 });
  await row.getByRole("link", { name }).click();
  await expect(page).toHaveURL(address);

  // What was seen, before any figure; then what may be compared, and the reasons in words.
  const seen = page.getByRole("region", { name: "What was seen" });
  await expect(seen).toContainText("people were found by tracing");
  await expect(seen).toContainText("A line is a contact, not an infection.");
  const standings = page.getByRole("table", { name: /^Comparisons and whether/ });
  await expect(standings.getByRole("row", { name: /^transitivity against/ })).toContainText(
    "greyed",
  );
  await expect(measures(page)).toContainText("random mixing, same interviews");

  // A row opens to its plots by keyboard, each with its table one key away.
  const opener = measures(page).getByRole("button", { name: "largest connected group, people" });
  await opener.focus();
  await page.keyboard.press("Enter");
  const plot = page.getByRole("figure", {
    name: "largest connected group, people, random mixing, same interviews",
  });
  await expect(plot).toContainText(/\d+ of 199 random networks had a value as (high|low): p/);
  await plot.focus();
  await page.keyboard.press("t");
  await expect(plot.getByRole("table").getByRole("row")).not.toHaveCount(0);
  await expectAccessible(page, "a comparison with a row open");

  // The curves are fetched when one comes near them.
  await page.getByRole("heading", { name: "Side by side" }).scrollIntoViewIfNeeded();
  // A plot and the whole run can be taken out.
  const [picture] = await Promise.all([
    page.waitForEvent("download"),
    page.getByRole("button", { name: "SVG of Connected groups by their number of people" }).click(),
  ]);
  const drawn = await readFile(await picture.path(), "utf8");
  expect(drawn).toMatch(/^<svg[^>]*viewBox/);
  expect(drawn).not.toMatch(/var\(--|class=/);
  const [file] = await Promise.all([
    page.waitForEvent("download"),
    page.getByRole("link", { name: "Download the run" }).click(),
  ]);
  const text = await readFile(await file.path(), "utf8");
  const run = await readApi<CompareRun>(
    page,
    `/api/investigations/${id}/compare/runs/${address.split("/").at(-1)}`,
  );
  expect(run.reached).toBe(199);
  expect(text).toContain(`"seed"`);
  expect(text).toContain(`"generator"`);
  expect(JSON.parse(text)).toBeInstanceOf(Object);

  // Run again: the same figures, to the last digit.
  await page.getByRole("button", { name: "Run again" }).click();
  await expect(page).not.toHaveURL(address);
  await expect(measures(page)).toBeVisible({ timeout: 120_000 });
  const again = await readApi<CompareRun>(
    page,
    `/api/investigations/${id}/compare/runs/${page.url().split("/").at(-1)}`,
  );
  expect(again.result).toEqual(run.result);
  await page.getByLabel("beside this one").selectOption(run.id);
  await expect(page.getByRole("table", { name: /^Measures side by side/ })).toBeVisible();
  watched.clear("a comparison of the demo");
});

test("the karate club: extreme against random mixing, ordinary once degrees are kept", async ({
  page,
  context,
}) => {
  test.setTimeout(240_000);
  const watched = await watch(context);
  const id = await bringIn(page, "Karate club compared", karateFiles());
  await page.goto(`/i/${id}/compare`);
  await ask(page, "Karate club", "all");
  await expect(measures(page)).toBeVisible({ timeout: 120_000 });
  await expect(page.getByRole("region", { name: "What was seen" })).toContainText(
    "every contact pair is on record",
  );
  const row = measures(page).getByRole("row", { name: /^transitivity/ });
  // Zachary 1977; 0.25568 by networkx and igraph (methods C.6.5).
  await expect(row.getByRole("cell").first()).toHaveText("0.2557");
  await expect(row).toContainText(
    "higher than in random mixing; ordinary once each person's number of contact pairs is kept",
  );
  await row.getByRole("button", { name: "transitivity" }).click();
  // Methods C.7.5: p of at most 0.00025 over 4,000 networks, 0.13 once degrees are kept.
  await expect(page.getByRole("figure", { name: "transitivity, random mixing" })).toContainText(
    /[01] of 199 random networks had a value as high/,
  );
  await expect(
    page.getByRole("figure", { name: "transitivity, numbers of pairs kept" }),
  ).toContainText(/of 199 random networks had a value as high: p = 0\.[012]/);
  watched.clear("the karate club");
});
