// @vitest-environment jsdom
import { act, cleanup, fireEvent, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { LineList } from "../../src/features/people/components/line-list.tsx";
import { typingPauseMs } from "../../src/features/people/use-list-state.ts";
import { pagesIn } from "../../src/features/people/use-people-pages.ts";
import {
  type Answer,
  accountId,
  investigationId,
  renderDesk,
  type Sent,
} from "./support/trace-desk.tsx";

const total = 1_000;
const number = (index: number) => `AAA-${String(index).padStart(4, "0")}`;
const idOf = (index: number) => `44444444-4444-4444-8444-${String(index).padStart(12, "0")}`;

function person(index: number) {
  return {
    id: idOf(index),
    studyNumber: number(index),
    version: 1,
    recordedAt: "2026-05-20T08:00:00Z",
    name: `Invented ${index}`,
    phone: null,
    ref: null,
    ageBand: null,
    sex: null,
    area: null,
    householdNumber: null,
    classification: "confirmed",
    becameCase: false,
    onsetDate: null,
    result: null,
    interviewState: null,
    interviewed: null,
    assignedTo: null,
    assignedTeam: null,
    can: {},
  };
}

const assignees = {
  members: [{ accountId, displayName: "Tracer Two", team: null }],
  teams: [{ id: idOf(999_999), name: "Harbour" }],
};

/** Answers like the server: pages of a thousand people, or of those a search finds. */
const served: Answer = ({ path, body }) => {
  if (path === "people/assignees") return { body: assignees };
  if (path === "people/filters") return { body: { items: [] } };
  const asked = new URLSearchParams(path.split("?")[1] ?? "");
  const { page = 1, q } = (body ?? { page: Number(asked.get("page") ?? 1) }) as {
    page?: number;
    q?: string;
  };
  const all = q ? [q.length] : Array.from({ length: total }, (_, index) => index);
  const items = all.slice((page - 1) * 50, page * 50).map(person);
  return { body: { items, total: all.length, page, pageSize: 50 } };
};

function open(answer: Answer = served, role: "supervisor" | "tracer" = "supervisor") {
  return renderDesk(
    [{ path: "/i/:investigationId/trace", element: <LineList /> }],
    `/i/${investigationId}/trace`,
    { role, answer },
  );
}

const lists = (sent: readonly Sent[]) =>
  sent.filter(({ path }) => path.startsWith("people?") || path === "people/search");
/** By its place, because names of all rows take long to work out; it must be drawn and loaded. */
function rowOf(index: number): HTMLElement {
  const row = document.querySelector<HTMLElement>(`tr[data-row="${index}"]`);
  if (!row || row.hasAttribute("aria-busy")) throw new Error(`row ${index} is not there`);
  return row;
}
const arrives = (index: number) => waitFor(() => rowOf(index));

/** The test browser lays nothing out: what scrolling needs is made up here. */
function giveSizes() {
  const sizes = { scrollHeight: 36_000 + 40, clientHeight: 640 };
  for (const [name, value] of Object.entries(sizes)) {
    Object.defineProperty(HTMLElement.prototype, name, { configurable: true, get: () => value });
  }
  HTMLElement.prototype.scrollTo = function scrollTo(this: HTMLElement, to?: unknown) {
    this.scrollTop = Number((to as { top?: number } | undefined)?.top ?? 0);
    queueMicrotask(() => this.dispatchEvent(new Event("scroll")));
  } as typeof HTMLElement.prototype.scrollTo;
}

beforeEach(() => {
  localStorage.clear();
  giveSizes();
});
afterEach(() => {
  vi.useRealTimers();
  cleanup();
});

describe("rows", () => {
  it("are drawn as far as they are in view, and counted in all", async () => {
    const { sent } = open();
    const table = await screen.findByRole("table", { name: "People on record" });
    expect(table.getAttribute("aria-rowcount")).toBe("1001");
    expect(document.querySelectorAll("tr[data-row]").length).toBeLessThan(60);
    expect(screen.getByText("1,000 people")).toBeTruthy();
    expect(lists(sent)).toHaveLength(1);
  });

  it("are walked by keyboard over the whole list; only what stays in view is asked for", async () => {
    const user = userEvent.setup();
    const { sent, router } = open();
    await screen.findByRole("table");
    rowOf(0).focus();
    await user.keyboard("{ArrowDown}{ArrowDown}{ArrowUp}");
    expect(document.activeElement).toBe(rowOf(1));
    await user.keyboard("{End}");
    const last = await arrives(999);
    await waitFor(() => expect(document.activeElement?.getAttribute("data-row")).toBe("999"));
    expect(last.getAttribute("aria-rowindex")).toBe("1001");
    const pages = lists(sent).map(({ path }) => Number(/page=(\d+)/.exec(path)?.[1]));
    expect(Math.max(...pages)).toBe(20);
    expect(pages.length).toBeLessThan(5);
    await user.keyboard("{Enter}");
    expect(router.state.location.pathname).toContain(`people/${idOf(999)}`);
  });

  it("lie on pages", () => {
    expect(pagesIn({ first: 0, last: 20 }, 1_000)).toEqual([]);
    expect(pagesIn({ first: 40, last: 60 }, 1_000)).toEqual([2]);
    expect(pagesIn({ first: 990, last: 1_010 }, 1_000)).toEqual([20]);
    expect(pagesIn({ first: 0, last: 0 }, 0)).toEqual([]);
  });

  it("are where they were left when one comes back from a person", async () => {
    const user = userEvent.setup();
    const { router } = open();
    await screen.findByRole("table");
    rowOf(0).focus();
    await user.keyboard("{End}");
    await arrives(999);
    await user.keyboard("{Enter}");
    await act(() => router.navigate(-1));
    expect((await arrives(990)).textContent).toContain(number(990));
  });
});

describe("typing", () => {
  it("asks once, 150 ms after the last key at most, and keeps the rows until the answer", async () => {
    open();
    await screen.findByRole("table");
    expect(typingPauseMs).toBeLessThanOrEqual(150);
    vi.useFakeTimers();
    const sent: string[] = [];
    const answers: (() => void)[] = [];
    vi.stubGlobal("fetch", (_address: string, init: RequestInit) => {
      const { q } = JSON.parse(String(init.body)) as { q: string };
      sent.push(q);
      return new Promise<Response>((done, fail) => {
        init.signal?.addEventListener("abort", () => fail(new DOMException("", "AbortError")));
        const items = [person(q.length)];
        answers.push(() =>
          done(new Response(JSON.stringify({ items, total: 1, page: 1, pageSize: 50 }))),
        );
      });
    });
    const box = screen.getByRole("searchbox");
    const type = (value: string) => fireEvent.change(box, { target: { value } });
    const pass = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));
    for (const value of ["i", "in", "inv"]) {
      type(value);
      await pass(typingPauseMs - 20);
    }
    expect(sent).toEqual([]);
    await pass(20);
    expect(sent).toEqual(["inv"]);
    // The rows of before stand until the answer is there.
    expect(rowOf(0).textContent).toContain(number(0));
    type("invented");
    await pass(typingPauseMs);
    expect(sent).toEqual(["inv", "invented"]);
    // The answers come in the wrong order: the one to an earlier question is dropped.
    answers[1]?.();
    await pass(5);
    expect(rowOf(0).textContent).toContain(number(8));
    answers[0]?.();
    await pass(5);
    expect(rowOf(0).textContent).toContain(number(8));
    expect(screen.queryByText(number(3))).toBeNull();
  });
});

describe("selection", () => {
  it("is made by keyboard, and assigned with the versions that were seen", async () => {
    const user = userEvent.setup();
    const { sent } = open((request) =>
      request.path === "people/assign"
        ? { body: { changed: 2, unchanged: 0, skipped: [idOf(2)] } }
        : served(request),
    );
    await screen.findByRole("table");
    rowOf(0).focus();
    await user.keyboard(" {Shift>}{ArrowDown}{ArrowDown}{/Shift}");
    expect(screen.getByText("3 people selected")).toBeTruthy();
    expect(within(rowOf(1)).getByLabelText<HTMLInputElement>(`Select ${number(1)}`).checked).toBe(
      true,
    );
    await user.selectOptions(screen.getByLabelText("Assign to"), "Tracer Two");
    await user.click(screen.getByRole("button", { name: "Assign" }));
    expect(await screen.findByText(/2 people assigned/)).toBeTruthy();
    expect(sent.find(({ path }) => path === "people/assign")?.body).toEqual({
      to: { kind: "member", accountId },
      people: [0, 1, 2].map((index) => ({ id: idOf(index), version: 1 })),
    });
    // Who was changed meanwhile is named by number.
    expect(screen.getByText(new RegExp(`left as they are: ${number(2)}`))).toBeTruthy();
    expect(screen.queryByText(/selected$/)).toBeNull();
  });

  it("of everybody a filter finds goes out as the filter, with the number that was seen", async () => {
    const user = userEvent.setup();
    const { sent } = open((request) =>
      request.path === "people/assign"
        ? { status: 409, body: { code: "stale_version" } }
        : served(request),
    );
    await screen.findByRole("table");
    await user.selectOptions(screen.getByLabelText("Classification"), "case");
    await user.click(within(await arrives(4)).getByRole("checkbox"));
    await user.click(screen.getByRole("button", { name: "Select all 1,000" }));
    expect(screen.getByText("1,000 people selected")).toBeTruthy();
    await user.selectOptions(screen.getByLabelText("Assign to"), "team Harbour");
    await user.click(screen.getByRole("button", { name: "Assign" }));
    expect(await screen.findByText(/no longer the one you saw/)).toBeTruthy();
    expect(sent.find(({ path }) => path === "people/assign")?.body).toEqual({
      to: { kind: "team", teamId: idOf(999_999) },
      filter: { classification: "case" },
      expected: total,
    });
  });

  it("ends with the question, and is not offered to who may not assign", async () => {
    const user = userEvent.setup();
    open();
    await screen.findByRole("table");
    rowOf(3).focus();
    await user.keyboard(" ");
    expect(screen.getByText("1 person selected")).toBeTruthy();
    await user.selectOptions(screen.getByLabelText("Classification"), "case");
    await waitFor(() => expect(screen.queryByText("1 person selected")).toBeNull());
    cleanup();
    open(served, "tracer");
    await screen.findByRole("table");
    expect(screen.queryByLabelText(/^Select/)).toBeNull();
  });
});

describe("saved filters and columns", () => {
  it("keeps filters and order under a name, and never what was typed", async () => {
    const user = userEvent.setup();
    const kept = { id: idOf(1), name: "Late", filter: { onsetFrom: "2026-05-01" }, version: 1 };
    const { sent, router } = open((request) => {
      if (request.path !== "people/filters") return served(request);
      return request.method === "POST" ? { body: kept } : { body: { items: [kept] } };
    });
    await screen.findByRole("table");
    await user.selectOptions(screen.getByLabelText("Classification"), "case");
    await user.type(screen.getByRole("searchbox"), "invented");
    await user.click(screen.getByRole("button", { name: "Saved filters" }));
    const panel = screen.getByRole("dialog", { name: "Saved filters" });
    await user.type(within(panel).getByLabelText(/^Keep the present filter/), "Cases");
    await user.click(within(panel).getByRole("button", { name: "Keep" }));
    await waitFor(() =>
      expect(
        sent.find(({ method, path }) => method === "POST" && path === "people/filters")?.body,
      ).toEqual({ name: "Cases", filter: { classification: "case" } }),
    );
    await user.click(within(panel).getByRole("button", { name: "Late" }));
    await waitFor(() => expect(router.state.location.search).toBe("?onsetFrom=2026-05-01"));
    expect(screen.getByRole<HTMLInputElement>("searchbox").value).toBe("");
  });

  it("moves columns and remembers it for this account, without a word about anybody", async () => {
    const user = userEvent.setup();
    open();
    const table = await screen.findByRole("table");
    const heads = () =>
      within(table)
        .getAllByRole("columnheader")
        .map((cell) => cell.textContent);
    expect(heads().indexOf("Name")).toBeLessThan(heads().indexOf("Telephone"));
    await user.click(screen.getByRole("button", { name: "Columns" }));
    await user.click(screen.getByRole("button", { name: "Move Telephone earlier" }));
    await user.selectOptions(screen.getByLabelText("Width of Name"), "wide");
    expect(heads().indexOf("Name")).toBeGreaterThan(heads().indexOf("Telephone"));
    const stored = JSON.stringify({ ...localStorage });
    expect(stored).toContain(`people-columns.${accountId}`);
    expect(stored).not.toMatch(/Invented|AAA-/);
  });
});

it("shows two lines a person on a narrow page, with nothing to scroll sideways", async () => {
  vi.stubGlobal("matchMedia", () => ({
    matches: true,
    addEventListener() {},
    removeEventListener() {},
  }));
  open();
  const cards = await screen.findByRole("list", { name: "People on record" });
  expect(screen.queryByRole("table")).toBeNull();
  const [first] = within(cards).getAllByRole("listitem");
  expect(first?.getAttribute("aria-setsize")).toBe("1000");
  expect(first?.textContent).toContain("Invented 0");
  expect(within(cards).getAllByRole("link")[0]?.getAttribute("href")).toContain(idOf(0));
  vi.unstubAllGlobals();
});
