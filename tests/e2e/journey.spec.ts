import { type Browser, expect, type Page, test } from "@playwright/test";
import type { AccessEvent } from "../../shared/contracts/safeguard.ts";
import { investigationOf, signInByForm } from "./support/accounts.ts";
import { readApi } from "./support/api.ts";
import { tabTo, typeBoxes } from "./support/keys.ts";
import { collectAnswers } from "./support/leaks.ts";
import { settled } from "./support/settled.ts";
import { type Watch, watch } from "./support/watch.ts";

type Group = { id: string; size: number };
type Groups = { items: Group[]; total: number; graphVersion: number };
type Graph = { nodes: { id: string; group: string }[]; pairs: unknown[] };

// Names that no generator makes; each of their words is looked for later where no name may be.
const given = "Quillon Zephrine Ostrava Wimble Jaxine Thrupp Yolante Brizio Fenwyck Ludmeer Sorrel";
const contacts = [...given.split(" "), "Mirrabel"].map((name, index) => ({
  name: `${name} Hexworthy`,
  phone: `0161 496 0${String(731 + index)}`,
}));
const place = "Lanternfish Pottery Class";
const typed = [...contacts.flatMap(({ name, phone }) => [...name.split(" "), phone]), place];

const allGroups = async (page: Page, id: string): Promise<Groups> => {
  const path = `/api/investigations/${id}/groups?pageSize=200&page=`;
  const first = await readApi<Groups>(page, `${path}1`);
  for (let next = 2; first.items.length < first.total && next < 50; next++) {
    first.items.push(...(await readApi<Groups>(page, path + next)).items);
  }
  return first;
};

const groupCode = (id: string) => `G-${id.slice(0, 5).toUpperCase()}`;

async function open(browser: Browser, watches: Watch[]): Promise<Page> {
  const context = await browser.newContext();
  watches.push(await watch(context));
  return context.newPage();
}

/** Types the contacts of one stretch; the first of all carries day, setting and place. */
async function typeContacts(page: Page, from: number, to: number): Promise<void> {
  for (let row = from; row < to; row++) {
    const contact = contacts[row] as (typeof contacts)[number];
    await expect(
      page.getByRole("group", { name: `Contact ${row + 1}`, exact: true }),
    ).toBeVisible();
    await typeBoxes(page, [contact.name, contact.phone]);
    if (row === 0) {
      // Setting by its first letter, days by how far they lie back, figures, answers, relation.
      await typeBoxes(page, ["s", place, "-2", "=", "90", "1,5", "n", "y", "same class"]);
    } else {
      await page.keyboard.press("Control+'");
      if (row < to - 1) await page.keyboard.press("Control+Enter");
    }
  }
}

test("a 12-contact interview, followed by everybody whose work it is", async ({ browser }) => {
  test.setTimeout(300_000);
  const watches: Watch[] = [];

  // The supervisor has Review open before anything happens, and never reloads it.
  const supervisor = await open(browser, watches);
  await signInByForm(supervisor, "supervisor");
  await supervisor.getByRole("link", { name: "Review", exact: true }).click();
  const groupRows = supervisor.getByRole("table", { name: "Connected groups" }).getByRole("row");
  await expect(groupRows.nth(1)).toBeVisible();
  const id = await investigationOf(supervisor);
  const before = await allGroups(supervisor, id);
  await supervisor.evaluate(() => Reflect.set(window, "neverReloaded", true));

  const tracer = await open(browser, watches);
  await signInByForm(tracer, "tracer");
  const interview = tracer.getByRole("link", { name: /^(Interview|Go on) [0-9A-Z]{3}-/ }).last();
  await interview.focus();
  await tracer.keyboard.press("Enter");
  const heading = tracer.getByRole("heading", { level: 1, name: /^Interview of / });
  await expect(heading).toBeVisible();
  const studyNumber = ((await heading.textContent()) ?? "").replace("Interview of ", "");
  const caseId = new URL(tracer.url()).pathname.split("/").at(-2) as string;

  // From here on only keys.
  const firstBox = tracer.getByRole("group", { name: "Contact 1" }).getByLabel("Name");
  await expect(firstBox).toBeFocused();
  await typeContacts(tracer, 0, 6);
  await expect(tracer.getByText(/^Draft saved \d/)).toBeVisible();

  await tracer.reload();
  await expect(tracer.getByText("Taken up again.")).toBeVisible();
  for (const [row, contact] of contacts.slice(0, 6).entries()) {
    const group = tracer.getByRole("group", { name: `Contact ${row + 1}`, exact: true });
    await expect(group.getByLabel("Name")).toHaveValue(contact.name);
    await expect(group.getByLabel("Phone")).toHaveValue(contact.phone);
    await expect(group.getByLabel("Place")).toHaveValue(place);
  }
  await expect(tracer.getByRole("group", { name: "Contact 6" }).getByLabel("Name")).toBeFocused();
  await tracer.keyboard.press("Control+Enter");
  await typeContacts(tracer, 6, 12);

  await tabTo(tracer, tracer.getByRole("button", { name: "Add a group" }));
  await tracer.keyboard.press("Enter");
  await expect(tracer.getByRole("group", { name: "Group 1" }).getByLabel("Setting")).toBeFocused();
  await typeBoxes(tracer, ["t", "ferry to the far quay", "-1", "="]);
  await tracer.keyboard.type("12 ±3");
  await expect(tracer.getByText("between 9 and 15 people")).toBeVisible();

  const outcome = tracer.getByRole("combobox", { name: /^Outcome/ });
  await tabTo(tracer, outcome);
  await tracer.keyboard.press("c");
  await expect(outcome).toHaveValue("complete");
  await tracer.keyboard.press("Tab");
  await tracer.keyboard.press("Space");
  await expect(tracer.getByRole("radio", { name: "telephone" })).toBeChecked();
  await tabTo(tracer, tracer.getByRole("button", { name: "Record the interview" }));
  await tracer.keyboard.press("Enter");
  await expect(tracer.getByText(/Interview recorded with 12 contacts and 1 group/)).toBeVisible();
  // The person's page, where the tracer who listed them may read the names.
  await expect(tracer.getByRole("heading", { name: "Contact pairs" })).toBeVisible();
  for (const { name } of contacts) await expect(tracer.getByText(name).first()).toBeVisible();
  await expect(tracer.getByText("Met but not named")).toBeVisible();

  // The supervisor sees the group grow, live.
  const graph = await readApi<Graph>(
    supervisor,
    `/api/investigations/${id}/network/graph?population=all&window=all`,
  );
  const groupId = graph.nodes.find((node) => node.id === caseId)?.group as string;
  const sizeOf = (groups: Groups) => groups.items.find((one) => one.id === groupId)?.size;
  const grown = sizeOf(await allGroups(supervisor, id)) as number;
  const was = sizeOf(before) ?? 1;
  expect(grown, "people in the group of the case").toBe(was + contacts.length);
  const row = groupRows.filter({ hasText: groupCode(groupId) });
  await expect(row.getByRole("cell").nth(1)).toHaveText(grown.toLocaleString("en-GB"));
  await expect(row.getByRole("cell").nth(0)).toHaveText(/^\+\d+$/);
  expect(await supervisor.evaluate(() => Reflect.get(window, "neverReloaded"))).toBe(true);
  await supervisor.goto(`/i/${id}/trace/people/${caseId}`);
  await expect(supervisor.getByText(contacts[0]?.name as string).first()).toBeVisible();

  // The epidemiologist sees the same network without a name.
  const epidemiologist = await open(browser, watches);
  const reached = collectAnswers(epidemiologist.context());
  await signInByForm(epidemiologist, "epidemiologist");
  await expect(epidemiologist.getByRole("heading", { level: 1, name: "Compare" })).toBeVisible();
  await epidemiologist.goto(`/i/${id}/compare?group=${groupId}`);
  const picture = epidemiologist.getByRole("figure", { name: "Network picture" });
  await expect(
    picture.getByText(new RegExp(`^${grown.toLocaleString("en-GB")} people of`)),
  ).toBeVisible();
  await picture.focus();
  await epidemiologist.keyboard.press("t");
  await picture.getByLabel("per page").selectOption("100");
  const caseRow = picture.getByRole("table").getByText(studyNumber, { exact: true });
  const next = picture.getByRole("button", { name: "Next" });
  for (let page = 1; page < 30 && !(await caseRow.isVisible()); page++) await next.click();
  await expect(caseRow).toBeVisible();
  const drawn = `/api/investigations/${id}/network/graph?population=all&window=all&group=${groupId}`;
  const seen = await readApi<Graph>(epidemiologist, drawn);
  const same = await readApi<Graph>(supervisor, drawn);
  expect({ ...seen, cutOff: "" }).toEqual({ ...same, cutOff: "" });
  await reached.addPage(epidemiologist);
  for (const path of ["review", "trace", `trace/people/${caseId}`]) {
    await epidemiologist.goto(`/i/${id}/${path}`);
    await settled(epidemiologist);
    await reached.addPage(epidemiologist);
  }
  // Looked for by name and by number: nobody is found, and nothing is given away.
  await epidemiologist.goto(`/i/${id}/trace`);
  const search = epidemiologist.getByLabel("Find by study number");
  await search.fill(contacts[0]?.name as string);
  await expect(epidemiologist.getByText("Nobody in sight fits this")).toBeVisible();
  await search.fill(studyNumber);
  const people = epidemiologist.getByRole("table", { name: "People on record" });
  await expect(people.getByText(studyNumber)).toBeVisible();
  await reached.addPage(epidemiologist);
  await reached.settle();
  expect(reached.find(typed.filter((words) => words !== place))).toEqual([]);
  // A control: the search does find what is there.
  expect(reached.find([studyNumber]).length).toBeGreaterThan(0);

  // The data officer sees who recorded it and who looked.
  const officer = await open(browser, watches);
  await signInByForm(officer, "officer");
  await officer.getByRole("tab", { name: "Access events" }).click();
  await officer.getByLabel("Person", { exact: true }).fill(studyNumber);
  const events = officer.getByRole("table", { name: /^Access events/ }).getByRole("row");
  const submitted = events.filter({ hasText: "submitted an interview" });
  await expect(submitted).toHaveCount(1);
  await expect(submitted).toContainText("Contact tracer");
  await expect(events.filter({ hasText: "saved a draft" }).first()).toContainText("Contact tracer");
  const looks = events.filter({ hasText: "opened a person" });
  await expect(looks.filter({ hasText: "Contact tracer" }).first()).toContainText("name");
  await expect(looks.filter({ hasText: "Supervisor" }).first()).toContainText("name");
  const { items } = await readApi<{ items: AccessEvent[] }>(
    officer,
    `/api/investigations/${id}/access-events?personId=${caseId}&action=interview.submitted`,
  );
  expect(items).toHaveLength(1);
  expect(items[0]?.personIds).toContain(caseId);

  for (const one of watches) one.clear("the pages of the journey");
});
