import { type BrowserContext, expect, type Page, test } from "@playwright/test";
import { emailOf, signIn, signInByForm } from "./support/accounts.ts";
import { baseUrl } from "./support/api.ts";
import { settled } from "./support/settled.ts";
import { watch } from "./support/watch.ts";

const rooms = (page: Page) => page.getByRole("navigation", { name: "Rooms" }).getByRole("link");

async function sessionCookie(context: BrowserContext): Promise<string | undefined> {
  return (await context.cookies()).find(({ name }) => name === "strandline")?.value;
}

/** Everything a browser keeps for this site, and what its address bar and tab show. */
async function keptBy(page: Page): Promise<string> {
  return page.evaluate(async () => {
    const databases = await indexedDB.databases();
    const kept = {
      address: location.href,
      title: document.title,
      local: { ...localStorage },
      session: { ...sessionStorage },
      databases: databases.map(({ name }) => name),
      caches: await caches.keys(),
      cookies: document.cookie,
    };
    return JSON.stringify(kept);
  });
}

test("a person with two roles acts in one at a time", async ({ browser }) => {
  test.setTimeout(120_000);
  const officer = await (await browser.newContext()).newPage();
  const { investigationId: id } = await signIn(officer, "officer");
  await officer.goto(`/i/${id}/safeguard?tab=members`);
  await officer.getByRole("button", { name: "Add a member" }).click();
  await officer.getByLabel("E-mail of the account").fill(emailOf("supervisor"));
  await officer.getByLabel("Role here").selectOption("tracer");
  await officer.getByRole("button", { name: "Add the member" }).click();
  await expect(officer.getByText("Contact tracer added")).toBeVisible();

  const context = await browser.newContext();
  const page = await context.newPage();
  await signInByForm(page, "supervisor");
  await expect(rooms(page)).toHaveText(["Trace", "Follow", "Review", "Compare"]);
  const before = await sessionCookie(context);
  const acting = page.getByRole("combobox", { name: /^acting as/ });
  await acting.selectOption({ label: "Contact tracer" });
  await expect(rooms(page)).toHaveText(["Trace", "Follow"]);
  await expect(page.getByRole("heading", { level: 1, name: "Trace" })).toBeVisible();
  expect(await sessionCookie(context), "the session id after the switch").not.toBe(before);
  await page.goto(`/i/${id}/review`);
  await expect(page.getByText("Not open to the role you act in")).toBeVisible();
  const refused = await page.request.get(`${baseUrl()}/api/investigations/${id}/groups`);
  expect(refused.status(), "groups asked for by a tracer").toBe(403);
  await acting.selectOption({ label: "Supervisor" });
  await expect(rooms(page)).toHaveText(["Trace", "Follow", "Review", "Compare"]);

  // The switches stand in the access record; then the role is taken away again.
  await officer.getByRole("tab", { name: "Access events" }).click();
  const events = officer.getByRole("table", { name: /^Access events/ }).getByRole("row");
  const switches = events.filter({ hasText: "changed the acting role" });
  await expect(switches.filter({ hasText: "Demo supervisor" }).first()).toBeVisible();
  await officer.getByRole("tab", { name: "Members" }).click();
  await officer
    .getByRole("button", { name: "End the role of Demo supervisor as contact tracer" })
    .click();
  await officer.getByRole("button", { name: "End the membership" }).click();
  await expect(officer.getByText("Membership of Demo supervisor ended")).toBeVisible();
  await page.goto("/");
  await expect(rooms(page).first()).toBeVisible();
  await expect(acting).toHaveCount(0);
});

test("a wrong password and an unknown account are answered alike", async ({ page }) => {
  await page.goto("/");
  for (const email of [emailOf("tracer"), "nobody@strandline.example"]) {
    await page.getByLabel("E-mail").fill(email);
    await page.getByLabel("Password").fill("not the password at all");
    await page.getByRole("button", { name: "Sign in" }).click();
    const alert = page.getByRole("alert");
    await expect(alert).toHaveText(/^Not signed in\.\s*E-mail or password is not right/);
    await expect(page.getByLabel("Password")).toHaveValue("");
    await page.reload();
  }
  await expect(page.getByRole("heading", { name: "Sign in" })).toBeVisible();
});

test("after signing out the Back button shows nothing", async ({ page, context }) => {
  const watched = await watch(context);
  await signInByForm(page, "tracer");
  const line = page.getByRole("table", { name: "People on record" }).getByRole("rowheader").first();
  const studyNumber = ((await line.textContent()) ?? "").match(/[0-9A-Z]{3}-[0-9A-Z]{4}/)?.[0];
  expect(studyNumber, "a study number in the line list").toBeTruthy();
  await line.getByRole("link").click();
  await expect(page.getByRole("heading", { name: "Contact pairs" })).toBeVisible();
  await page.getByRole("button", { name: "Demo tracer" }).click();
  await page.getByRole("button", { name: "Sign out" }).click();
  await expect(page.getByRole("heading", { name: "Sign in" })).toBeVisible();
  // Two pages lie behind; before them the browser was empty.
  for (let steps = 0; steps < 2; steps++) {
    await page.goBack();
    await expect(page.getByRole("heading", { name: "Sign in" })).toBeVisible();
    expect(await page.content()).not.toContain(studyNumber);
  }
  const again = await page.request.get(`${baseUrl()}/api/session`);
  expect(again.status()).toBe(401);
  watched.clear("signing out and going back");
});

test("an idle page warns, is locked when the session is over, and keeps what was typed", async ({
  page,
}) => {
  test.setTimeout(120_000);
  await page.clock.install();
  const { investigationId: id } = await signIn(page, "supervisor");
  await page.goto(`/i/${id}/trace/people/new`);
  await page.getByLabel("Occupation").pressSequentially("net mender");
  // The server has not heard of the typing yet: the page tells it, and then nothing happens.
  const told = page.waitForResponse(/\/api\/session$/);
  await page.clock.fastForward("05:00");
  await told;
  await page.clock.fastForward("13:20");
  const warning = page.getByRole("alertdialog", { name: "Still there?" });
  await expect(warning).toBeVisible();
  await warning.getByRole("button", { name: "Stay signed in" }).click();
  await expect(warning).toBeHidden();

  // Signed out elsewhere: the page finds out when its time is up.
  const signedOut = await page.request.delete(`${baseUrl()}/api/session`, {
    headers: { Origin: baseUrl() },
  });
  expect(signedOut.status()).toBe(204);
  await page.clock.fastForward("15:30");
  const lock = page.getByRole("dialog", { name: "Signed out" });
  await expect(lock).toBeVisible();
  await expect(lock.getByLabel("E-mail")).toHaveValue(emailOf("supervisor"));
  await lock.getByLabel("Password").fill(process.env.E2E_PASSWORD as string);
  await lock.getByRole("button", { name: "Sign in" }).click();
  await expect(lock).toBeHidden();
  await expect(page.getByLabel("Occupation")).toHaveValue("net mender");
});

test("nothing that identifies a person is kept by the browser", async ({ page }) => {
  test.setTimeout(120_000);
  const [name, phone] = ["Perrigold Ashmantle", "0161 496 0655"];
  const needles = [...name.split(" "), phone, phone.replaceAll(" ", ""), "1614960655"];
  const look = async (when: string) => {
    const kept = await keptBy(page);
    const found = needles.filter((one) => kept.toLowerCase().includes(one.toLowerCase()));
    expect(found, when).toEqual([]);
  };
  const { investigationId: id } = await signIn(page, "tracer");
  await page.goto(`/i/${id}/trace/people/new`);
  await page.getByLabel("Name", { exact: true }).fill(name);
  await page.getByLabel("Telephone", { exact: true }).fill(phone);
  await page.getByLabel("Classification").selectOption("contact");
  await look("while registering");
  await page.getByRole("button", { name: "Register", exact: true }).click();
  await expect(page.getByRole("heading", { name: "Contact pairs" })).toBeVisible();
  await expect(page.getByText(name).first()).toBeVisible();
  await look("on the page of the person");
  await page.getByRole("button", { name: "Change Who" }).click();
  await expect(page.getByLabel("Name", { exact: true })).toHaveValue(name);
  await look("while changing the person");
  await page.goto(`/i/${id}/trace`);
  await page.getByLabel(/^Find by/).fill("Ashmantle");
  const list = page.getByRole("table", { name: "People on record" });
  await expect(list.getByText(name)).toBeVisible();
  await look("while searching");
  await page
    .getByRole("link", { name: /^(Interview|Go on) / })
    .first()
    .click();
  await page.getByRole("group", { name: "Contact 1", exact: true }).waitFor();
  const box = page.getByRole("group", { name: /^Contact/ }).last();
  await box.getByLabel("Name").fill(name);
  await box.getByLabel("Phone").fill(phone);
  await expect(page.getByText(/^Draft saved \d/)).toBeVisible();
  await look("while interviewing");
  await box.getByLabel("Name").fill("");
  await box.getByLabel("Phone").fill("");
  await page.getByRole("link", { name: "Leave, keep the draft" }).click();
  await settled(page);
  await look("after the interview");
});

test("markup in a name or a place is text", async ({ page, context }) => {
  test.setTimeout(120_000);
  const watched = await watch(context);
  const person = "<img src=x onerror=alert(1)>";
  const place = `"><script>alert(1)</script>`;
  const { investigationId: id } = await signIn(page, "supervisor");
  await page.goto(`/i/${id}/trace/places`);
  await page.getByRole("button", { name: "Record a place" }).click();
  await page.getByLabel("Name", { exact: true }).fill(place);
  await page.getByLabel("Setting").selectOption("social");
  await page.getByRole("button", { name: "Record the place" }).click();
  await expect(page.getByRole("button", { name: "Record a place" })).toBeVisible();
  await page.getByLabel("per page").selectOption("100");
  const recorded = page.getByRole("table", { name: "Places on record" }).getByText(place);
  const next = page.getByRole("button", { name: "Next" });
  await settled(page);
  for (let pages = 1; pages < 20 && !(await recorded.first().isVisible()); pages++) {
    await next.click();
    await settled(page);
  }
  await expect(recorded.first()).toBeVisible();

  await page.goto(`/i/${id}/trace/people/new`);
  await page.getByLabel("Name", { exact: true }).fill(person);
  await page.getByLabel("Classification").selectOption("confirmed");
  await page.getByLabel("Note").fill(`${person}${place}`);
  await page.getByRole("button", { name: "Register", exact: true }).click();
  // A case leads on to its interview, where the same words are typed as a contact and a group.
  const contact = page.getByRole("group", { name: "Contact 1", exact: true });
  await contact.getByLabel("Name").fill(`${person} again`);
  await contact.getByLabel("Setting").selectOption("social");
  await contact.getByLabel("Place").fill(place);
  await contact.getByLabel("first day of exposure").fill("-1");
  await page.getByLabel(/^Outcome/).selectOption("complete");
  await page.getByRole("button", { name: "Record the interview" }).click();
  await expect(page.getByRole("heading", { level: 1 })).toHaveText(person);
  await expect(page.getByText(`${person} again`).first()).toBeVisible();
  const address = page.url();

  const everywhere = ["trace", "trace/places", "trace/matches", "follow", "review", "compare"];
  for (const path of [...everywhere.map((one) => `/i/${id}/${one}`), address]) {
    await page.goto(path);
    await settled(page);
  }
  await page.goto(`/i/${id}/trace`);
  await page.getByLabel(/^Find by/).fill("onerror");
  const list = page.getByRole("table", { name: "People on record" });
  await expect(list.getByText(person, { exact: true })).toBeVisible();
  expect(await page.locator("img[src='x']").count()).toBe(0);
  watched.clear("markup in names and places");
});
