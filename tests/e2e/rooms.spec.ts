import { type BrowserContext, expect, type Page, test } from "@playwright/test";
import { ROLES, ROOMS, ROOMS_OF, type Role, type Room } from "../../shared/roles.ts";
import { signIn } from "./support/accounts.ts";
import { readApi } from "./support/api.ts";
import { expectAccessible } from "./support/axe.ts";
import { tabTo } from "./support/keys.ts";
import { settled } from "./support/settled.ts";
import { type Watch, watch } from "./support/watch.ts";

type PersonRow = { id: string; can: { interview?: boolean } };
type PeopleList = { items: PersonRow[] };

const roomNames: Record<Room, string> = {
  trace: "Trace",
  follow: "Follow",
  review: "Review",
  compare: "Compare",
  safeguard: "Safeguard",
};

/** A desk and a phone. */
const sizes = [
  [1440, 900],
  [390, 844],
] as const;

/** A page that a role may open: its address and the heading by which one knows it is there. */
type Place = readonly [path: string, heading: string | RegExp];

/** Pages inside the investigation, by role. `{person}` is somebody in sight, `{case}` to interview. */
const pagesOf: Record<Role, readonly Place[]> = {
  tracer: [
    ["trace", "Trace"],
    ["trace/people/new", "Register a person"],
    ["trace/people/{person}", /./],
    ["trace/people/{case}/interview", /^Interview of /],
    ["trace/places", "Places"],
    ["follow", "Follow"],
    ["settings", "Settings"],
  ],
  supervisor: [
    ["trace", "Trace"],
    ["trace/people/new", "Register a person"],
    ["trace/people/{person}", /./],
    ["trace/people/{case}/interview", /^Interview of /],
    ["trace/places", "Places"],
    ["trace/import", "Import a list"],
    ["trace/export", "Export"],
    ["trace/matches", "Possible duplicates"],
    ["follow", "Follow"],
    ["review", "Review"],
    ["compare", "Compare"],
    ["settings", "Settings"],
    ["members", "Members"],
  ],
  epidemiologist: [
    ["trace", "Trace"],
    ["trace/people/{person}", /./],
    ["trace/places", "Places"],
    ["trace/export", "Export"],
    ["review", "Review"],
    ["compare", "Compare"],
    ["settings", "Settings"],
  ],
  officer: [
    ["trace", "Trace"],
    ["trace/people/{person}", /./],
    ["trace/places", "Places"],
    ["trace/import", "Import a list"],
    ["safeguard", "Safeguard"],
    ["safeguard?tab=events", "Safeguard"],
    ["safeguard?tab=members", "Safeguard"],
    ["settings", "Settings"],
    ["members", "Members"],
  ],
};

/** Pages that are never a role's, though they lie in a room that is. */
const refusedPages: Record<Role, readonly string[]> = {
  tracer: ["trace/import", "trace/matches", "members"],
  supervisor: [],
  epidemiologist: ["trace/people/new", "trace/import", "trace/matches", "members"],
  officer: ["trace/people/new", "trace/matches"],
};

/** One sign-in a role; every page of the role is then opened in the same browser context. */
async function enter(
  page: Page,
  role: Role,
): Promise<{ id: string; fill: (path: string) => string }> {
  const { investigationId } = await signIn(page, role);
  const id = investigationId as string;
  const api = `/api/investigations/${id}/people`;
  const { items } = await readApi<PeopleList>(page, `${api}?pageSize=50`);
  const waiting = await readApi<PeopleList>(page, `${api}?pageSize=50&needs=interview`);
  const person = items[0]?.id ?? "";
  const toInterview = waiting.items.find((one) => one.can.interview)?.id ?? "";
  const fill = (path: string) =>
    `/i/${id}/${path.replace("{person}", person).replace("{case}", toInterview)}`;
  return { id, fill };
}

async function lookAt(page: Page, address: string, heading: string | RegExp, watched: Watch) {
  for (const [width, height] of sizes) {
    const what = `${address} at ${width}`;
    await page.setViewportSize({ width, height });
    await page.emulateMedia({ colorScheme: "light" });
    await page.goto(address);
    await settled(page);
    await expect(page.getByRole("heading", { level: 1, name: heading })).toBeVisible();
    if (heading === "Compare") {
      // The picture is fetched when it comes near; what is drawn above may push it away once more.
      await expect(async () => {
        await page.locator("#network-picture").scrollIntoViewIfNeeded();
        const picture = page.getByRole("img", { name: /^Network picture: / });
        await expect(picture).toBeVisible({ timeout: 10_000 });
      }).toPass({ timeout: 60_000 });
    }
    await expect(page.getByText(/^Invented data: no person/)).toBeVisible();
    await expect(
      page.getByText(/Decision support for authorised public-health staff/),
    ).toBeVisible();
    await expect(
      page.getByText(/Open only the records you need; views are logged/).last(),
    ).toBeVisible();
    const wide = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    expect(wide, `${what} runs off the side of the screen by so many pixels`).toBeLessThanOrEqual(
      0,
    );
    await expectAccessible(page, `${what}, light`);
    await page.emulateMedia({ colorScheme: "dark" });
    await expectAccessible(page, `${what}, dark`, { contrastOnly: true });
    watched.clear(what);
  }
}

async function newPage(context: BrowserContext): Promise<[Page, Watch]> {
  const watched = await watch(context);
  return [await context.newPage(), watched];
}

for (const role of ROLES) {
  test(`every page of the ${role}, wide and narrow, light and dark`, async ({ context }) => {
    test.setTimeout(300_000);
    const [page, watched] = await newPage(context);
    const { fill } = await enter(page, role);
    for (const [path, heading] of pagesOf[role]) await lookAt(page, fill(path), heading, watched);
    await lookAt(page, "/investigations", "Investigations", watched);
  });

  test(`rooms of the ${role}: one key away, the others closed`, async ({ context }) => {
    test.setTimeout(120_000);
    const [page, watched] = await newPage(context);
    const { id, fill } = await enter(page, role);
    await page.goto("/");
    const nav = page.getByRole("navigation", { name: "Rooms" });
    const own = ROOMS_OF[role].map((room) => roomNames[room]);
    await expect(nav.getByRole("link")).toHaveText(own);

    const heading = page.getByRole("heading", { level: 1 });
    for (const room of ROOMS_OF[role]) {
      await page.keyboard.press(`Alt+${ROOMS.indexOf(room) + 1}`);
      await expect(page).toHaveURL(`/i/${id}/${room}`);
      await expect(heading).toHaveText(roomNames[room]);
    }
    const closed = ROOMS.filter((room) => !ROOMS_OF[role].includes(room));
    const here = page.url();
    for (const room of closed) {
      // The key of a room that is not the role's does nothing.
      await page.keyboard.press(`Alt+${ROOMS.indexOf(room) + 1}`);
      expect(page.url()).toBe(here);
    }
    for (const path of [...closed, ...refusedPages[role]]) {
      await page.goto(fill(path));
      await expect(page.getByText("Not open to the role you act in")).toBeVisible();
      await expect(page.getByRole("link", { name: "Back to your room" })).toBeVisible();
    }
    await expectAccessible(page, "a page not open to the role");
    // Somebody who is not there looks like somebody who is not to be seen.
    watched.clear("rooms");
    await page.goto(`/i/${id}/trace/people/00000000-0000-4000-8000-000000000000`);
    await expect(page.getByText("Not on record, or not assigned to you")).toBeVisible();
    await page.goto(`/i/${id}/nowhere`);
    await expect(page.getByText("No page has this address")).toBeVisible();
  });
}

test("sign-in and dialogs, wide and narrow, light and dark", async ({ context }) => {
  test.setTimeout(120_000);
  const [page, watched] = await newPage(context);
  const looks = async (what: string) => {
    for (const [width, height] of sizes) {
      await page.setViewportSize({ width, height });
      await page.emulateMedia({ colorScheme: "light" });
      await expectAccessible(page, `${what} at ${width}, light`);
      await page.emulateMedia({ colorScheme: "dark" });
      await expectAccessible(page, `${what} at ${width}, dark`, { contrastOnly: true });
    }
  };
  await page.goto("/");
  await expect(page.getByText(/Decision support for authorised public-health staff/)).toBeVisible();
  await looks("the sign-in page");

  const { investigationId: id } = await signIn(page, "officer");
  await page.goto(`/i/${id}/safeguard?tab=members`);
  await page.getByRole("button", { name: /^End the role of Demo tracer/ }).click();
  const dialog = page.getByRole("alertdialog");
  await expect(dialog).toBeVisible();
  await looks("a question in a dialog");
  // Nothing happens without an answer, and the focus goes back to where the question came from.
  await page.keyboard.press("Escape");
  await expect(dialog).toBeHidden();
  await expect(page.getByRole("button", { name: /^End the role of Demo tracer/ })).toBeFocused();

  await page.getByRole("button", { name: "Demo data officer", exact: true }).click();
  await expect(page.getByRole("dialog", { name: "Account" })).toBeVisible();
  await looks("the account panel");
  watched.clear("sign-in and dialogs");
});

test("keys for rooms stay out of fields and can be switched off", async ({ page }) => {
  const { investigationId: id } = await signIn(page, "supervisor");
  await page.goto(`/i/${id}/trace`);
  const find = page.getByLabel(/^Find by/);
  await find.focus();
  await page.keyboard.press("Alt+4");
  await expect(page).toHaveURL(`/i/${id}/trace`);

  await page.getByRole("button", { name: "Demo supervisor" }).click();
  await page.getByLabel("Alt with a digit opens a room").uncheck();
  await page.keyboard.press("Escape");
  await page.keyboard.press("Alt+4");
  await expect(page).toHaveURL(`/i/${id}/trace`);
  await page.getByRole("button", { name: "Demo supervisor" }).click();
  await page.getByLabel("Alt with a digit opens a room").check();
  await page.keyboard.press("Escape");
  await page.keyboard.press("Alt+4");
  await expect(page).toHaveURL(`/i/${id}/compare`);
});

test("the network picture has its table one key away", async ({ page }) => {
  test.setTimeout(120_000);
  const { investigationId: id } = await signIn(page, "epidemiologist");
  await page.goto(`/i/${id}/compare`);
  await settled(page);
  await page.getByRole("heading", { level: 1 }).focus();
  // The picture is fetched when it comes near: the way there leads past its own controls.
  const section = page.getByRole("region", { name: "Network picture" });
  await tabTo(page, section.getByRole("combobox").first());
  const picture = page.getByRole("figure", { name: "Network picture" });
  await expect(picture.getByRole("img", { name: /^Network picture: / })).toBeVisible();
  await tabTo(page, picture);
  await page.keyboard.press("t");
  const table = picture.getByRole("table");
  await expect(table.getByRole("columnheader", { name: "study number" })).toBeVisible();
  await expect(table.getByRole("row").nth(1).getByRole("rowheader")).toHaveText(/^[0-9A-Z]{3}-/);
  await page.keyboard.press("t");
  await expect(picture.getByRole("img", { name: /^Network picture: / })).toBeVisible();
});
