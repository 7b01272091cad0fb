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
const answers: Answers = (path) => (path === "groups" ? groups : summaryOf());

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
    expect(screen.getByText(/an epidemiologist decides what a cluster is/)).toBeTruthy();
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
    const { queryClient } = open((path) => {
      if (path !== "groups") return summaryOf({ graphVersion: version });
      return { ...groups, graphVersion: version };
    });
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
    for (const word of ["network", "groups"] as const) {
      void queryClient.invalidateQueries({ queryKey: investigationKey(ids.investigation, word) });
    }
    expect(await screen.findAllByText("as of version 1,482, updating")).toHaveLength(2);
    release?.();
    await screen.findAllByText(/version 1,483/);
    expect(screen.queryByText(/updating/)).toBeNull();
  });

  it("shows an error without hiding the rest", async () => {
    open((path) =>
      path === "groups"
        ? new Response(JSON.stringify({ code: "internal" }), { status: 500 })
        : summaryOf(),
    );
    expect(await screen.findByText("This could not be loaded")).toBeTruthy();
    expect(await screen.findByText(/^Above the threshold/)).toBeTruthy();
  });
});
