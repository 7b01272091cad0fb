import { screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { expect } from "vitest";
import type { Settings } from "../../../shared/contracts/settings.ts";
import type { Role } from "../../../shared/roles.ts";
import { ToastProvider } from "../../../src/components/ui/toast-provider.tsx";
import { Component } from "../../../src/features/settings/routes/settings-route.tsx";
import { renderRoom } from "./room.tsx";
import { changesAnswer, definitionsAnswer, previewAnswer, settingsOf } from "./settings-answers.ts";

/** A refusal as the server words it. */
export const problem = (status: number, code: string, errors?: unknown[]) =>
  new Response(JSON.stringify({ type: "about:blank", title: code, status, code, errors }), {
    status,
    headers: { "content-type": "application/problem+json" },
  });

export type Options = {
  role?: Role;
  settings?: Partial<Settings>;
  preview?: () => unknown;
  /** The answer to a save, given what is saved so far. */
  save?: (body: Record<string, unknown>) => unknown;
  reset?: () => unknown;
};

/** Opens the page on a server of its own: `sent` holds the bodies, `store` what is saved. */
export async function openSettings(options: Options = {}) {
  const { role = "supervisor", preview = () => previewAnswer } = options;
  const store = { saved: settingsOf(options.settings) };
  const sent: { path: string; body: unknown }[] = [];
  const room = renderRoom({
    room: () => (
      <ToastProvider>
        <Component />
      </ToastProvider>
    ),
    at: "/room",
    rooms: ["trace", "review"],
    session: { actingRole: role },
    answers(path, _query, { method, body }) {
      if (method !== "GET") sent.push({ path, body });
      if (path === "settings/preview") return preview();
      if (path === "settings/changes") return changesAnswer;
      if (path === "settings/case-definitions") return definitionsAnswer;
      if (path === "settings/practice-reset") return options.reset?.() ?? store.saved;
      if (path === "settings" && method === "PATCH") {
        const answer = options.save?.(body as Record<string, unknown>);
        if (answer) return answer;
        store.saved = { ...store.saved, ...(body as object), version: store.saved.version + 1 };
      }
      return store.saved;
    },
  });
  await screen.findByRole("region", { name: "Windows" });
  return { ...room, sent, store, user: userEvent.setup() };
}

// By label and by text: a search by role weighs the whole page, at every call.
export const box = (label: RegExp | string) =>
  screen.getByLabelText<HTMLInputElement>(label, { selector: "input,textarea" });
export const buttons = (name: string) =>
  [...document.querySelectorAll("button")].filter(
    (one) => one.textContent?.replace(/^[↑↓]/, "").trim() === name,
  );

/** The one button of that name. */
export function button(name: string): HTMLButtonElement {
  const [found, ...others] = buttons(name);
  if (!found || others.length > 0) throw new Error(`${others.length + 1} or no button: ${name}`);
  return found;
}

export const ask = "See what would move";

/** The heading of a preview that has come. */
export const previewShown = () => screen.findByText("What would move", { selector: "h2" });
export const monitoring = () => box(/^Monitoring period/);

/** The body of something that was sent. */
export function bodyOf(sent: { body: unknown } | undefined): Settings {
  expect(sent).toBeDefined();
  return sent?.body as Settings;
}

/** Types a value in place of the one in the box. */
export async function retype(user: ReturnType<typeof userEvent.setup>, name: RegExp, text: string) {
  await user.clear(box(name));
  if (text !== "") await user.type(box(name), text);
}
