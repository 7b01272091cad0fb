import { expect, type Page } from "@playwright/test";
import type { Session } from "../../../shared/contracts/session.ts";
import type { Role } from "../../../shared/roles.ts";
import { callApi, readApi } from "./api.ts";

/** E-mail of the demo account of a role. */
export const emailOf = (role: Role): string => `${role}@strandline.example`;

/** The one password of the demo accounts; the global set-up chose it. */
export function demoPassword(): string {
  const password = process.env.E2E_PASSWORD;
  if (!password) throw new Error("E2E_PASSWORD is set by the global set-up");
  return password;
}

/** Signs in through the form, as a person does, and waits for the frame of the first room. */
export async function signInByForm(page: Page, role: Role): Promise<void> {
  await page.goto("/");
  await page.getByLabel("E-mail").fill(emailOf(role));
  await page.getByLabel("Password").fill(demoPassword());
  await page.getByRole("button", { name: "Sign in" }).click();
  await expect(page.getByRole("navigation", { name: "Rooms" })).toBeVisible();
}

/**
 * Signs the browser of a page in without the form, and acts in the demo's investigation in that
 * role, whatever other roles the account got meanwhile.
 */
export async function signIn(page: Page, role: Role): Promise<Session> {
  const session = await callApi<Session>(page, "POST", "/api/session", {
    email: emailOf(role),
    password: demoPassword(),
  });
  const demo = session.memberships.find((one) => one.role === role && one.invented);
  if (!demo) throw new Error(`the demo account of the ${role} holds no such role`);
  const { investigationId } = demo;
  if (session.actingRole === role && session.investigationId === investigationId) return session;
  return callApi<Session>(page, "PATCH", "/api/session", { actingRole: role, investigationId });
}

/** Id of the investigation that the browser of a page acts in. */
export async function investigationOf(page: Page): Promise<string> {
  const { investigationId } = await readApi<Session>(page, "/api/session");
  if (!investigationId) throw new Error("the session acts in no investigation");
  return investigationId;
}
