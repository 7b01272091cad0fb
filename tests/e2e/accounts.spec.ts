import { expect, test } from "@playwright/test";
import type { Session } from "../../shared/contracts/session.ts";
import { signInByForm } from "./support/accounts.ts";
import { readApi } from "./support/api.ts";
import { expectAccessible } from "./support/axe.ts";
import { watch } from "./support/watch.ts";

const phrase = "gannets over the harbour wall";
const next = "a ferry leaves the quay at nine";

test("a supervisor opens an investigation and invites a tracer, who joins from the inbox", async ({
  page,
  browser,
}) => {
  const seen = await watch(page.context());
  const email = `rowan-${Date.now()}@trace.example`;
  await signInByForm(page, "supervisor");
  await page.goto("/investigations");
  await page.getByRole("button", { name: "Open a new one" }).click();
  const name = `Invited shore ${Date.now()}`;
  const form = page.getByRole("region", { name: "New investigation" });
  await form.getByLabel(/^Name/).fill(name);
  await form.getByRole("checkbox", { name: /invented/i }).check();
  await page.getByRole("button", { name: "Open the investigation" }).click();
  await page.getByRole("button", { name: `Act here in ${name}` }).click();
  // Acting elsewhere gives the session a new id; who asks with the old one is signed out.
  await page.waitForURL(/\/i\/[0-9a-f-]{36}\//);
  await expect(page.getByRole("navigation", { name: "Rooms" })).toBeVisible();

  const { displayName } = await readApi<Session>(page, "/api/session");
  await page.getByRole("button", { name: displayName }).click();
  await page.getByRole("link", { name: "Members and invitations" }).click();
  await page.getByRole("button", { name: "Invite by e-mail" }).click();
  await page.getByRole("textbox", { name: "E-mail" }).fill(email);
  await page.getByLabel("Role here").selectOption("tracer");
  await page.getByRole("button", { name: "Send the invitation" }).click();
  await expect(page.getByRole("table", { name: /Open invitations/ })).toContainText(email);
  await expectAccessible(page, "members");

  const other = await browser.newContext();
  const guestSeen = await watch(other);
  const guest = await other.newPage();
  await guest.goto("/inbox");
  const letter = guest.getByRole("article", { name: new RegExp(email) });
  await expect(letter).toBeVisible({ timeout: 15_000 });
  await expectAccessible(guest, "inbox");
  await letter.getByRole("link").click();
  await expect(guest.getByText(name)).toBeVisible();
  expect(new URL(guest.url()).hash).toBe("");
  await guest.getByLabel("Your name").fill("Rowan Ferry");
  await guest.getByLabel("Password").fill(phrase);
  await expectAccessible(guest, "invitation");
  await guest.getByRole("button", { name: "Make the account and join" }).click();
  await guest.getByRole("link", { name: "Sign in" }).click();
  await guest.getByLabel("E-mail").fill(email);
  await guest.getByLabel("Password").fill(phrase);
  await guest.getByRole("button", { name: "Sign in" }).click();
  await expect(guest.getByRole("navigation", { name: "Rooms" })).toBeVisible();

  await guest.goto("/password");
  await guest.getByLabel("Password now").fill(phrase);
  await guest.getByLabel("New password").fill(next);
  await expectAccessible(guest, "change password");
  await guest.getByRole("button", { name: "Change the password" }).click();
  await expect(guest.getByText("Password changed.")).toBeVisible();
  await expect(guest.getByRole("navigation", { name: "Rooms" })).toBeVisible();

  await page.reload();
  await expect(page.getByRole("table", { name: /Members of this/ })).toContainText("Rowan Ferry");
  seen.clear("inviting");
  guestSeen.clear("joining");
  await other.close();
});

test("a forgotten password is replaced with the link of a letter", async ({ page }) => {
  await page.goto("/sign-in");
  await page.getByRole("link", { name: "Forgotten password" }).click();
  await expectAccessible(page, "forgotten password");
  await page.getByLabel("E-mail").fill("nobody-at-all@trace.example");
  await page.getByRole("button", { name: "Send a link" }).click();
  await expect(page.getByText(/If an account has this address/)).toBeVisible();
  await page.goto(`/new-password#${"x".repeat(43)}`);
  await page.getByLabel("New password").fill(next);
  await expectAccessible(page, "new password");
  await page.getByRole("button", { name: "Change the password" }).click();
  await expect(page.getByText("This link opens nothing.")).toBeVisible();
});
