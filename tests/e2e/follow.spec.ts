import { expect, type Page, test } from "@playwright/test";
import { signIn } from "./support/accounts.ts";
import { expectAccessible } from "./support/axe.ts";
import { settled } from "./support/settled.ts";
import { watch } from "./support/watch.ts";

async function openFollow(page: Page): Promise<void> {
  await page.getByRole("link", { name: "Follow", exact: true }).click();
  await expect(page.getByRole("heading", { name: "Follow", level: 1 })).toBeVisible();
  await expect(page.getByRole("list", { name: "Contacts under follow-up" })).toBeVisible();
  await settled(page);
}

const noSidewaysScroll = (page: Page) =>
  page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth);

test("a round of follow-up, with one contact becoming a case", async ({ page, context }) => {
  const noticed = await watch(context);
  await signIn(page, "tracer");
  await page.goto("/");
  await openFollow(page);
  const rows = page.getByRole("list", { name: "Contacts under follow-up" }).getByRole("listitem");
  await expect(rows.first().getByText("symptoms reported")).toBeVisible();
  await expectAccessible(page, "the round");

  // Somebody without a symptom report stays in place when the check is recorded.
  const row = rows
    .filter({ hasNotText: "symptoms reported" })
    .filter({ has: page.getByRole("button", { name: "seen" }) })
    .first();
  const name = (await row.getByRole("link").first().textContent()) ?? "";
  const studyNumber = (await row.getByText(/^[0-9A-Z]{3}-[0-9A-Z]{4}$/).textContent()) ?? "";
  await row.getByRole("button", { name: "seen" }).click();
  await expect(page.getByText(`${name}: seen`)).toBeVisible();

  await page.setViewportSize({ width: 360, height: 780 });
  await openFollow(page);
  expect(await noSidewaysScroll(page)).toBe(true);
  const ill = rows.filter({ has: page.getByRole("link", { name, exact: true }) });
  await ill.getByRole("button", { name: "symptoms, note" }).click();
  await ill.getByRole("radio", { name: "yes" }).check();
  await ill.getByRole("checkbox", { name: "fever" }).check();
  await ill.getByRole("textbox", { name: "Note" }).fill("asks for a visit");
  expect(await noSidewaysScroll(page)).toBe(true);
  await expectAccessible(page, "the details of a check on a phone");
  await ill.getByRole("button", { name: "spoken to" }).click();
  await expect(ill.getByText("symptoms reported")).toBeVisible();

  await ill.getByRole("button", { name: "meets the definition" }).click();
  await page.getByRole("button", { name: "Make a case" }).click();
  await expect(page.getByText(`${name} is a case now`)).toBeVisible();
  await expect(ill).toHaveCount(0);

  // A case whom the tracer does not hold is a number to them from here on.
  await expect(rows.filter({ hasText: studyNumber })).toHaveCount(0);
  // Left first: an open page would go on asking in the name of the session that ends.
  const { pathname } = new URL(page.url());
  await page.goto("about:blank");
  await signIn(page, "supervisor");
  await page.setViewportSize({ width: 1440, height: 900 });
  await page.goto(`${pathname}?show=all&q=${studyNumber}`);
  await expect(rows.getByText("became a case")).toBeVisible();
  await rows.getByRole("link", { name, exact: true }).click();
  await expect(page.getByRole("heading", { name: "Follow-up" })).toBeVisible();
  await expect(page.getByRole("cell", { name: "asks for a visit" })).toBeVisible();
  await expectAccessible(page, "the follow-up of a case");
  noticed.clear("after the round");
});
