import { expect, test } from "@playwright/test";
import { signIn } from "./support/accounts.ts";
import { expectAccessible } from "./support/axe.ts";
import { watch } from "./support/watch.ts";

test("a supervisor practises: opens, changes settings after a preview, empties", async ({
  page,
  context,
}) => {
  test.setTimeout(180_000);
  const seen = await watch(context);
  await signIn(page, "supervisor");
  await page.goto("/investigations");
  await page.getByRole("button", { name: "Open a new one" }).click();
  const name = `First steps ${Date.now()}`;
  const form = page.getByRole("region", { name: "New investigation" });
  await form.getByLabel(/^Name/).fill(name);
  await form.getByRole("checkbox", { name: "To practise with" }).check();
  await expectAccessible(page, "opening one to practise with");
  await page.getByRole("button", { name: "Open the investigation" }).click();
  await page.getByRole("button", { name: `Act here in ${name}` }).click({ timeout: 60_000 });
  await expect(page.getByRole("banner")).toContainText("To practise with: all is invented");

  await page.goto("/investigations");
  await page.getByRole("link", { name: "Open the settings" }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Settings" })).toBeVisible();
  await expect(page.getByText("Nothing was changed yet")).toBeVisible();
  const monitoring = page.getByRole("textbox", { name: /^Monitoring period/ });
  await monitoring.fill("21");
  await page.getByRole("textbox", { name: "New symptom" }).fill("Stiff neck");
  await page.keyboard.press("Enter");
  await expect(page.getByText("2 changes not saved.")).toBeVisible();
  await expect(page.getByRole("button", { name: "Save", exact: true })).toBeDisabled();
  await page.getByRole("button", { name: "See what would move" }).click();
  const moves = page.getByRole("table", { name: "What the change would move" });
  await expect(moves.getByRole("row").nth(1)).toContainText("Monitoring period");
  await expectAccessible(page, "settings with a preview");

  // Leaving is asked about first, and staying keeps what was typed.
  await page.getByRole("link", { name: "Review" }).click();
  await page.getByRole("button", { name: "Stay here" }).click();
  await expect(monitoring).toHaveValue("21");
  await page.getByRole("button", { name: "Save", exact: true }).click();
  await expect(page.getByText("Settings saved.")).toBeVisible();
  const history = page.getByRole("table", { name: "Changes of the settings, newest first" });
  await expect(history.getByRole("row", { name: /14 days 21 days/ })).toBeVisible();
  await expect(history.getByText("added Stiff neck")).toBeVisible();

  await page.getByRole("button", { name: "Empty and fill anew" }).click();
  const dialog = page.getByRole("alertdialog", { name: `Empty ${name} and fill it anew?` });
  await dialog.getByRole("textbox").fill(name);
  await expectAccessible(page, "the question before practice is emptied");
  await dialog.getByRole("button", { name: "Empty and fill anew" }).click();
  await expect(page.getByText("Emptied and filled anew.")).toBeVisible({ timeout: 60_000 });
  await expect(monitoring).toHaveValue("21");
  seen.clear("practising");
});
