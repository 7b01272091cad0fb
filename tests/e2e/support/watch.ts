import { type BrowserContext, expect } from "@playwright/test";
import { baseUrl } from "./api.ts";

/** What went wrong in the pages of a browser context, in words; empty when nothing did. */
export interface Watch {
  readonly faults: string[];
  /** Fails with everything noticed since the last call. */
  clear: (when: string) => void;
}

export interface WatchOptions {
  /** Console lines that the test itself provokes, such as a refused sign-in. */
  expected?: RegExp;
}

const binding = "noteViolation";

/**
 * Notes console errors and warnings, uncaught errors, breaches of the content-security policy,
 * dialogs, and requests to any other address, in every page of a context.
 */
export async function watch(context: BrowserContext, options: WatchOptions = {}): Promise<Watch> {
  const faults: string[] = [];
  await context.exposeBinding(binding, (_source, words: string) => {
    faults.push(`content-security policy: ${words}`);
  });
  await context.addInitScript((name) => {
    document.addEventListener("securitypolicyviolation", (event) => {
      const note = Reflect.get(window, name) as (words: string) => void;
      note(`${event.violatedDirective} ${event.blockedURI} ${event.sourceFile}`);
    });
  }, binding);
  context.on("console", (message) => {
    const text = message.text();
    if (!["error", "warning"].includes(message.type()) || options.expected?.test(text)) return;
    faults.push(`console ${message.type()}: ${text}`);
  });
  context.on("weberror", (error) => faults.push(`uncaught: ${error.error().message}`));
  context.on("dialog", (dialog) => {
    faults.push(`dialog: ${dialog.message()}`);
    void dialog.dismiss();
  });
  context.on("request", (request) => {
    const url = request.url();
    if (!url.startsWith(`${baseUrl()}/`) && !/^(data|blob):/.test(url)) {
      faults.push(`request off origin: ${url}`);
    }
  });
  return {
    faults,
    clear(when) {
      const found = faults.splice(0);
      expect(found, when).toEqual([]);
    },
  };
}
