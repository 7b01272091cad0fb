// @vitest-environment jsdom
import { cleanup, configure, screen, waitFor, within } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { dueDays } from "../../src/features/follow-up/lib/due-days.ts";
import { item, openRoom, today } from "./support/follow-room.tsx";

configure({ asyncUtilTimeout: 15_000 });
vi.setConfig({ testTimeout: 30_000 });
afterEach(cleanup);

const onlyRow = async () =>
  within(
    within(await screen.findByRole("list", { name: "Contacts under follow-up" })).getByRole(
      "listitem",
    ),
  );

describe("ends of a follow-up", () => {
  it("ends a follow-up in two steps, and not without a reason", async () => {
    const { sent, user } = openRoom([item({})]);
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
    const { user } = openRoom([item({})], {
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
    const { sent, user } = openRoom([item({ state: "moved", end })], {
      answer: () => new Response(null, { status: 204 }),
    });
    const row = await onlyRow();
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
    const { asked, user } = openRoom(
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
    const row = await onlyRow();
    expect(row.getByText("no day 0")).toBeTruthy();
    expect(row.getByText(/known to the month only/)).toBeTruthy();
    expect(row.getByText(/^reopened /)).toBeTruthy();
    const mend = row.getByRole("link", { name: "Complete the exposure of Linnet Marsh" });
    expect(mend.getAttribute("href")).toMatch(/\/trace\/people\/5f5c1d8a/);
    expect(screen.queryByText("1 without a day 0:")).toBeNull();
  });
});
