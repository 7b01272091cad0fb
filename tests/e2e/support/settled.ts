import { expect, type Page } from "@playwright/test";

// The network picture is fetched when it comes near, so it may wait for as long as nobody goes there.
const waiting = "main [role='status']:not(#network-picture [role='status'])";

/** Waits until a page has its heading and nothing on it is still being loaded. */
export async function settled(page: Page): Promise<void> {
  await expect(page.getByRole("heading", { level: 1 })).toBeVisible();
  await expect(page.locator(waiting).filter({ hasText: /…$/ })).toHaveCount(0);
  await expect(page.locator("[aria-busy='true']")).toHaveCount(0);
}
