import { expect, test } from "@playwright/test";
import { expectAccessible } from "./support/axe.ts";
import { collectAnswers } from "./support/leaks.ts";
import { watch } from "./support/watch.ts";

// The other tests pass when these helpers find nothing; here they are shown to find something.

test("the watch notices a breach of the policy, a fault and a console line", async ({
  page,
  context,
}) => {
  const watched = await watch(context);
  await page.goto("/sign-in");
  await expect(page.getByRole("heading", { name: "Sign in" })).toBeVisible();
  watched.clear("the sign-in page as it is");

  await page.evaluate(() => {
    const picture = document.createElement("img");
    picture.alt = "";
    picture.src = "http://127.0.0.1:9/elsewhere.png";
    document.body.append(picture);
    console.warn("a warning");
    setTimeout(() => {
      throw new Error("a fault");
    });
  });
  const noticed = () => watched.faults.join("\n");
  await expect.poll(noticed).toContain("content-security policy: img-src");
  await expect.poll(noticed).toContain("console warning: a warning");
  await expect.poll(noticed).toContain("uncaught: a fault");
  expect(() => watched.clear("what was done to it")).toThrow();

  // Markup put into the page as such is refused by the browser itself.
  const refused = page.evaluate(() => {
    document.body.innerHTML = "<img src=x onerror=alert(1)>";
  });
  await expect(refused).rejects.toThrow(/TrustedHTML/);
  await expect.poll(noticed).toContain("content-security policy: require-trusted-types-for");
  expect(noticed()).not.toContain("dialog");
});

test("axe notices a button without a name", async ({ page }) => {
  await page.goto("/sign-in");
  await expect(page.getByRole("heading", { name: "Sign in" })).toBeVisible();
  await expectAccessible(page, "the sign-in page as it is");
  await page.evaluate(() =>
    document.querySelector("main")?.append(document.createElement("button")),
  );
  await expect(expectAccessible(page, "the spoilt page")).rejects.toThrow(/button-name/);
});

test("the search for names finds them in answers, boxes and spaced numbers", async ({
  page,
  context,
}) => {
  const reached = collectAnswers(context);
  await page.route("**/api/welcome", (route) =>
    route.fulfill({
      json: { signedIn: false, demo: true, setUpNeeded: false, extra: "Quilliam 0161 496" },
    }),
  );
  await page.goto("/sign-in");
  await page.getByLabel("E-mail").fill("someone.else@example.org");
  await reached.addPage(page);
  await reached.settle();
  expect(reached.find(["quilliam", "0161496", "SOMEONE.ELSE@example.org"])).toHaveLength(3);
  expect(reached.find(["Zebedee"])).toEqual([]);
});
