// @vitest-environment jsdom
import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import type { ComponentType } from "react";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { Component as MembersRoute } from "../../src/app/routes/members-route.tsx";
import { ToastProvider } from "../../src/components/ui/toast-provider.tsx";
import { ChangePasswordForm } from "../../src/features/session/components/change-password-form.tsx";
import { ids } from "./support/network-answers.ts";
import { renderRoom } from "./support/room.tsx";
import { sessionOf } from "./support/trace-desk.tsx";

type Reply = { status?: number; body: unknown };
const token = "t".repeat(43);
const phrase = "gannets over the harbour wall";
let replies: Record<string, (body: unknown) => Reply>;
let sent: [string, unknown][];

beforeEach(() => {
  vi.resetModules();
  sent = [];
  replies = {};
  vi.stubGlobal("fetch", async (address: string, init: RequestInit = {}) => {
    const name = `${init.method ?? "GET"} ${address}`;
    const body = typeof init.body === "string" ? JSON.parse(init.body) : null;
    sent.push([name, body]);
    const reply = replies[name]?.(body);
    if (!reply) throw new Error(`no reply to ${name}`);
    return new Response(JSON.stringify(reply.body), { status: reply.status ?? 200 });
  });
});
afterEach(() => {
  cleanup();
  window.location.hash = "";
});

function show(Page: ComponentType) {
  const router = createMemoryRouter([{ path: "*", element: <Page /> }]);
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
}

/** Opens a page as a link does: the token behind the #, looked at when the page's file loads. */
async function follow(load: () => Promise<{ Component: ComponentType }>, hash = token) {
  window.location.hash = hash;
  show((await load()).Component);
}
const invitationPage = () => import("../../src/features/session/routes/invitation-route.tsx");
const resetPage = () => import("../../src/features/session/routes/new-password-route.tsx");

const seen = {
  email: "rowan@test.example",
  role: "tracer",
  investigationName: "Sallow Bay",
  invented: true,
  hasAccount: false,
};

describe("an invitation", () => {
  it("says what it is for, checks the form, and makes the account", async () => {
    const user = userEvent.setup();
    replies["POST /api/invitations/look"] = () => ({ body: seen });
    replies["POST /api/invitations/accept"] = () => ({
      status: 201,
      body: { accepted: true, newAccount: true },
    });
    await follow(invitationPage);
    await screen.findByText("Sallow Bay");
    expect(window.location.hash).toBe("");
    expect((screen.getByLabelText("E-mail") as HTMLInputElement).value).toBe(seen.email);
    await user.click(screen.getByRole("button", { name: "Make the account and join" }));
    await screen.findByText("Needed");
    await user.type(screen.getByLabelText("Your name"), "Rowan Ferry");
    await user.type(screen.getByLabelText("Password"), "passwordpassword");
    await user.click(screen.getByRole("button", { name: "Make the account and join" }));
    await screen.findByText("Too easy to guess; take other words");
    await user.clear(screen.getByLabelText("Password"));
    await user.type(screen.getByLabelText("Password"), phrase);
    await user.click(screen.getByRole("button", { name: "Make the account and join" }));
    await screen.findByText("You have joined");
    expect(sent.at(-1)).toEqual([
      "POST /api/invitations/accept",
      { token, displayName: "Rowan Ferry", password: phrase },
    ]);
  });

  it("asks nothing of who has an account", async () => {
    replies["POST /api/invitations/look"] = () => ({ body: { ...seen, hasAccount: true } });
    replies["POST /api/invitations/accept"] = () => ({
      status: 201,
      body: { accepted: true, newAccount: false },
    });
    await follow(invitationPage);
    await userEvent.setup().click(await screen.findByRole("button", { name: "Join" }));
    await screen.findByText("You have joined");
    expect(sent.at(-1)?.[1]).toEqual({ token });
  });

  it("that is used or cut off says so, and without a token nothing is asked", async () => {
    replies["POST /api/invitations/look"] = () => ({ status: 404, body: { code: "not_found" } });
    await follow(invitationPage);
    await screen.findByText("This link opens nothing.");
    cleanup();
    vi.resetModules();
    sent = [];
    await follow(invitationPage, "");
    await screen.findByText("This link opens nothing.");
    expect(sent).toEqual([]);
  });
});

describe("a forgotten password", () => {
  it("is answered alike for every address", async () => {
    const user = userEvent.setup();
    replies["POST /api/password-resets"] = () => ({ status: 202, body: { asked: true } });
    show(
      (await import("../../src/features/session/routes/forgotten-password-route.tsx")).Component,
    );
    await user.type(screen.getByLabelText("E-mail"), "Somebody@Test.example");
    await user.click(screen.getByRole("button", { name: "Send a link" }));
    await screen.findByText(/If an account has this address/);
    expect(sent).toEqual([["POST /api/password-resets", { email: "somebody@test.example" }]]);
  });

  it("is replaced once with the letter's token", async () => {
    const user = userEvent.setup();
    let used = false;
    replies["POST /api/password-resets/use"] = () =>
      used ? { status: 404, body: { code: "not_found" } } : { body: { changed: true } };
    await follow(resetPage);
    await user.type(screen.getByLabelText("New password"), phrase);
    await user.click(screen.getByRole("button", { name: "Change the password" }));
    await screen.findByText("The password is changed");
    expect(sent).toEqual([["POST /api/password-resets/use", { token, password: phrase }]]);
    used = true;
    cleanup();
    vi.resetModules();
    await follow(resetPage);
    await user.type(screen.getByLabelText("New password"), phrase);
    await user.click(screen.getByRole("button", { name: "Change the password" }));
    await screen.findByText("This link opens nothing.");
  });
});

describe("changing the password", () => {
  it("puts the server's refusal beside the field and hands on the new session", async () => {
    const user = userEvent.setup();
    const onDone = vi.fn();
    replies["POST /api/session/password"] = (body) =>
      (body as { current: string }).current === "wrong"
        ? {
            status: 422,
            body: { code: "invalid", errors: [{ path: "current", code: "wrong_password" }] },
          }
        : { body: sessionOf("supervisor") };
    show(() => <ChangePasswordForm email="a@test.example" onDone={onDone} />);
    await user.type(screen.getByLabelText("Password now"), "wrong");
    await user.type(screen.getByLabelText("New password"), phrase);
    await user.click(screen.getByRole("button", { name: "Change the password" }));
    await screen.findByText("Not your password");
    await user.clear(screen.getByLabelText("Password now"));
    await user.type(screen.getByLabelText("Password now"), "right");
    await user.click(screen.getByRole("button", { name: "Change the password" }));
    await waitFor(() => expect(onDone.mock.calls[0]?.[0]).toEqual(sessionOf("supervisor")));
  });
});

it("the inbox shows letters with links on the name the page was opened by", async () => {
  const text = `Open this link:\n\nhttp://127.0.0.1:4700/invitation#${token}\n`;
  const letter = {
    id: 1,
    at: "2026-05-27T08:00:00.000Z",
    to: "r@test.example",
    subject: "Hi",
    text,
  };
  replies["GET /api/inbox"] = () => ({ body: { items: [letter] } });
  show((await import("../../src/features/session/routes/inbox-route.tsx")).Component);
  const link = await screen.findByRole("link", { name: /127\.0\.0\.1/ });
  expect(link.getAttribute("href")).toBe(`/invitation#${token}`);
});

it("the members page invites by e-mail and lists who has not come yet", async () => {
  const user = userEvent.setup();
  const open = {
    id: ids.small,
    email: "rowan@test.example",
    role: "tracer",
    team: "North",
    invitedBy: "Ada Field",
    invitedAt: "2026-05-27T08:00:00.000Z",
    expiresAt: "2026-05-30T08:00:00.000Z",
  };
  const listOf = (items: unknown[]) => ({ items, total: items.length, page: 1, pageSize: 50 });
  let invited = false;
  const { asked } = renderRoom({
    room: () => (
      <ToastProvider>
        <MembersRoute />
      </ToastProvider>
    ),
    at: "/room",
    rooms: ["trace"],
    session: { actingRole: "supervisor", accountId: ids.large },
    answers(path) {
      if (path.startsWith("invitations/")) return new Response(null, { status: 204 });
      if (path !== "invitations") return listOf([]);
      if (asked.at(-1)?.startsWith("POST")) {
        invited = true;
        return { id: ids.small };
      }
      return listOf(invited ? [open] : []);
    },
  });
  await user.click(await screen.findByRole("button", { name: "Invite by e-mail" }));
  await user.type(screen.getByLabelText("E-mail"), "rowan@test.example");
  await user.selectOptions(screen.getByLabelText("Role here"), "Contact tracer");
  await user.type(screen.getByLabelText("Team"), "North");
  await user.click(screen.getByRole("button", { name: "Send the invitation" }));
  await screen.findByText("Contact tracer invited");
  const table = await screen.findByRole("table", { name: "Open invitations, the newest first" });
  expect(table.textContent).toContain("rowan@test.example");
  await user.click(screen.getByRole("button", { name: /^Withdraw the invitation of rowan@/ }));
  await screen.findByText("Invitation withdrawn");
  expect(asked).toContain(`DELETE invitations/${ids.small}`);
});
