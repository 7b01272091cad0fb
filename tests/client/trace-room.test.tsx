import { cleanup, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import type { Role } from "../../shared/roles.ts";
import { Component as TraceRoute } from "../../src/features/people/routes/trace-route.tsx";
import { type Answer, accountId, investigationId, renderDesk } from "./support/trace-desk.tsx";

const common = {
  id: "44444444-4444-4444-8444-444444444444",
  studyNumber: "AAA-0001",
  version: 1,
  recordedAt: "2026-05-20T08:00:00Z",
  ageBand: "25-44",
  sex: "female",
  area: "Quayside",
  householdNumber: 7,
  classification: "confirmed",
  becameCase: false,
  onsetDate: "2026-05-18",
  specimenDate: null,
  resultDate: null,
  result: "pending",
  reportDate: null,
  interviewDate: null,
  interviewed: null,
  interviewState: null,
  isolationDate: null,
  outcome: null,
  outcomeDate: null,
  diedDate: null,
};
const list = (...items: object[]) => ({
  body: { items, total: items.length, page: 1, pageSize: 50 },
});
const forTracer = {
  ...common,
  name: "Ada Invented",
  phone: "0700 1",
  ref: null,
  assignedTo: accountId,
  can: { edit: true, interview: true, addTest: true },
};
const forEpidemiologist = { ...common, can: {} };

function open(role: Role, answer: Answer) {
  return renderDesk(
    [{ path: "/i/:investigationId/trace", element: <TraceRoute /> }],
    `/i/${investigationId}/trace`,
    { role, answer },
  );
}

beforeEach(() => localStorage.clear());
afterEach(cleanup);

describe("Trace", () => {
  it("finds by a typed name without it standing in any address", async () => {
    const { sent, router } = open("tracer", () => list(forTracer));
    const user = userEvent.setup();
    await screen.findByRole("table");
    await user.click(screen.getByRole("searchbox"));
    await user.paste("invented");
    await waitFor(() => expect(sent.some((one) => one.path === "people/search")).toBe(true));
    const searches = sent.filter((one) => one.path === "people/search");
    expect(searches).toHaveLength(1);
    expect(searches[0]).toMatchObject({ method: "POST", body: { q: "invented", page: 1 } });
    const addresses = [...sent.map((one) => one.path), router.state.location.search];
    expect(addresses.filter((one) => /invented/i.test(one))).toEqual([]);
  });

  it("asks the server to sort and filter, and keeps both in the address", async () => {
    const { sent, router } = open("tracer", () => list(forTracer));
    const user = userEvent.setup();
    await screen.findByRole("table");
    await user.click(screen.getByRole("button", { name: "Onset" }));
    await user.click(screen.getByRole("button", { name: "Onset" }));
    await user.selectOptions(screen.getByLabelText("Classification"), "case");
    await waitFor(() =>
      expect(sent.at(-1)?.path).toBe(
        "people?page=1&pageSize=50&sort=-onsetDate&classification=case",
      ),
    );
    expect(router.state.location.search).toBe("?sort=-onsetDate&classification=case");
  });

  it("shows the columns of the answer and offers the reader's own interviews first", async () => {
    open("tracer", () => list(forTracer));
    const table = await screen.findByRole("table");
    expect(within(table).getByRole("columnheader", { name: "Name" })).toBeTruthy();
    expect(within(table).getByText("Ada Invented")).toBeTruthy();
    expect(within(table).getByText("you")).toBeTruthy();
    const interview = screen.getByRole("link", { name: "Interview AAA-0001" });
    expect(interview.getAttribute("href")).toContain(`${common.id}/interview`);
    expect(screen.getByRole("link", { name: "Register a person" })).toBeTruthy();
  });

  it("shows no name, no queue and no way to register where the answer has none", async () => {
    const { sent } = open("epidemiologist", () => list(forEpidemiologist));
    const table = await screen.findByRole("table");
    expect(within(table).queryByRole("columnheader", { name: "Name" })).toBeNull();
    expect(screen.queryByText("To interview")).toBeNull();
    expect(screen.queryByRole("link", { name: "Register a person" })).toBeNull();
    // What cannot be read is not filtered by either: the server would refuse it.
    expect(sent.filter((one) => one.path.includes("assigned"))).toEqual([]);
    expect(sent.filter((one) => one.path.startsWith("members"))).toEqual([]);
  });

  it("remembers which columns are shown, and nothing of the rows", async () => {
    open("tracer", () => list(forTracer));
    const user = userEvent.setup();
    await screen.findByRole("table");
    await user.click(screen.getByRole("button", { name: "Columns" }));
    await user.click(screen.getByRole("checkbox", { name: "Telephone" }));
    expect(screen.queryByRole("columnheader", { name: "Telephone" })).toBeNull();
    const kept = JSON.stringify({ ...localStorage });
    expect(kept).toContain("phone");
    expect(kept).not.toMatch(/Ada|0700|Quayside|AAA/);
  });

  it.each(["supervisor", "officer"] as const)("names assigned members to a %s", async (role) => {
    const member = "66666666-6666-4666-8666-666666666666";
    const team = "77777777-7777-4777-8777-777777777777";
    const answer: Answer = ({ path }) =>
      path === "people/assignees"
        ? {
            body: {
              members: [{ accountId: member, displayName: "Tracer Two", team: null }],
              teams: [{ id: team, name: "Harbour" }],
            },
          }
        : list(
            { ...forTracer, assignedTo: member, assignedTeam: null },
            { ...forTracer, id: team, assignedTo: null, assignedTeam: team },
          );
    open(role, answer);
    const table = await screen.findByRole("table");
    expect(await within(table).findByText("Tracer Two")).toBeTruthy();
    expect(within(table).getByText("team Harbour")).toBeTruthy();
  });

  it("says what is wrong when the list cannot be read", async () => {
    open("tracer", () => ({ status: 503, body: { code: "unavailable" } }));
    expect((await screen.findAllByRole("alert")).length).toBeGreaterThan(0);
  });
});
