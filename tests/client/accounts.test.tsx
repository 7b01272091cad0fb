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
  endsOn: null,
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
    endsOn: null,
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

const member = {
  id: ids.small,
  accountId: ids.investigation,
  displayName: "Ada Field",
  email: "ada@test.example",
  role: "tracer",
  team: "North",
  since: "2026-05-01T08:00:00.000Z",
  endsOn: null as string | null,
  endedAt: null as string | null,
  version: 3,
};

/** The members page on answers of one's own; gives the bodies that were sent. */
function membersPage(answers: (path: string, query: URLSearchParams, method: string) => unknown) {
  const bodies: unknown[] = [];
  let method = "GET";
  const { asked } = renderRoom({
    room: () => (
      <ToastProvider>
        <MembersRoute />
      </ToastProvider>
    ),
    at: "/room",
    rooms: ["trace"],
    session: { actingRole: "supervisor", accountId: ids.large },
    answers: (path, query) => answers(path, query, method),
  });
  const fetched = globalThis.fetch;
  vi.stubGlobal("fetch", (address: string, init: RequestInit = {}) => {
    method = init.method ?? "GET";
    if (typeof init.body === "string") bodies.push(JSON.parse(init.body));
    return fetched(address, init);
  });
  return { asked, bodies };
}
const pageOf = (items: unknown[]) => ({ items, total: items.length, page: 1, pageSize: 50 });
const problem = (status: number, code: string, path: string, fieldCode: string) =>
  new Response(JSON.stringify({ code, status, errors: [{ path, code: fieldCode }] }), { status });

it("a member gets a last day and another team; a refusal stands beside its field", async () => {
  const user = userEvent.setup();
  let stored = member;
  let refuse = true;
  const { asked, bodies } = membersPage((path, query) => {
    if (path === `members/${ids.small}`) {
      if (refuse) return problem(409, "conflict", "endsOn", "last_leader");
      stored = { ...member, endsOn: "2026-06-30", team: "South", version: 4 };
      return { id: ids.small, version: 4 };
    }
    if (path !== "members") return pageOf([]);
    return pageOf(query.get("show") === "past" ? [] : [stored]);
  });
  await screen.findByText("no end");
  await user.click(screen.getByRole("button", { name: /^Change the role of Ada Field/ }));
  await user.type(screen.getByLabelText("Last day"), "2026-06-30");
  await user.click(screen.getByRole("button", { name: "Save the change" }));
  await screen.findByText(/keeps at least one supervisor or data officer with no end date/);
  refuse = false;
  await user.clear(screen.getByLabelText("Team"));
  await user.type(screen.getByLabelText("Team"), "South");
  await user.click(screen.getByRole("button", { name: "Save the change" }));
  await screen.findByText("Membership of Ada Field changed");
  expect(asked).toContain(`PATCH members/${ids.small}`);
  // Only what was touched is sent.
  expect(bodies).toEqual([
    { version: 3, endsOn: "2026-06-30" },
    { version: 3, endsOn: "2026-06-30", team: "South" },
  ]);
  const table = screen.getByRole("table", { name: "Members of this investigation, by name" });
  await waitFor(() => expect(table.textContent).toMatch(/South.*(30 June|June 30|30 Jun|Jun 30)/));
});

it("roles that are over stand apart, with when they ended", async () => {
  const over = { ...member, endsOn: "2026-05-20", endedAt: "2026-05-21T00:00:00.000Z" };
  membersPage((path, query) =>
    pageOf(path === "members" && query.get("show") === "past" ? [over] : []),
  );
  const table = await screen.findByRole("table", {
    name: "Memberships that are over, the latest first",
  });
  expect(table.textContent).toContain("Ada Field");
  const current = screen.queryByRole("table", { name: "Members of this investigation, by name" });
  expect(current?.textContent ?? "").not.toContain("Ada Field");
});

it("teams are made, renamed and, when nothing hangs on them, removed", async () => {
  const user = userEvent.setup();
  const full = { id: ids.large, name: "Full", members: 2, invitations: 0, people: 7, version: 1 };
  const empty = { ...full, id: ids.small, name: "Empty", members: 0, people: 0, version: 2 };
  let made = 0;
  const { asked, bodies } = membersPage((path, _query, method) => {
    if (path === "teams" && method === "POST") {
      made += 1;
      if (made === 1) return problem(422, "invalid", "name", "team_taken");
      return { id: ids.small, version: 1 };
    }
    if (path === `teams/${ids.small}`) {
      return method === "DELETE"
        ? new Response(null, { status: 204 })
        : { id: ids.small, version: 3 };
    }
    return pageOf(path === "teams" ? [empty, full] : []);
  });
  await screen.findByRole("table", { name: "Teams of this investigation, by name" });
  expect(screen.queryByRole("button", { name: "Remove Full" })).toBeNull();
  await user.click(screen.getByRole("button", { name: "Make a team" }));
  await user.type(screen.getByLabelText("Name of the new team"), "Full");
  await user.click(screen.getByRole("button", { name: "Make the team" }));
  await screen.findByText("There is a team of this name");
  await user.type(screen.getByLabelText("Name of the new team"), "er");
  await user.click(screen.getByRole("button", { name: "Make the team" }));
  await screen.findByText("Team made");
  await user.click(screen.getByRole("button", { name: "Rename Empty" }));
  await user.type(screen.getByLabelText("New name of Empty"), "ish");
  await user.click(screen.getByRole("button", { name: "Rename the team" }));
  await screen.findByText("Team renamed");
  await user.click(screen.getByRole("button", { name: "Remove Empty" }));
  await screen.findByText("Team Empty removed");
  expect(bodies).toEqual([{ name: "Full" }, { name: "Fuller" }, { name: "Emptyish", version: 2 }]);
  expect(asked).toContain(`DELETE teams/${ids.small}`);
});
