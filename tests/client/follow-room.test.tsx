// @vitest-environment jsdom
import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, configure, render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { afterEach, describe, expect, it, vi } from "vitest";
import type { FollowUpItem } from "../../shared/contracts/follow-up.ts";
import {
  DEFAULT_CASE_RULES,
  DEFAULT_EXPOSURE_GRADING,
  type Settings,
} from "../../shared/contracts/settings.ts";
import { ToastProvider } from "../../src/components/ui/toast-provider.tsx";
import {
  commonScale,
  dayWords,
  dueDays,
  followMark,
} from "../../src/features/follow-up/lib/due-days.ts";
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
  end: null,
  reopenedOn: null,
  dayZeroGap: null,
  expectedFrom: "2026-05-22",
  dueDays: Array.from({ length: 14 }, (_, index) => ({
    day: addDays("2026-05-22", index),
    outcome: null,
  })),
  together: null,
  ...over,
});

const today = "2026-05-27";

const settingsOf = (symptoms: Settings["symptoms"]): Settings => ({
  name: "Harbour",
  invented: true,
  timeZone: "UTC",
  countryCode: "GB",
  populationAtRisk: null,
  caseDefinition: "",
  caseRules: DEFAULT_CASE_RULES,
  incubationMin: 1,
  incubationMax: 14,
  infectiousBefore: 2,
  infectiousAfter: 10,
  monitoringDays: 14,
  clusterWindowDays: 14,
  clusterMinimumCases: 2,
  closureDays: null,
  lostAfterDays: 3,
  smallCellThreshold: 5,
  exposureGrading: DEFAULT_EXPOSURE_GRADING,
  symptoms,
  texts: [],
  practice: false,
  caseDefinitionVersion: 1,
  closureDaysInForce: 28,
  today: "2026-05-27",
  version: 1,
});

function open(
  items: FollowUpItem[],
  {
    at = "/follow",
    withoutDayZero = 0,
    total = 120,
    settings = () => Response.json(settingsOf([{ code: "itch", label: "Itching skin" }])),
    answer = (_count: number) => Response.json({ id: item({}).id }, { status: 201 }),
  } = {},
) {
  const asked: URLSearchParams[] = [];
  const sent: { path: string; key: string | null; body: unknown }[] = [];
  vi.stubGlobal("fetch", async (address: string, init: RequestInit = {}) => {
    const url = new URL(address, "http://localhost");
    if (init.method !== "GET") {
      sent.push({
        path: url.pathname.replace(/^.*\/follow-up\/|^.*\/people\//, ""),
        key: new Headers(init.headers).get("idempotency-key"),
        body: init.body ? JSON.parse(String(init.body)) : null,
      });
      return answer(sent.length);
    }
    if (url.pathname.endsWith("/settings")) return settings();
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
        <ToastProvider>
          <RouterProvider router={router} />
        </ToastProvider>
      </InvestigationContext>
    </QueryClientProvider>,
  );
  return { asked, sent, router, user: userEvent.setup({ delay: null }) };
}

describe("due days", () => {
  it("show what is known of each day, and leave out what nobody could do", () => {
    const outcomes = ["seen", "spoken", "message", "not_reached", null, "not_reached", null];
    const days = Array.from({ length: 14 }, (_, index) => ({
      day: addDays("2026-05-22", index),
      outcome: (outcomes[index] ?? null) as FollowUpItem["dueDays"][number]["outcome"],
    }));
    const states = (over: Partial<FollowUpItem>) =>
      dueDays(item({ dueDays: days, ...over }), today).map(({ state }) => state);
    expect(states({}).slice(0, 7)).toEqual([
      "seen",
      "seen",
      "message",
      "missed",
      "missed",
      "due",
      "to_come",
    ]);
    expect(states({ expectedFrom: "2026-05-27" })[4]).toBe("no_check");
    const lastCheck = {
      day: "2026-05-23",
      outcome: "spoken",
      symptoms: "yes",
      recordedAt: "2026-05-23T10:00:00Z",
    } as const;
    expect(states({ state: "became_case", lastCheck })).toEqual(["seen", "seen"]);
    expect(followMark(item({ dueDays: days, state: "lost" }))).toEqual({
      share: 2 / 14,
      state: "lost",
    });
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
        name: /^day 6 of 14: 5 missed, due today, 8 to come/,
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

  it("records by one press, and a press tried again is the same record", async () => {
    const { sent, user } = open([item({})], {
      answer: (count) =>
        count === 1
          ? Response.json({ code: "unavailable" }, { status: 503 })
          : Response.json({ id: item({}).id }, { status: 201 }),
    });
    const bar = within(await screen.findByRole("group", { name: "Check of Linnet Marsh" }));
    await user.click(bar.getByRole("button", { name: "not reached" }));
    expect(await screen.findByText("Not recorded.")).toBeTruthy();
    await user.click(bar.getByRole("button", { name: "not reached" }));
    expect(await screen.findByText("Linnet Marsh: not reached")).toBeTruthy();
    await user.click(bar.getByRole("button", { name: "seen" }));
    await waitFor(() => expect(sent).toHaveLength(3));
    expect(sent.map(({ body }) => body)).toEqual([
      { outcome: "not_reached" },
      { outcome: "not_reached" },
      { outcome: "seen" },
    ]);
    const keys = sent.map(({ key }) => key);
    expect(keys[0]).toMatch(/^[0-9a-f-]{36}$/);
    expect(keys[1]).toBe(keys[0]);
    expect(keys[2]).not.toBe(keys[0]);
    const [takeBack] = await screen.findAllByRole("button", { name: "Take back" });
    await user.click(takeBack as HTMLElement);
    await waitFor(() => expect(sent).toHaveLength(4));
    expect(sent[3]?.path).toBe(`${item({}).id}/checks/${item({}).id}`);
  });

  it("takes symptoms, respondent and note along, with the words of care beside them", async () => {
    const { sent, user } = open([item({})]);
    const bar = within(await screen.findByRole("group", { name: "Check of Linnet Marsh" }));
    await user.click(bar.getByRole("button", { name: "symptoms, note" }));
    await user.click(await screen.findByRole("radio", { name: "yes" }));
    expect(screen.getAllByText(/call local emergency services/)).toHaveLength(2);
    await user.click(await screen.findByRole("checkbox", { name: "Itching skin" }));
    expect(screen.queryByRole("checkbox", { name: "fever" })).toBeNull();
    await user.selectOptions(screen.getByRole("combobox", { name: "Who answered" }), "relative");
    await user.type(screen.getByRole("textbox", { name: "Note" }), "asks for a visit");
    await user.click(bar.getByRole("button", { name: "spoken to" }));
    await waitFor(() => expect(sent).toHaveLength(1));
    expect(sent[0]).toMatchObject({
      path: `${item({}).id}/checks`,
      body: {
        outcome: "spoken",
        symptoms: "yes",
        symptomCodes: ["itch"],
        respondent: "relative",
        note: "asks for a visit",
      },
    });
    await waitFor(() => expect(screen.queryByRole("textbox", { name: "Note" })).toBeNull());
  });

  it("says the state, symptoms and who stands together; a case is checked no more", async () => {
    open([
      item({ symptomatic: true, state: "lost", together: "household-12" }),
      item({
        id: "5f5c1d8a-3f0e-4f5c-8a69-6a1c4a8d7e03",
        name: "Teal Rowan",
        classification: "confirmed",
        state: "became_case",
        together: "phone-1",
      }),
    ]);
    const [first, second] = await screen.findAllByRole("listitem");
    expect(within(first as HTMLElement).getByText("symptoms reported")).toBeTruthy();
    expect(within(first as HTMLElement).getByText("lost to follow-up")).toBeTruthy();
    expect(within(first as HTMLElement).getByText("with household 12")).toBeTruthy();
    expect(
      within(first as HTMLElement).getByRole("img", { name: /contact, lost to follow-up/ }),
    ).toBeTruthy();
    expect(within(second as HTMLElement).getByText("shares a telephone")).toBeTruthy();
    expect(
      within(second as HTMLElement).getByRole("img", { name: /case, was a contact before/ }),
    ).toBeTruthy();
    expect(within(second as HTMLElement).queryByRole("button")).toBeNull();
  });

  it("makes a contact a case after a question", async () => {
    const { sent, user } = open([item({})], { answer: () => Response.json({}) });
    await user.click(await screen.findByRole("button", { name: "meets the definition" }));
    const question = within(await screen.findByRole("alertdialog"));
    await user.click(question.getByRole("radio", { name: "probable case" }));
    await user.click(question.getByRole("button", { name: "Make a case" }));
    await waitFor(() => expect(sent).toHaveLength(1));
    expect(sent[0]).toMatchObject({
      path: item({}).id,
      body: { version: 3, classification: "probable" },
    });
    await waitFor(() => expect(screen.queryByRole("alertdialog")).toBeNull());
  });

  it("says so when the list of symptoms cannot be had, and records without it", async () => {
    const { sent, user } = open([item({})], {
      settings: () => Response.json({ code: "unavailable" }, { status: 503 }),
    });
    const bar = within(await screen.findByRole("group", { name: "Check of Linnet Marsh" }));
    await user.click(bar.getByRole("button", { name: "symptoms, note" }));
    await user.click(await screen.findByRole("radio", { name: "yes" }));
    expect(await screen.findByRole("button", { name: /again/i })).toBeTruthy();
    await user.click(bar.getByRole("button", { name: "seen" }));
    await waitFor(() => expect(sent).toHaveLength(1));
    expect(sent[0]?.body).toEqual({ outcome: "seen", symptoms: "yes" });
  });

  it("ends a follow-up in two steps, and not without a reason", async () => {
    const { sent, user } = open([item({})]);
    await user.click(await screen.findByRole("button", { name: "end follow-up" }));
    const question = within(await screen.findByRole("alertdialog"));
    await user.click(question.getByRole("button", { name: "End follow-up" }));
    expect(await question.findByText("Needed")).toBeTruthy();
    expect(sent).toHaveLength(0);
    await user.click(question.getByRole("radio", { name: "died" }));
    expect(question.getByText(/fills no other date/)).toBeTruthy();
    await user.click(question.getByRole("radio", { name: "refused" }));
    await user.click(question.getByRole("button", { name: "End follow-up" }));
    await waitFor(() => expect(sent).toHaveLength(1));
    expect(sent[0]).toMatchObject({ path: `${item({}).id}/end`, body: { reason: "refused" } });
    expect(sent[0]?.key).toMatch(/^[0-9a-f-]{36}$/);
    await waitFor(() => expect(screen.queryByRole("alertdialog")).toBeNull());
  });

  it("says beside the day what is wrong with it, and keeps what was chosen", async () => {
    const { user } = open([item({})], {
      answer: () =>
        Response.json(
          {
            type: "about:blank",
            title: "Some fields need another look",
            status: 422,
            code: "invalid",
            instance: "",
            errors: [{ path: "day", code: "before_day_zero" }],
          },
          { status: 422, headers: { "content-type": "application/problem+json" } },
        ),
    });
    await user.click(await screen.findByRole("button", { name: "end follow-up" }));
    const question = within(await screen.findByRole("alertdialog"));
    await user.click(question.getByRole("radio", { name: "moved away" }));
    await user.click(question.getByRole("button", { name: "End follow-up" }));
    expect(await question.findByText("Before day 0 of this contact")).toBeTruthy();
    expect((question.getByRole("radio", { name: "moved away" }) as HTMLInputElement).checked).toBe(
      true,
    );
  });

  it("shows an end with its day, and reopens after a question", async () => {
    const end = {
      id: "5f5c1d8a-3f0e-4f5c-8a69-6a1c4a8d7e0f",
      reason: "moved",
      day: today,
    } as const;
    const { sent, user } = open([item({ state: "moved", end })], {
      answer: () => new Response(null, { status: 204 }),
    });
    const row = within(await screen.findByRole("listitem"));
    expect(row.getByText("moved away")).toBeTruthy();
    expect(row.getByRole("img", { name: /follow-up ended before its last day/ })).toBeTruthy();
    expect(row.queryByRole("group")).toBeNull();
    await user.click(row.getByRole("button", { name: "reopen" }));
    const question = within(await screen.findByRole("alertdialog"));
    await user.click(question.getByRole("button", { name: "Reopen" }));
    await waitFor(() => expect(sent[0]?.path).toBe(`${item({}).id}/end/${end.id}`));
    await waitFor(() => expect(screen.queryByRole("alertdialog")).toBeNull());
    expect(dueDays(item({ end, state: "moved" }), today).at(-1)?.day).toBe(today);
  });

  it("lists who has no day 0 with the reason and a way to mend it", async () => {
    const { asked, user } = open(
      [
        item({
          dayZero: null,
          lastDueDay: null,
          dayNumber: null,
          dueDays: [],
          dayZeroGap: "month_only",
          reopenedOn: "2026-05-20",
        }),
      ],
      { withoutDayZero: 1 },
    );
    await user.click(await screen.findByRole("button", { name: "show them" }));
    await waitFor(() => expect(asked.at(-1)?.get("show")).toBe("without_day_zero"));
    const row = within(await screen.findByRole("listitem"));
    expect(row.getByText("no day 0")).toBeTruthy();
    expect(row.getByText(/known to the month only/)).toBeTruthy();
    expect(row.getByText(/^reopened /)).toBeTruthy();
    const mend = row.getByRole("link", { name: "Complete the exposure of Linnet Marsh" });
    expect(mend.getAttribute("href")).toMatch(/\/trace\/people\/5f5c1d8a/);
    expect(screen.queryByText("1 without a day 0:")).toBeNull();
  });

  it("says in words when nobody is due", async () => {
    open([], { total: 0 });
    expect(await screen.findByText("No contact is due today")).toBeTruthy();
  });
});
