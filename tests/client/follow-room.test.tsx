// @vitest-environment jsdom
import { cleanup, configure, screen, waitFor, within } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import type { FollowUpItem } from "../../shared/contracts/follow-up.ts";
import {
  commonScale,
  dayWords,
  dueDays,
  followMark,
} from "../../src/features/follow-up/lib/due-days.ts";
import { addDays } from "../../src/lib/calendar-day.ts";
import { item, openRoom, today } from "./support/follow-room.tsx";

configure({ asyncUtilTimeout: 15_000 });
vi.setConfig({ testTimeout: 30_000 });
afterEach(cleanup);

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
    const { asked } = openRoom([item({})]);
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
    expect(screen.queryByText(/without a day 0:/)).toBeNull();
  });

  it("goes by study number where name and phone are not the reader's to know", async () => {
    const { name: _name, phone: _phone, ...closed } = item({});
    openRoom([closed]);
    expect(await screen.findByRole("link", { name: "K4T-29X7" })).toBeTruthy();
    expect(screen.getByText("number not open")).toBeTruthy();
    expect(document.querySelector('a[href^="tel:"]')).toBeNull();
  });

  it("names how many have no day 0", async () => {
    openRoom([item({})], { withoutDayZero: 3 });
    expect(await screen.findByText("3 without a day 0:")).toBeTruthy();
  });

  it("filters and pages through the address, with study numbers but never a name", async () => {
    const { asked, router, user } = openRoom([item({})]);
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
    const { sent, user } = openRoom([item({})], {
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
    const { sent, user } = openRoom([item({})]);
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
    openRoom([
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
    const { sent, user } = openRoom([item({})], { answer: () => Response.json({}) });
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
    const { sent, user } = openRoom([item({})], {
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

  it("says in words when nobody is due", async () => {
    openRoom([], { total: 0 });
    expect(await screen.findByText("No contact is due today")).toBeTruthy();
  });
});
