// @vitest-environment jsdom
import { cleanup, fireEvent, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { NodesTable } from "../../src/features/compare/components/nodes-table.tsx";
import { pictureNodes } from "../../src/features/compare/picture-nodes.ts";
import { Component } from "../../src/features/compare/routes/compare-route.tsx";
import { graphOf, ids, summaryOf } from "./support/network-answers.ts";
import { renderRoom } from "./support/room.tsx";

afterEach(cleanup);

function open(at = "/room", summary: (query: URLSearchParams) => unknown = () => summaryOf()) {
  return renderRoom({
    room: Component,
    at,
    rooms: ["review", "compare"],
    answers: (path, query) =>
      path === "compare/runs" ? { items: [], total: 0, page: 1, pageSize: 10 } : summary(query),
  });
}

describe("compare room", () => {
  it("says what was seen before any figure, then the strip", async () => {
    open();
    const seen = await screen.findByRole("region", { name: "What was seen" });
    const strip = screen.getByRole("figure", { name: "Threshold strip" });
    expect(seen.compareDocumentPosition(strip) & Node.DOCUMENT_POSITION_FOLLOWING).toBeTruthy();
    expect(seen.textContent).toContain("214 of 1,036 (21%)");
    expect(seen.textContent).toContain("no contact pair was told by both of its people");
    expect(seen.textContent).toContain("A line is a contact, not an infection.");
  });

  it("asks anew when people, exposures or day are changed", async () => {
    const user = userEvent.setup();
    const { asked } = open();
    await screen.findByText(/^Above the threshold/);
    await user.selectOptions(screen.getByLabelText("people"), "cases");
    await waitFor(() => expect(asked).toContain("network/summary?population=cases&window=preset"));
    await user.selectOptions(screen.getByLabelText("exposures"), "free");
    fireEvent.change(screen.getByLabelText("from"), { target: { value: "2026-05-01" } });
    fireEvent.change(screen.getByLabelText("to"), { target: { value: "2026-05-20" } });
    await waitFor(() =>
      expect(asked).toContain("network/summary?population=cases&from=2026-05-01&to=2026-05-20"),
    );
    fireEvent.change(screen.getByLabelText("as of the end of"), {
      target: { value: "2026-05-22" },
    });
    await waitFor(() =>
      expect(asked).toContain(
        "network/summary?population=cases&from=2026-05-01&to=2026-05-20&asOf=2026-05-22",
      ),
    );
  });

  it("does not ask for half a year or a range that ends before it begins", async () => {
    const { asked } = open("/room?window=free&from=2026-05-20&to=2026-05-01");
    expect(await screen.findByText("The last day is before the first.")).toBeTruthy();
    fireEvent.change(screen.getByLabelText("as of the end of"), {
      target: { value: "0002-05-22" },
    });
    expect(asked.filter((path) => path.startsWith("network"))).toEqual([]);
  });

  it("has a reason where a measure is missing, and keeps mean degree apart", async () => {
    open("/room", () =>
      summaryOf({ transitivity: null, reasons: { transitivity: "no_two_paths" } }),
    );
    const table = await screen.findByRole("table", { name: "Measures of the network" });
    const row = within(table).getByRole("row", { name: /^transitivity/ });
    expect(row.textContent).toContain("—");
    expect(row.textContent).toContain("nobody here has two contact pairs");
    expect(table.textContent).toContain("not to be held against 1");
  });

  it("saves what it shows as CSV without a person", async () => {
    const user = userEvent.setup();
    const blobs: Blob[] = [];
    vi.spyOn(URL, "createObjectURL").mockImplementation((blob) => {
      blobs.push(blob as Blob);
      return "blob:report";
    });
    vi.spyOn(URL, "revokeObjectURL").mockImplementation(() => {});
    const names: string[] = [];
    vi.spyOn(HTMLAnchorElement.prototype, "click").mockImplementation(function click(
      this: HTMLAnchorElement,
    ) {
      names.push(this.download);
    });
    open();
    await user.click(await screen.findByRole("button", { name: "Save as CSV" }));
    expect(names).toEqual(["network-report-version-1482.csv"]);
    const text = (await blobs[0]?.text()) ?? "";
    expect(text).toContain("people by number of contact pairs,1,40");
    expect(text).not.toContain("S-9");
  });

  it("leaves the picture until it comes near", async () => {
    const scrolled = vi.fn();
    // A page without layout cannot scroll; the stub stands in for the browser's own.
    HTMLElement.prototype.scrollIntoView = scrolled;
    const { asked } = open(`/room?group=${ids.large}`);
    await screen.findByText(/^Above the threshold/);
    expect(screen.getByText("Group G-AAAAA")).toBeTruthy();
    await waitFor(() => expect(scrolled).toHaveBeenCalledOnce());
    expect(asked.filter((path) => path.startsWith("network/graph"))).toEqual([]);
  });
});

describe("table of the picture", () => {
  it("has study numbers, marks in words, groups, and links to pages the role has", async () => {
    const user = userEvent.setup();
    const onGroup = vi.fn();
    const nodes = pictureNodes(graphOf(), new Map([[ids.large, 0]]));
    renderRoom({
      room: () => <NodesTable nodes={nodes} personTo={(id) => `/person/${id}`} onGroup={onGroup} />,
      at: "/room",
      rooms: ["compare"],
      answers: () => null,
    });
    const row = screen.getByRole("row", { name: /S-9 confirmed case G-AAAAA/ });
    expect(within(row).getByRole("link", { name: "S-9" }).getAttribute("href")).toBe(
      `/person/${ids.one}`,
    );
    expect(screen.getByRole("row", { name: /S-2 not classified no pair drawn 0/ })).toBeTruthy();
    await user.click(within(row).getByRole("button", { name: /G-AAAAA/ }));
    expect(onGroup).toHaveBeenCalledWith(ids.large);
  });
});
