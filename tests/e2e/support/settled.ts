import { expect, type Page } from "@playwright/test";

/** Waits until a page has its heading and nothing on it is still being loaded. */
export async function settled(page: Page): Promise<void> {
  await expect(page.getByRole("heading", { level: 1 })).toBeVisible();
  await expect(page.getByRole("status").filter({ hasText: /…$/ })).toHaveCount(0);
  await expect(page.locator("[aria-busy='true']")).toHaveCount(0);
}
