import { expect, type Locator, type Page } from "@playwright/test";

/** Presses Tab until a control has the focus; fails when it is not reached. */
export async function tabTo(page: Page, target: Locator, most = 60): Promise<void> {
  const reached = async () => (await target.and(page.locator(":focus")).count()) > 0;
  for (let presses = 0; presses < most && !(await reached()); presses++) {
    await page.keyboard.press("Tab");
  }
  await expect(target).toBeFocused();
}

/** Types into the box that has the focus, Enter leading on to the next box of the row. */
export async function typeBoxes(page: Page, boxes: readonly string[]): Promise<void> {
  for (const text of boxes) {
    if (text !== "") await page.keyboard.type(text);
    await page.keyboard.press("Enter");
  }
}
