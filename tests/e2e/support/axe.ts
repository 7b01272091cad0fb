import AxeBuilder from "@axe-core/playwright";
import { expect, type Page } from "@playwright/test";

export interface AxeOptions {
  /** What a change of colours alone can break; everything otherwise. */
  contrastOnly?: boolean;
}

/** Rows beyond these are built like the ones before them; a page of a hundred takes axe very long. */
const furtherRows = "tbody tr:nth-child(n + 13)";

/** Fails when axe finds anything serious or critical on a page. */
export async function expectAccessible(
  page: Page,
  what: string,
  options: AxeOptions = {},
): Promise<void> {
  // A colour on its way from one theme to the other is neither.
  await page.evaluate(() =>
    Promise.all(
      document
        .getAnimations()
        .filter((animation) => animation instanceof CSSTransition)
        .map((transition) => transition.finished.catch(() => null)),
    ).then(() => null),
  );
  // Legacy mode: our pages hold no frames, and the other mode opens a page of its own each time.
  const axe = new AxeBuilder({ page }).setLegacyMode(true).exclude(furtherRows);
  if (options.contrastOnly) axe.withRules(["color-contrast"]);
  const { violations } = await axe.analyze();
  const grave = violations
    .filter(({ impact }) => impact === "serious" || impact === "critical")
    .map(({ id, nodes }) => `${id}: ${nodes.slice(0, 3).map(({ target }) => target.join(" "))}`);
  expect(grave, `axe on ${what}`).toEqual([]);
}
