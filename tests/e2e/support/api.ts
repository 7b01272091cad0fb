import { randomUUID } from "node:crypto";
import { expect, type Page } from "@playwright/test";

/** Address of the product under test. */
export function baseUrl(): string {
  const address = process.env.E2E_BASE_URL;
  if (!address) throw new Error("E2E_BASE_URL is set by the global set-up");
  return address;
}

/** Reads from the API as whoever the browser of the page is signed in as. */
export async function readApi<T>(page: Page, path: string): Promise<T> {
  const response = await page.request.get(baseUrl() + path);
  expect(response.status(), `GET ${path}`).toBe(200);
  return (await response.json()) as T;
}

/** Sends to the API with what every request that is no GET carries. */
export async function callApi<T>(
  page: Page,
  method: "POST" | "PATCH" | "PUT" | "DELETE",
  path: string,
  body: unknown,
): Promise<T> {
  const response = await page.request.fetch(baseUrl() + path, {
    method,
    data: JSON.stringify(body),
    headers: {
      Origin: baseUrl(),
      "Content-Type": "application/json",
      "Idempotency-Key": randomUUID(),
    },
  });
  expect(response.ok(), `${method} ${path} answered ${response.status()}`).toBe(true);
  return (await response.json()) as T;
}
