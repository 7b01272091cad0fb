// @vitest-environment jsdom
import { cleanup, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import type { Role } from "../../shared/roles.ts";
import { Frame } from "../../src/app/frame.tsx";
import { Component } from "../../src/app/routes/investigations-route.tsx";
import { ToastProvider } from "../../src/components/ui/toast-provider.tsx";
import { investigation } from "./support/interview-desk.tsx";
import { ids } from "./support/network-answers.ts";
import { renderRoom } from "./support/room.tsx";

vi.setConfig({ testTimeout: 30_000 });

afterEach(cleanup);

const sessionOf = (role: Role) => ({
  actingRole: role,
  investigationId: ids.investigation,
  displayName: "Ada Field",
  email: "ada@test.example",
  demo: false,
  memberships: [
    { investigationId: ids.investigation, investigationName: "Sallow Bay", invented: false, role },
  ],
});

function openList(role: Role) {
  const sent: unknown[] = [];
  const items = [{ ...investigation, id: ids.investigation, practice: true, roles: [role] }];
  const room = renderRoom({
    room: () => (
      <ToastProvider>
        <Component />
      </ToastProvider>
    ),
    at: "/room",
    rooms: ["trace", "review"],
    session: sessionOf(role),
    answers(path, _query, { method, body }) {
      if (method === "POST") {
        sent.push({ path, body });
        return { id: ids.large, version: 1 };
      }
      return { items, total: 1, page: 1, pageSize: 200 };
    },
  });
  return { ...room, sent, user: userEvent.setup() };
}

describe("opening an investigation to practise with", () => {
  it("asks for practice, and says invented by itself", async () => {
    const { user, sent } = openList("supervisor");
    await user.click(await screen.findByRole("button", { name: "Open a new one" }));
    const form = screen.getByRole("region", { name: "New investigation" });
    await user.type(within(form).getByLabelText(/^Name/), "First steps");
    await user.click(within(form).getByRole("checkbox", { name: "To practise with" }));
    // One says the other, so the second box is no question any more.
    expect(within(form).queryByRole("checkbox", { name: /^Invented data/ })).toBeNull();
    expect(within(form).getByText(/sends nothing and counts nowhere/)).toBeTruthy();
    await user.click(within(form).getByRole("button", { name: "Open the investigation" }));
    await waitFor(() => expect(sent).toHaveLength(1));
    expect(sent[0]).toMatchObject({
      path: "/api/investigations",
      body: { name: "First steps", practice: true, invented: true },
    });
  });

  it("is offered to supervisors only", async () => {
    const { user } = openList("officer");
    await user.click(await screen.findByRole("button", { name: "Open a new one" }));
    expect(screen.queryByRole("checkbox", { name: "To practise with" })).toBeNull();
    expect(screen.getByRole("checkbox", { name: /^Invented data/ })).toBeTruthy();
  });

  it("is marked in the list, and the settings are one link away for every role", async () => {
    openList("tracer");
    const row = await screen.findByRole("row", { name: /practice/ });
    expect(row.textContent).not.toContain("invented");
    const link = screen.getByRole("link", { name: "Open the settings" });
    expect(link.getAttribute("href")).toBe(`/i/${ids.investigation}/settings`);
    expect(screen.queryByRole("button", { name: "Open a new one" })).toBeNull();
  });
});

describe("the frame of every page", () => {
  function frame(practice: boolean) {
    renderRoom({
      room: () => (
        <ToastProvider>
          <Frame investigation={{ ...investigation, invented: true, practice }}>a page</Frame>
        </ToastProvider>
      ),
      at: "/room",
      rooms: ["trace"],
      session: sessionOf("tracer"),
      answers: () => ({}),
    });
  }

  it("marks practice in words", () => {
    frame(true);
    const header = screen.getByRole("banner");
    expect(header.textContent).toContain(
      "To practise with: all is invented, may be emptied, sends nothing and counts nowhere.",
    );
  });

  it("says no more than invented where it is no practice", () => {
    frame(false);
    const words = screen.getByRole("banner").textContent;
    expect(words).toContain("Invented data: no person, place or illness here is real.");
    expect(words).not.toContain("practise");
  });
});
