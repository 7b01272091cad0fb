import { readFile } from "node:fs/promises";
import { type Browser, expect, type Locator, type Page, test } from "@playwright/test";
import type { ClusterList } from "../../shared/contracts/clusters.ts";
import type { FollowUpItem } from "../../shared/contracts/follow-up.ts";
import type { NetworkSummary } from "../../shared/contracts/network.ts";
import type { Session } from "../../shared/contracts/session.ts";
import { demoPassword, investigationOf, signInByForm } from "./support/accounts.ts";
import { readApi } from "./support/api.ts";
import { expectAccessible } from "./support/axe.ts";
import { settled } from "./support/settled.ts";
import { type Watch, watch } from "./support/watch.ts";
import { type PlantedProblem, pairsFile, peopleFile, plantedValues } from "./support/week-files.ts";

/** For what the product does in the background, on a machine that has other things to do. */
const patient = { timeout: 60_000 };
const phrase = "lapwings beyond the tidal gate";
const people = 22;
const pairs = 9;

async function openInvestigation(page: Page, name: string): Promise<string> {
  await page.goto("/investigations");
  await page.getByRole("button", { name: "Open a new one" }).click();
  const form = page.getByRole("region", { name: "New investigation" });
  await form.getByLabel(/^Name/).fill(name);
  await form.getByLabel(/^Time zone/).fill("UTC");
  await form.getByLabel("Case definition").fill("Fever and a rash within the last three weeks.");
  await form.getByRole("checkbox", { name: /^Invented data/ }).check();
  await page.getByRole("button", { name: "Open the investigation" }).click();
  await page.getByRole("button", { name: `Act here in ${name}` }).click(patient);
  // The session gets a new id with it: nothing else is asked before the room there has opened.
  await page.waitForURL(/\/i\/[0-9a-f-]{36}\//, patient);
  await settled(page);
  await expect(page.getByRole("banner")).toContainText(name, patient);
  return investigationOf(page);
}

async function followForLonger(page: Page, id: string): Promise<void> {
  await page.goto(`/i/${id}/settings`);
  await page.getByRole("textbox", { name: /^Monitoring period/ }).fill("21");
  await page.getByRole("button", { name: "See what would move" }).click();
  const preview = page.getByRole("region", { name: "What would move", exact: true });
  await expect(preview).toContainText("Monitoring period", patient);
  await expectAccessible(page, "the settings with what would move");
  await page.getByRole("button", { name: "Save", exact: true }).click();
  await expect(page.getByText("Settings saved.")).toBeVisible(patient);
  const history = page.getByRole("table", { name: "Changes of the settings, newest first" });
  await expect(history.getByRole("row", { name: /14 days 21 days/ })).toBeVisible();
}

/** Invites somebody as a tracer, who joins with the link of the letter and signs in. */
async function inviteTracer(page: Page, browser: Browser, id: string): Promise<[Page, Watch]> {
  const email = `tracer-${Date.now()}@week.example`;
  await page.goto(`/i/${id}/members`);
  await page.getByRole("button", { name: "Invite by e-mail" }).click();
  await page.getByRole("textbox", { name: "E-mail" }).fill(email);
  await page.getByLabel("Role here").selectOption("tracer");
  await page.getByRole("button", { name: "Send the invitation" }).click();
  await expect(page.getByRole("table", { name: /Open invitations/ })).toContainText(email);

  const context = await browser.newContext();
  const seen = await watch(context);
  const guest = await context.newPage();
  await guest.goto("/inbox");
  await guest
    .getByRole("article", { name: new RegExp(email) })
    .getByRole("link")
    .click(patient);
  await guest.getByLabel("Your name").fill("Wiebke Lapwing");
  await guest.getByLabel("Password").fill(phrase);
  await guest.getByRole("button", { name: "Make the account and join" }).click();
  await guest.getByRole("link", { name: "Sign in" }).click(patient);
  await guest.getByLabel("E-mail").fill(email);
  await guest.getByLabel("Password").fill(phrase);
  await guest.getByRole("button", { name: "Sign in" }).click();
  await expect(guest.getByRole("navigation", { name: "Rooms" })).toBeVisible(patient);
  return [guest, seen];
}

/** Brings a file as far as its check; columns are chosen by hand where given. */
async function check(
  page: Page,
  id: string,
  kind: "People" | "Contact pairs",
  buffer: Buffer,
  columns: Readonly<Record<number, string>> = {},
): Promise<void> {
  await page.goto(`/i/${id}/trace/import`);
  await page.getByRole("radio", { name: kind }).check();
  await page.getByLabel("CSV file").setInputFiles({
    name: "Liste.csv",
    mimeType: "text/csv",
    buffer,
  });
  await expect(page.getByLabel("Column 1 is taken for")).toBeVisible(patient);
  for (const [at, column] of Object.entries(columns)) {
    await page.getByLabel(`Column ${at} is taken for`, { exact: true }).selectOption(column);
  }
  await page.getByRole("button", { name: "Check the file" }).click();
  await expect(page.getByText(/^[\d,]+ rows? in the file\.$/)).toBeVisible(patient);
}

async function putOnRecord(page: Page, rows: number): Promise<void> {
  await page.getByRole("button", { name: `Put ${rows} rows on record` }).click();
  await expect(page.getByText("On record.", { exact: true })).toBeVisible(patient);
}

/** The list of problems holds these and no others, on the page and in the file one can take away. */
async function expectProblems(page: Page, problems: readonly PlantedProblem[]): Promise<void> {
  const rows = page.getByRole("table", { name: /^Problems by line/ }).locator("tbody tr");
  await expect(rows).toHaveCount(problems.length);
  for (const [at, [line, column]] of problems.entries()) {
    const cells = rows.nth(at).getByRole("cell");
    await expect(cells.nth(0)).toHaveText(String(line));
    await expect(cells.nth(1)).toHaveText(column === "row" ? "whole row" : column);
  }
  const arrives = page.waitForEvent("download");
  await page.getByRole("button", { name: "Download as CSV" }).click();
  const text = await textOf(await (await arrives).path());
  const lines = [["line", "column", "code"], ...problems].map((cells) => `${cells.join(",")}\r\n`);
  expect(text).toBe(lines.join(""));
  for (const value of plantedValues) expect(text).not.toContain(value);
}

const textOf = (path: string) => readFile(path, "utf8");

async function importPeople(page: Page, id: string): Promise<void> {
  const { faulty, corrected, problems, columns } = peopleFile();
  expect(problems.length).toBeGreaterThanOrEqual(12);
  await check(page, id, "People", Buffer.from(faulty), columns);
  await expect(page.getByText(/cells separated by semicolons/)).toBeVisible();
  await expect(page.getByText("1 cell begins like a formula; kept as plain text.")).toBeVisible();
  await expect(page.getByText(`${problems.length} rows have errors`)).toBeVisible();
  await expectProblems(page, problems);
  await expectAccessible(page, "a file with problems");

  await check(page, id, "People", Buffer.from(corrected), columns);
  await expect(page.getByRole("heading", { name: "Problems" })).toHaveCount(0);
  await expect(page.getByText(`${people} people would be added.`)).toBeVisible();
  await expect(page.getByText(/^1 row may be somebody on record/)).toBeVisible();
  await putOnRecord(page, people);

  const list = page.getByRole("list", { name: "Rows to decide" });
  await expect(list.getByRole("heading", { name: "Line 11 of the file" })).toBeVisible(patient);
  await expectAccessible(page, "a doubtful row");
  await page.getByRole("button", { name: "Same person, line 11" }).click();
  await expect(page.getByText("nothing waits")).toBeVisible(patient);
}

async function importPairs(page: Page, id: string): Promise<void> {
  const { faulty, corrected, problems, columns } = pairsFile();
  await check(page, id, "Contact pairs", Buffer.from(faulty), columns);
  await expect(page.getByText(/cells separated by tabs/)).toBeVisible();
  await expectProblems(page, problems);
  await check(page, id, "Contact pairs", Buffer.from(corrected), columns);
  await expect(page.getByRole("heading", { name: "Problems" })).toHaveCount(0);
  await putOnRecord(page, pairs);
}

async function assignEverybody(page: Page, id: string): Promise<void> {
  await page.goto(`/i/${id}/trace`);
  await settled(page);
  await page
    .getByRole("checkbox", { name: /^Select / })
    .first()
    .check();
  await page.getByRole("button", { name: `Select all ${people}` }).click();
  await page.getByLabel("Assign to").selectOption({ label: "Wiebke Lapwing" });
  await page.getByRole("button", { name: "Assign", exact: true }).click();
  await expect(page.getByText(`${people} people assigned`)).toBeVisible(patient);
  await expectAccessible(page, "a line list just assigned");
}

const contactOf = (page: Page, name: string): Locator =>
  page
    .getByRole("list", { name: "Contacts under follow-up" })
    .getByRole("listitem")
    .filter({ has: page.getByRole("link", { name, exact: true }) });

/** Calls three contacts; one has fallen ill and becomes a case. */
async function workARound(guest: Page, id: string): Promise<void> {
  await guest.goto(`/i/${id}/follow`);
  const list = guest.getByRole("list", { name: "Contacts under follow-up" });
  await expect(list.getByRole("listitem")).toHaveCount(6, patient);
  await contactOf(guest, "Gesa Inselmann").getByRole("button", { name: "seen" }).click();
  await expect(guest.getByText("Gesa Inselmann: seen")).toBeVisible(patient);
  await contactOf(guest, "Enno Gezeiten").getByRole("button", { name: "not reached" }).click();
  await expect(guest.getByText("Enno Gezeiten: not reached")).toBeVisible(patient);

  const ill = contactOf(guest, "Frauke Hafner");
  await ill.getByRole("button", { name: "symptoms, note" }).click();
  await ill.getByRole("radio", { name: "yes" }).check();
  await ill.getByRole("checkbox", { name: "fever" }).check();
  await ill.getByRole("textbox", { name: "Note" }).fill("rash since the morning");
  await ill.getByRole("button", { name: "spoken to" }).click();
  await expect(ill.getByText("symptoms reported")).toBeVisible(patient);
  await expectAccessible(guest, "a round half done");
  await ill.getByRole("button", { name: "meets the definition" }).click();
  await expectAccessible(guest, "the question before a contact becomes a case");
  await guest.getByRole("button", { name: "Make a case" }).click();
  await expect(guest.getByText("Frauke Hafner is a case now")).toBeVisible(patient);
  await expect(ill).toHaveCount(0);
}

/** The new case was a contact, and what was heard of them as one is still there. */
async function expectHistory(page: Page, id: string): Promise<void> {
  const { items } = await readApi<{ items: FollowUpItem[] }>(
    page,
    `/api/investigations/${id}/follow-up?show=all`,
  );
  const turned = items.find(({ state }) => state === "became_case");
  expect(turned?.classification).toBe("suspected");
  await page.goto(`/i/${id}/trace/people/${turned?.id}`);
  await expect(page.getByRole("heading", { level: 1 })).toContainText("Frauke Hafner", patient);
  await expect(page.getByRole("heading", { name: "Follow-up" })).toBeVisible();
  await expect(page.getByRole("cell", { name: "rash since the morning" })).toBeVisible(patient);
  await expectAccessible(page, "a case who was a contact");
}

async function expectCluster(page: Page, id: string): Promise<void> {
  await page.goto(`/i/${id}/review`);
  const section = page.getByRole("region", { name: "Proposed clusters" }).first();
  const row = section.getByRole("table", { name: "Proposed clusters" }).locator("tbody tr");
  await expect(row).toHaveCount(1, patient);
  await expect(row.getByRole("cell").nth(0)).toHaveText("3");
  // Two of them fell ill in the last seven days.
  await expect(row.getByRole("cell").nth(1)).toHaveText("2");
  await expect(row).toContainText("workplace");
  for (const name of ["Brandung", "Deichsel", "Ebbinger"]) {
    await expect(section).not.toContainText(name);
  }
  await expectAccessible(page, "a proposed cluster");
}

async function takeOut(page: Page, id: string, what: "Line list" | "Contact pairs") {
  await page.goto(`/i/${id}/trace/export`);
  await page.getByRole("radio", { name: what }).check();
  await page.getByRole("checkbox", { name: /^With/ }).check();
  await page.getByLabel("What for").selectOption("handover");
  await page.getByRole("button", { name: "Make the file" }).click();
  const mine = page.getByRole("listitem").filter({ hasText: `${what}, with identity` });
  const link = mine.getByRole("link", { name: /^Download/ });
  const again = page.getByRole("dialog", { name: "Your password, once more" });
  await expect(link.or(again)).toBeVisible(patient);
  if (await again.isVisible()) {
    await again.getByLabel("Password").fill(demoPassword());
    await again.getByRole("button", { name: "Go on" }).click();
  }
  await expect(link).toBeVisible(patient);
  await expectAccessible(page, "a file to be fetched");
  const arrives = page.waitForEvent("download");
  await link.click();
  return Buffer.from(await textOf(await (await arrives).path()));
}

type Report = Omit<NetworkSummary, "asOf" | "cutOff" | "graphVersion">;

/** The report in every population and window, and the proposed clusters, without when and version. */
async function reportOf(page: Page, id: string) {
  const base = `/api/investigations/${id}`;
  const inStep = async () => {
    const all = await readApi<NetworkSummary>(page, `${base}/network/summary?window=all`);
    const turned = await readApi<NetworkSummary>(page, `${base}/network/summary?population=cases`);
    const { updating } = await readApi<ClusterList>(page, `${base}/clusters`);
    return [all.people, all.pairs, turned.people, updating];
  };
  await expect.poll(inStep, patient).toEqual([people, pairs, 4, false]);
  const reports: Record<string, Report> = {};
  for (const population of ["all", "cases", "interviewed"]) {
    for (const window of ["preset", "all"]) {
      const query = `population=${population}&window=${window}`;
      const answer = await readApi<NetworkSummary>(page, `${base}/network/summary?${query}`);
      const { asOf: _asOf, cutOff: _cutOff, graphVersion: _version, ...report } = answer;
      reports[query] = report;
    }
  }
  const { items } = await readApi<ClusterList>(page, `${base}/clusters`);
  const clusters = items.map(({ members, ...cluster }) => ({ ...cluster, size: members.length }));
  return { reports, clusters };
}

test("the first week of a team, from an investigation of its own to the same report elsewhere", async ({
  page,
  context,
  browser,
}) => {
  test.setTimeout(600_000);
  const seen = await watch(context);
  const stamp = Date.now();
  await signInByForm(page, "supervisor");
  const id = await test.step("opens an investigation", () =>
    openInvestigation(page, `Week of the quay ${stamp}`));
  await test.step("changes a setting after its preview", () => followForLonger(page, id));
  const [guest, guestSeen] = await test.step("invites a tracer", () =>
    inviteTracer(page, browser, id));
  await test.step("imports and corrects the list", () => importPeople(page, id));
  await test.step("imports and corrects the pairs", () => importPairs(page, id));
  await test.step("assigns the people", () => assignEverybody(page, id));
  await test.step("works a round of follow-up", () => workARound(guest, id));
  guestSeen.clear("the week of the tracer");
  await guest.context().close();
  await test.step("a case keeps its history", () => expectHistory(page, id));
  await test.step("sees a proposed cluster", () => expectCluster(page, id));

  const list = await test.step("takes out the people", () => takeOut(page, id, "Line list"));
  const told = await test.step("takes out the pairs", () => takeOut(page, id, "Contact pairs"));
  const before = await reportOf(page, id);
  expect(before.clusters.map(({ cases }) => cases)).toEqual([3]);

  const elsewhere = await test.step("opens another investigation", () =>
    openInvestigation(page, `Elsewhere ${stamp}`));
  expect(elsewhere).not.toBe(id);
  await test.step("brings both files there", async () => {
    await check(page, elsewhere, "People", list);
    await expect(page.getByRole("heading", { name: "Problems" })).toHaveCount(0);
    await putOnRecord(page, people);
    await check(page, elsewhere, "Contact pairs", told);
    await expect(page.getByRole("heading", { name: "Problems" })).toHaveCount(0);
    await putOnRecord(page, pairs);
  });
  const after = await reportOf(page, elsewhere);
  expect(after).toEqual(before);
  expect((await readApi<Session>(page, "/api/session")).investigationId).toBe(elsewhere);
  seen.clear("the week of the supervisor");
});
