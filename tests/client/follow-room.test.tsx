// @vitest-environment jsdom
import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, configure, render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { afterEach, describe, expect, it, vi } from "vitest";
import type { FollowUpItem } from "../../shared/contracts/follow-up.ts";
import { commonScale, dayWords, dueDays } from "../../src/features/follow-up/lib/due-days.ts";
import { Component } from "../../src/features/follow-up/routes/follow-route.tsx";
import { addDays } from "../../src/lib/calendar-day.ts";
import { InvestigationContext } from "../../src/lib/investigation-context.ts";
import { investigation } from "./support/interview-desk.tsx";

configure({ asyncUtilTimeout: 15_000 });
vi.setConfig({ testTimeout: 30_000 });
afterEach(cleanup);

const item = (over: Partial<FollowUpItem>): FollowUpItem => ({
  id: "5f5c1d8a-3f0e-4f5c-8a69-6a1c4a8d7e02",
  studyNumber: "K4T-29X7",
  name: "Linnet Marsh",
  phone: "07700 900071",
  area: "Harbour",
  classification: "contact",
  assignedTo: null,
  dayZero: "2026-05-21",
  lastDueDay: "2026-06-04",
  dayNumber: 6,
  monitoringDays: 14,
  mine: true,
  version: 3,
  state: "under_follow_up",
  symptomatic: false,
  lastCheck: null,
  expectedFrom: "2026-05-22",
  dueDays: Array.from({ length: 14 }, (_, index) => ({
    day: addDays("2026-05-22", index),
    outcome: null,
  })),
  together: null,
  ...over,
});

const today = "2026-05-27";

function open(items: FollowUpItem[], { at = "/follow", withoutDayZero = 0, total = 120 } = {}) {
  const asked: URLSearchParams[] = [];
  vi.stubGlobal("fetch", async (address: string) => {
    const url = new URL(address, "http://localhost");
    asked.push(url.searchParams);
    const page = Number(url.searchParams.get("page"));
    const body = {
      items,
      total,
      page,
      pageSize: 50,
      today,
      withoutDayZero,
      lostAfterDays: 3,
    };
    return new Response(JSON.stringify(body), { headers: { "content-type": "application/json" } });
  });
  const router = createMemoryRouter(
    [
      { path: "/follow", element: <Component /> },
      { path: "*", element: <p>another page</p> },
    ],
    { initialEntries: [at] },
  );
  render(
    <QueryClientProvider
      client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}
    >
      <InvestigationContext value={investigation}>
        <RouterProvider router={router} />
      </InvestigationContext>
    </QueryClientProvider>,
  );
  return { asked, router, user: userEvent.setup({ delay: null }) };
}

describe("due days", () => {
  it("run from day 1 to day M; a past day is neither seen nor missed", () => {
    const days = dueDays(item({}), today);
    expect(days).toHaveLength(14);
    expect(days[0]).toEqual({ day: "2026-05-22", state: "no_check" });
    expect(days[5]).toEqual({ day: today, state: "due" });
    expect(days[13]).toEqual({ day: "2026-06-04", state: "to_come" });
    expect(days.some(({ state }) => state === "seen" || state === "missed")).toBe(false);
  });

  it("are said in words at every stage", () => {
    expect(dayWords(item({}))).toBe("day 6 of 14");
    expect(dayWords(item({ dayZero: today, dayNumber: 0 }))).toBe("day 0, first due tomorrow");
    expect(dayWords(item({ dayNumber: 15 }))).toMatch(/^ended on /);
  });

  it("share one scale that holds today", () => {
    const early = item({ dayZero: "2026-05-01", lastDueDay: "2026-05-15" });
    expect(commonScale([item({}), early], today)).toEqual({ from: "2026-05-02", to: "2026-06-04" });
    expect(commonScale([], today)).toEqual({ from: today, to: today });
  });
});

describe("follow room", () => {
  it("shows who is due, how to reach them and what is known of each day", async () => {
    const { asked } = open([item({})]);
    const list = await screen.findByRole("list", { name: "Contacts under follow-up" });
    const row = within(list).getByRole("listitem");
    expect(within(row).getByRole("link", { name: "Linnet Marsh" }).getAttribute("href")).toMatch(
      /\/trace\/people\/5f5c1d8a/,
    );
    expect(within(row).getByText("K4T-29X7")).toBeTruthy();
    expect(within(row).getByRole("link", { name: "07700 900071" }).getAttribute("href")).toBe(
      "tel:07700900071",
    );
    expect(within(row).getByText("day 6 of 14")).toBeTruthy();
    expect(
      within(row).getByRole("img", {
        name: /^day 6 of 14: 5 past days without a check recorded here, due today, 8 to come/,
      }),
    ).toBeTruthy();
    expect(screen.getByText(/This system does not watch for emergencies/)).toBeTruthy();
    expect(Object.fromEntries(asked[0] ?? [])).toEqual({ show: "due", page: "1", pageSize: "50" });
    expect(screen.queryByText(/without a day 0/)).toBeNull();
  });

  it("goes by study number where name and phone are not the reader's to know", async () => {
    const { name: _name, phone: _phone, ...closed } = item({});
    open([closed]);
    expect(await screen.findByRole("link", { name: "K4T-29X7" })).toBeTruthy();
    expect(screen.getByText("number not open")).toBeTruthy();
    expect(document.querySelector('a[href^="tel:"]')).toBeNull();
  });

  it("names how many have no day 0", async () => {
    open([item({})], { withoutDayZero: 3 });
    expect(await screen.findByText("3 without a day 0:")).toBeTruthy();
  });

  it("filters and pages through the address, with study numbers but never a name", async () => {
    const { asked, router, user } = open([item({})]);
    await screen.findByRole("link", { name: "Linnet Marsh" });
    await user.click(screen.getByRole("button", { name: "Next" }));
    await waitFor(() => expect(asked.at(-1)?.get("page")).toBe("2"));
    await user.selectOptions(screen.getByRole("combobox", { name: "Show" }), "ended");
    await waitFor(() => expect(asked.at(-1)?.get("show")).toBe("ended"));
    expect(asked.at(-1)?.get("page")).toBe("1");

    const box = screen.getByRole("searchbox", { name: "Study number" });
    await user.type(box, "Linnet");
    expect(await screen.findByText(/names are looked for in Trace/)).toBeTruthy();
    await new Promise((resolve) => setTimeout(resolve, 500));
    expect(asked.some((query) => query.has("q"))).toBe(false);
    await user.clear(box);
    await user.type(box, "k4t-2");
    await waitFor(() => expect(asked.at(-1)?.get("q")).toBe("K4T-2"));
    expect(router.state.location.search).toBe("?show=ended&q=K4T-2");
  });

  it("says in words when nobody is due", async () => {
    open([], { total: 0 });
    expect(await screen.findByText("No contact is due today")).toBeTruthy();
  });
});
