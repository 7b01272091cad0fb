import { randomUUID } from "node:crypto";
import { expect, type Page } from "@playwright/test";
import type { Session } from "../../../shared/contracts/session.ts";
import { investigationOf, signIn } from "./accounts.ts";
import { readApi } from "./api.ts";
import type { NetworkFiles } from "./networks.ts";

/** Opens an investigation of its own through the screen and acts in it. */
async function openInvestigation(page: Page, title: string): Promise<string> {
  // A name of its own, so that a second run against the same data finds its own investigation.
  const name = `${title} ${randomUUID().slice(0, 6)}`;
  await signIn(page, "supervisor");
  await page.goto("/investigations");
  await page.getByRole("button", { name: "Open a new one" }).click();
  await page.getByLabel("Name", { exact: false }).first().fill(name);
  await page.getByLabel("Time zone").fill("Europe/Lisbon");
  await expect(page.getByLabel(/^Invented data: marked/)).toBeChecked();
  await page.getByRole("button", { name: "Open the investigation" }).click();
  await expect(page.getByText("Opened. You hold your acting role in it")).toBeVisible();
  await page.getByRole("button", { name: `Act here in ${name}` }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Review" })).toBeVisible();
  const id = await investigationOf(page);
  const session = await readApi<Session>(page, "/api/session");
  const here = session.memberships.find((one) => one.investigationId === id);
  expect(here).toMatchObject({ investigationName: name, invented: true });
  await expect(page.getByText(/^Invented data: no person/)).toBeVisible();
  return id;
}

async function importFile(
  page: Page,
  id: string,
  kind: "People" | "Contact pairs",
  content: string,
): Promise<void> {
  const rows = content.trimEnd().split("\n").length - 1;
  const counted = rows.toLocaleString("en-GB");
  await page.goto(`/i/${id}/trace/import`);
  await page.getByRole("radio", { name: kind }).check();
  await page.getByLabel("CSV file").setInputFiles({
    name: `${kind}.csv`,
    mimeType: "text/csv",
    buffer: Buffer.from(content),
  });
  await page.getByRole("button", { name: "Check the file" }).click();
  await expect(page.getByText(`${counted} rows in the file.`)).toBeVisible({ timeout: 30_000 });
  await page.getByRole("button", { name: `Put ${counted} rows on record` }).click();
  await expect(page.getByText("On record.")).toBeVisible({ timeout: 60_000 });
}

/** Imports a network into an investigation of its own, as a supervisor; gives its id. */
export async function bringIn(page: Page, name: string, files: NetworkFiles): Promise<string> {
  const id = await openInvestigation(page, name);
  await importFile(page, id, "People", files.people);
  await importFile(page, id, "Contact pairs", files.pairs);
  return id;
}
