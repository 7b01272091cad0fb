import type { BrowserContext, Page } from "@playwright/test";

/** Text in which identities are looked for: everything that reached a browser, and what it shows. */
export interface Reached {
  /** Where of all that reached the browser one of the needles stands. */
  find: (needles: readonly string[]) => string[];
  /** Adds the document of a page as it stands, with the values of its boxes. */
  addPage: (page: Page) => Promise<void>;
}

interface Piece {
  where: string;
  text: string;
}

const plain = (text: string) => text.normalize("NFC").toLowerCase();
const digits = (text: string) => text.replace(/[\s().-]/g, "");

/** Collects the body and headers of every answer that a browser context gets. */
export function collectAnswers(context: BrowserContext): Reached & { settle: () => Promise<void> } {
  const pieces: Piece[] = [];
  const reading: Promise<void>[] = [];
  context.on("response", (response) => {
    const where = `${response.request().method()} ${response.url()}`;
    pieces.push({ where: `address or headers of ${where}`, text: where });
    pieces.push({ where, text: JSON.stringify(response.headers()) });
    // The live stream never ends, so it has no body to read; its messages are ids only by contract.
    if (/\/live$/.test(new URL(response.url()).pathname)) return;
    reading.push(
      response
        .text()
        .then((text) => void pieces.push({ where, text }))
        // An answer without a body, or one that was broken off by leaving the page.
        .catch(() => {}),
    );
  });
  return {
    find(needles) {
      return pieces.flatMap(({ where, text }) => {
        const bodies = [plain(text), digits(text)];
        const found = needles.filter((one) =>
          bodies.some((body) => body.includes(plain(one)) || body.includes(digits(one))),
        );
        return found.map((one) => `${one} in ${where}`);
      });
    },
    async addPage(page) {
      const text = await page.evaluate(() => {
        const boxes = [...document.querySelectorAll("input,textarea,select")];
        const values = boxes.map((box) => (box as HTMLInputElement).value);
        return [document.title, document.documentElement.outerHTML, ...values].join("\n");
      });
      pieces.push({ where: `the document at ${page.url()}`, text });
    },
    async settle() {
      await Promise.all(reading);
    },
  };
}
