// @vitest-environment jsdom
import { cleanup, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it } from "vitest";
import { Component } from "../../src/features/review/routes/review-route.tsx";
import { investigationKey } from "../../src/lib/query-keys.ts";
import { ids, summaryOf } from "./support/network-answers.ts";
import { type Answers, renderRoom } from "./support/room.tsx";

afterEach(cleanup);

const groups = {
  items: [
    { id: ids.small, size: 5, cases: 2, contacts: 3, grownSince: 4 },
    { id: ids.large, size: 60, cases: 20, contacts: 40, grownSince: 0 },
  ],
  total: 2,
  page: 1,
  pageSize: 50,
  graphVersion: 1482,
  since: "2026-05-27T00:00:00.000Z",
};
const clusters = {
  items: [
    {
      number: 1,
      kind: "health_care",
      cases: 6,
      firstDay: "2026-05-11",
      lastDay: "2026-05-24",
      onsets: [
        { day: "2026-05-11", count: 3, basis: "onset" },
        { day: "2026-05-11", count: 1, basis: "specimen" },
        { day: "2026-05-24", count: 2, basis: "onset" },
      ],
      newInLast7Days: 2,
      places: 3,
      members: ["D-4417", "D-4418", "D-4419", "D-4420", "D-4421", "D-4422"],
    },
    {
      number: 2,
      kind: "contact_only",
      cases: 2,
      firstDay: "2026-05-02",
      lastDay: "2026-05-04",
      onsets: [
        { day: "2026-05-02", count: 1, basis: "onset" },
        { day: "2026-05-04", count: 1, basis: "onset" },
      ],
      newInLast7Days: 0,
      places: 0,
      members: ["D-4430", "D-4431"],
    },
  ],
  total: 2,
  page: 1,
  pageSize: 10,
  graphVersion: 1482,
  today: "2026-05-27",
  windowDays: 14,
  minimumCases: 2,
  withoutReferenceDay: 5,
  updating: false,
};
const answers: Answers = (path) => answerOf(path);
const answerOf = (path: string, version = 1482): unknown => {
  if (path === "groups") return { ...groups, graphVersion: version };
  if (path === "clusters") return { ...clusters, graphVersion: version };
  return summaryOf({ graphVersion: version });
};

function open(given = answers, rooms: ("review" | "compare")[] = ["review", "compare"]) {
  return renderRoom({ room: Component, at: "/room", rooms, answers: given });
}

describe("review room", () => {
  it("opens with the strip of interviewed people in the preset window and its sentence", async () => {
    const { asked, cutOffs } = open();
    await screen.findByText(/^Above the threshold of 1 contact pair per person/);
    expect(asked).toContain("network/summary?population=interviewed&window=preset");
    expect(screen.getByRole("img", { name: /^Threshold strip: 1\.52/ })).toBeTruthy();
    expect(screen.getByText(/Above 1 does not mean the outbreak will grow/)).toBeTruthy();
    expect(cutOffs.at(-1)).toMatchObject({ graphVersion: 1482, updating: false });
  });

  it("lists groups by growth since the start of today, colours by size", async () => {
    const { asked } = open();
    const table = await screen.findByRole("table", { name: "Connected groups" });
    expect(asked).toContain("groups?page=1&pageSize=50&sort=-grownSince");
    await waitFor(() => expect(within(table).getByRole("row", { name: /G-BBBBB \+4 5 2 3 2/ })));
    expect(within(table).getByRole("row", { name: /G-AAAAA 0 60 20 40 1/ })).toBeTruthy();
    expect(screen.getByText(/growth since May 27, 2026, 00:00/)).toBeTruthy();
    expect(screen.getByText(/^1 group grew by 4 people since/)).toBeTruthy();
    expect(screen.getAllByText(/an epidemiologist decides what a cluster is/)).toHaveLength(2);
  });

  it("leads to the group in Compare", async () => {
    const user = userEvent.setup();
    open();
    await user.click(await screen.findByRole("link", { name: "G-BBBBB" }));
    expect(screen.getByText(`at /i/${ids.investigation}/compare?group=${ids.small}`)).toBeTruthy();
  });

  it("leads nowhere for a role without Compare", async () => {
    open(answers, ["review"]);
    await screen.findByText("G-BBBBB");
    expect(screen.queryByRole("link", { name: "G-BBBBB" })).toBeNull();
  });

  it("says which version it shows while a newer one is fetched", async () => {
    let release: (() => void) | undefined;
    let version = 1482;
    const { queryClient } = open((path) => answerOf(path, version));
    await screen.findByText("G-BBBBB");
    const quick = globalThis.fetch;
    const held = new Promise<void>((resolve) => {
      release = resolve;
    });
    globalThis.fetch = async (...request) => {
      await held;
      return quick(...request);
    };
    version = 1483;
    for (const word of ["network", "groups", "clusters"] as const) {
      void queryClient.invalidateQueries({ queryKey: investigationKey(ids.investigation, word) });
    }
    expect(await screen.findAllByText("as of version 1,482, updating")).toHaveLength(3);
    release?.();
    await screen.findAllByText(/version 1,483/);
    expect(screen.queryByText(/updating/)).toBeNull();
  });

  it("shows an error without hiding the rest", async () => {
    open((path) =>
      path === "groups"
        ? new Response(JSON.stringify({ code: "internal" }), { status: 500 })
        : answerOf(path),
    );
    expect(await screen.findByText("This could not be loaded")).toBeTruthy();
    expect(await screen.findByText(/^Above the threshold/)).toBeTruthy();
  });

  it("lists proposed clusters, each with its onsets on one scale of days", async () => {
    const { asked } = open();
    const table = await screen.findByRole("table", { name: "Proposed clusters" });
    expect(asked).toContain("clusters?page=1&pageSize=10");
    const row = await within(table).findByRole("row", { name: /health care/ });
    const members = "D-4417, D-4418, D-4419, D-4420 and 2 more";
    expect(within(row).getAllByRole("cell").at(-1)?.textContent).toBe(members);
    expect(row.textContent).toMatch(/^162health care3May 11, 2026May 24, 20261/);
    expect(within(table).getByRole("row", { name: /contact only/ })).toBeTruthy();
    const strip = screen.getByRole("img", { name: /^Onsets of the proposed clusters/ });
    const words = strip.getAttribute("aria-label") ?? "";
    expect(words).toContain("Days May 2, 2026 to May 27, 2026, today May 27, 2026");
    expect(words).toContain("proposed cluster 1: 2 entries; proposed cluster 2: 2 entries");
    expect(
      screen.getByText(/^5 cases have neither a whole onset day nor a specimen day/),
    ).toBeTruthy();
    expect(screen.getByText(/with reference days at most 14 days apart/)).toBeTruthy();
  });

  it("asks again in the order of a column", async () => {
    const user = userEvent.setup();
    const { asked } = open();
    const table = await screen.findByRole("table", { name: "Proposed clusters" });
    await user.click(within(table).getByRole("button", { name: /new in 7 days/ }));
    await waitFor(() =>
      expect(asked.some((one) => /^clusters\?.*sort=-?newInLast7Days/.test(one))).toBe(true),
    );
  });

  it("says what no proposed cluster means", async () => {
    open((path) => (path === "clusters" ? { ...clusters, items: [], total: 0 } : answerOf(path)));
    expect(await screen.findByText("No proposed cluster")).toBeTruthy();
    expect(screen.getByText(/does not mean that there is none/)).toBeTruthy();
    expect(screen.queryByRole("img", { name: /^Onsets/ })).toBeNull();
  });
});
