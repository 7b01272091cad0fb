import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { createMemoryRouter, RouterProvider, useLocation } from "react-router-dom";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { Component as ActingRoute } from "../../src/app/routes/acting-route.tsx";
import { Component as SignedInLayout } from "../../src/app/routes/signed-in-layout.tsx";
import { Component as SignInRoute } from "../../src/features/session/routes/sign-in-route.tsx";
import { api } from "../../src/lib/api-client.ts";
import { investigationKey } from "../../src/lib/query-keys.ts";
import { keepingLooks } from "../../src/lib/remembered.ts";
import { investigationId, sessionOf } from "./support/trace-desk.tsx";

type Reply = { status?: number; body: unknown };
let replies: Record<string, (body: unknown) => Reply>;
let asked: string[];
let queryClient: QueryClient;

beforeEach(() => {
  asked = [];
  queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  replies = {
    "GET /api/welcome": () => ({ body: { signedIn: false, demo: true, setUpNeeded: false } }),
  };
  vi.stubGlobal("fetch", async (address: string, init: RequestInit = {}) => {
    const name = `${init.method ?? "GET"} ${address}`;
    asked.push(name);
    const reply = replies[name]?.(typeof init.body === "string" ? JSON.parse(init.body) : null);
    if (!reply) throw new Error(`no reply to ${name}`);
    return new Response(JSON.stringify(reply.body), { status: reply.status ?? 200 });
  });
});
afterEach(cleanup);

function Typing() {
  const [text, setText] = useState("");
  return (
    <>
      <label>
        notes <input value={text} onChange={(event) => setText(event.target.value)} />
      </label>
      <button type="button" onClick={() => void api.get("/api/anything").catch(() => {})}>
        ask
      </button>
    </>
  );
}

function Elsewhere() {
  const { pathname } = useLocation();
  return <p>at {pathname}</p>;
}

function open(at: string, state?: unknown) {
  const router = createMemoryRouter(
    [
      { path: "/sign-in", element: <SignInRoute /> },
      {
        element: <SignedInLayout />,
        children: [
          { path: "/work", element: <Typing /> },
          { path: "/acting", element: <ActingRoute /> },
          { path: "*", element: <Elsewhere /> },
        ],
      },
    ],
    { initialEntries: [{ pathname: at, state }] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return router;
}

function signedIn(session = sessionOf("tracer")) {
  replies["GET /api/welcome"] = () => ({
    body: { signedIn: true, demo: true, setUpNeeded: false },
  });
  replies["GET /api/session"] = () => ({ body: session });
}

describe("signing in", () => {
  it("comes before any page, asks nothing that would be refused, and goes back there", async () => {
    replies["POST /api/session"] = () => ({ body: sessionOf("tracer") });
    open("/work");
    const user = userEvent.setup();
    await user.type(await screen.findByLabelText("E-mail"), "somebody@strandline.example");
    await user.type(screen.getByLabelText("Password"), "three tides and a lantern");
    await user.click(screen.getByRole("button", { name: "Sign in" }));
    expect(await screen.findByLabelText("notes")).toBeTruthy();
    expect(asked).toEqual(["GET /api/welcome", "POST /api/session"]);
  });

  it("that fails says so without saying which of the two was wrong", async () => {
    replies["POST /api/session"] = () => ({ status: 401, body: { code: "sign_in_failed" } });
    open("/sign-in");
    const user = userEvent.setup();
    await user.type(await screen.findByLabelText("E-mail"), "somebody@strandline.example");
    await user.type(screen.getByLabelText("Password"), "not it");
    await user.click(screen.getByRole("button", { name: "Sign in" }));
    expect((await screen.findByRole("alert")).textContent).toContain(
      "E-mail or password is not right",
    );
    expect((screen.getByLabelText("Password") as HTMLInputElement).value).toBe("");
  });

  it("names the demo accounts only where a demo is loaded", async () => {
    open("/sign-in");
    expect(await screen.findByText(/officer@strandline.example/)).toBeTruthy();
    cleanup();
    queryClient.clear();
    replies["GET /api/welcome"] = () => ({
      body: { signedIn: false, demo: false, setUpNeeded: true },
    });
    open("/sign-in");
    expect(await screen.findByText(/single-use link/)).toBeTruthy();
    expect(screen.queryByText(/officer@strandline.example/)).toBeNull();
  });
});

describe("a session that ends", () => {
  it("locks over the page, and what was typed is there after signing in again", async () => {
    signedIn();
    replies["GET /api/anything"] = () => ({ status: 401, body: { code: "not_signed_in" } });
    replies["POST /api/session"] = () => ({ body: sessionOf("tracer") });
    open("/work");
    const user = userEvent.setup();
    await user.type(await screen.findByLabelText("notes"), "half a sentence");
    await user.click(screen.getByRole("button", { name: "ask" }));
    expect(await screen.findByRole("dialog", { name: "Signed out" })).toBeTruthy();
    // Nothing underneath can be reached.
    expect(screen.queryByRole("textbox", { name: "notes" })).toBeNull();
    await user.type(screen.getByLabelText("Password"), "three tides and a lantern");
    await user.click(screen.getByRole("button", { name: "Sign in" }));
    await waitFor(() => expect(screen.queryByRole("dialog")).toBeNull());
    expect((screen.getByLabelText("notes") as HTMLInputElement).value).toBe("half a sentence");
  });

  it("goes on in the role it had, where signing in starts in another", async () => {
    signedIn(sessionOf("supervisor"));
    const switched = vi.fn<(body: unknown) => Reply>(() => ({ body: sessionOf("supervisor") }));
    replies["GET /api/anything"] = () => ({ status: 401, body: { code: "not_signed_in" } });
    replies["POST /api/session"] = () => ({ body: sessionOf("tracer") });
    replies["PATCH /api/session"] = switched;
    open("/work");
    const user = userEvent.setup();
    await user.click(await screen.findByRole("button", { name: "ask" }));
    await user.type(await screen.findByLabelText("Password"), "three tides and a lantern");
    await user.click(screen.getByRole("button", { name: "Sign in" }));
    await waitFor(() => expect(screen.queryByRole("dialog")).toBeNull());
    expect(switched).toHaveBeenCalledWith({ actingRole: "supervisor", investigationId });
  });
});

describe("acting in another role", () => {
  it("keeps nothing that was read before and opens the role's own room", async () => {
    signedIn();
    replies["PATCH /api/session"] = () => ({ body: sessionOf("supervisor") });
    const key = investigationKey(investigationId, "people", "list");
    queryClient.setQueryData(key, { items: [{ name: "Ada Invented" }] });
    open("/acting", { actingRole: "supervisor", investigationId });
    expect(await screen.findByText(`at /i/${investigationId}/review`)).toBeTruthy();
    expect(queryClient.getQueryData(key)).toBeUndefined();
    expect(queryClient.getQueryData(["session"])).toMatchObject({ actingRole: "supervisor" });
  });

  it("is not done by an address alone", async () => {
    signedIn();
    open("/acting");
    expect(await screen.findByText("at /")).toBeTruthy();
    expect(asked.filter((one) => one.startsWith("PATCH"))).toEqual([]);
  });

  it("that is refused leaves the role as it was and says so", async () => {
    signedIn();
    replies["PATCH /api/session"] = () => ({ status: 404, body: { code: "not_found" } });
    open("/acting", { actingRole: "officer", investigationId });
    expect(await screen.findByText("The role was not changed")).toBeTruthy();
  });
});

describe("signing out", () => {
  it("keeps the looks when the site's storage is emptied, and nothing else", async () => {
    localStorage.setItem("strandline.theme", "dark");
    localStorage.setItem("something", "else");
    await keepingLooks(async () => localStorage.clear());
    expect({ ...localStorage }).toEqual({ "strandline.theme": "dark" });
  });
});
