// @vitest-environment jsdom
import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { afterEach, describe, expect, it, vi } from "vitest";
import type { HeadingsAnswer, Import, ImportMatchList } from "../../shared/contracts/imports.ts";
import { Component } from "../../src/features/imports/routes/import-route.tsx";
import { InvestigationContext } from "../../src/lib/investigation-context.ts";
import { investigation, problem } from "./support/interview-desk.tsx";

afterEach(cleanup);

const importId = "3d1f8a52-2a0b-4b7e-a6a9-4f1f6c2d9b03";
const base = `/api/investigations/${investigation.id}/imports`;

function importOf(overrides: Partial<Import> = {}): Import {
  return {
    id: importId,
    kind: "people",
    state: "ready",
    rows: 12,
    counts: { good: 9, bad: 3, new: 7, known: 2, filled: 1, conflicts: 1 },
    problems: [
      { line: 3, column: "onset_date", code: "not_a_day" },
      { line: 7, column: "row", code: "ragged_row" },
      { line: 9, column: "area", code: "conflict" },
    ],
    problemCount: 3,
    reading: {
      encoding: "utf-8",
      mark: false,
      delimiter: "comma",
      columns: [{ column: "ref", how: "exact" }],
    },
    progress: 0,
    createMissing: false,
    recordedAt: "2026-05-27T10:00:00Z",
    committedAt: null,
    ...overrides,
  };
}

const headings = (...columns: HeadingsAnswer["columns"]): HeadingsAnswer => ({
  encoding: "utf-16le",
  mark: true,
  delimiter: "semicolon",
  columns,
});
const plainHeadings = headings(
  { heading: "ref", column: "ref", how: "exact" },
  { heading: "Full name", column: "name", how: "alike" },
);

const json = (body: unknown, status = 200) =>
  new Response(JSON.stringify(body), { status, headers: { "content-type": "application/json" } });

/** The server's side: answers by method and path, in order; the last one stands. */
function serve(answers: Record<string, (() => Response)[]>) {
  const sent: { call: string; body: unknown; key: string | null }[] = [];
  vi.stubGlobal("fetch", async (address: string, init: RequestInit) => {
    const { pathname } = new URL(address, "http://localhost");
    const call = `${init.method} ${pathname.replace(base, "imports")}`;
    sent.push({ call, body: init.body, key: new Headers(init.headers).get("Idempotency-Key") });
    const list = answers[call] ?? [];
    const answer = list.length > 1 ? list.shift() : list[0];
    if (!answer) throw new Error(`nothing answers ${call}`);
    return answer();
  });
  return sent;
}

function open(at: string) {
  const router = createMemoryRouter(
    [
      { path: "/i/:investigationId/trace/import", element: <Component /> },
      { path: "/i/:investigationId/trace/import/:importId", element: <Component /> },
    ],
    { initialEntries: [`/i/${investigation.id}/trace/${at}`] },
  );
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  render(
    <QueryClientProvider client={queryClient}>
      <InvestigationContext value={investigation}>
        <RouterProvider router={router} />
      </InvestigationContext>
    </QueryClientProvider>,
  );
  return { router, user: userEvent.setup({ delay: null }) };
}

const emptyList = () => json({ items: [], total: 0, page: 1, pageSize: 25 });
const file = new File(["ref,name\nA,Ann\n"], "../../Wren Alder.csv", { type: "text/csv" });

describe("a new file", () => {
  it("is sent without its own name and opens on a page of its own", async () => {
    const sent = serve({
      "GET imports": [emptyList],
      "POST imports/headings": [() => json(plainHeadings)],
      "POST imports": [() => json(importOf(), 201)],
      [`GET imports/${importId}`]: [() => json(importOf())],
    });
    const { user, router } = open("import");
    await screen.findByText("No file was brought in yet");
    await user.upload(screen.getByLabelText("CSV file"), file);
    await screen.findByText(/^Read as UTF-16 .* separated by semicolons\./);
    await user.click(screen.getByRole("button", { name: "Check the file" }));
    await screen.findByRole("heading", { name: "Import of people" });
    expect(router.state.location.pathname).toBe(`/i/${investigation.id}/trace/import/${importId}`);
    const body = sent.find(({ call }) => call === "POST imports")?.body as FormData;
    expect(body.get("kind")).toBe("people");
    expect((body.get("file") as File).name).toBe("people.csv");
    expect(JSON.parse(String(body.get("columns")))).toEqual(["ref", "name"]);
  });

  it("shows what each heading is taken for and sends what is chosen instead", async () => {
    const found = headings(
      { heading: "Kennung", column: null, how: "unknown" },
      { heading: "Name", column: "name", how: "alike" },
      { heading: "Schuhgröße", column: null, how: "unknown" },
    );
    const sent = serve({
      "GET imports": [emptyList],
      "POST imports/headings": [() => json(found)],
      "POST imports": [() => json(importOf(), 201)],
      [`GET imports/${importId}`]: [() => json(importOf())],
    });
    const { user } = open("import");
    await user.upload(screen.getByLabelText("CSV file"), file);
    const first = await screen.findByLabelText("Column 1 is taken for");
    expect(screen.getByText("Schuhgröße")).toBeTruthy();
    expect(screen.getByText("by a like word")).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Check the file" }));
    expect((await screen.findByRole("alert")).textContent).toContain("No column is taken for ref");
    await user.selectOptions(first, "name");
    expect(screen.getByText("chosen twice")).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Check the file" }));
    expect((await screen.findByRole("alert")).textContent).toContain("No column is taken for ref");
    await user.selectOptions(first, "ref");
    expect(screen.queryByRole("alert")).toBeNull();
    expect(screen.getByText("changed by you")).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Check the file" }));
    await screen.findByRole("heading", { name: "Import of people" });
    const body = sent.find(({ call }) => call === "POST imports")?.body as FormData;
    expect(JSON.parse(String(body.get("columns")))).toEqual(["ref", "name", null]);
  });

  it("that cannot be read says why by place, and a second try has a key of its own", async () => {
    const errors = [
      { path: "file.line.4", code: "unclosed_quote" },
      { path: "file.columns.2", code: "unknown_column" },
      { path: "file.columns.ref", code: "required_column" },
      { path: "file.line.2.byte.15", code: "encoding" },
      { path: "columns", code: "other_columns" },
    ];
    const sent = serve({
      "GET imports": [emptyList],
      "POST imports/headings": [() => json(plainHeadings)],
      "POST imports": [() => problem(422, "invalid", errors)],
    });
    const { user } = open("import");
    await user.click(screen.getByRole("button", { name: "Check the file" }));
    expect(await screen.findByText("choose a file first")).toBeTruthy();
    await user.upload(screen.getByLabelText("CSV file"), file);
    await screen.findByLabelText("Column 1 is taken for");
    await user.click(screen.getByRole("button", { name: "Check the file" }));
    const alert = await screen.findByRole("alert");
    expect(
      within(alert)
        .getAllByRole("listitem")
        .map((item) => item.textContent),
    ).toEqual([
      "Line 4: A quotation mark is not closed",
      "Column 2 of the first line: Not a column of this file",
      "Column “ref”: This column is missing",
      "Line 2, byte 15 of the file: Not readable text; save the file as UTF-8",
      "The columns: The choice of columns was made for another file",
    ]);
    await user.click(screen.getByRole("button", { name: "Check the file" }));
    await waitFor(() => {
      const keys = sent.filter(({ call }) => call === "POST imports").map(({ key }) => key);
      expect(keys).toHaveLength(2);
      expect(new Set(keys).size).toBe(2);
    });
  });
});

describe("a checked file", () => {
  it("says what would happen and lists problems by line, column and meaning", async () => {
    serve({ [`GET imports/${importId}`]: [() => json(importOf())] });
    open(`import/${importId}`);
    expect(await screen.findByText("7 people would be added.")).toBeTruthy();
    expect(screen.getByText(/^2 people are on record already; blanks .* for 1\.$/)).toBeTruthy();
    expect(screen.getByText(/^1 value differs from the record/)).toBeTruthy();
    expect(screen.getByText("3 rows have errors and would be left out.")).toBeTruthy();
    const cells = screen
      .getAllByRole("row")
      .slice(1)
      .map((row) =>
        within(row)
          .getAllByRole("cell")
          .map((cell) => cell.textContent),
      );
    expect(cells).toEqual([
      ["3", "onset_date", "Not a calendar day (YYYY-MM-DD, or YYYY-MM)"],
      ["7", "whole row", "This row has too few or too many cells"],
      ["9", "area", "Differs from what is on record; not stored"],
    ]);
    expect(screen.getByRole("button", { name: "Put 9 rows on record" })).toBeTruthy();
  });

  it("creates missing people only when that is chosen, and follows the commit to its end", async () => {
    const counts = { good: 4, bad: 3, unknownRows: 2, unknownRefs: 3, repeated: 0 };
    const staged = importOf({ kind: "pairs", rows: 7, counts, problems: [], problemCount: 0 });
    const running = { ...staged, state: "committing" as const, progress: 0.4 };
    const done = {
      ...staged,
      state: "committed" as const,
      progress: 1,
      committedAt: "2026-05-27T10:01:00Z",
      counts: { addedPeople: 3, addedPairs: 6, addedExposures: 6, skipped: 1 },
    };
    const sent = serve({
      [`GET imports/${importId}`]: [() => json(staged), () => json(running), () => json(done)],
      [`POST imports/${importId}/commit`]: [() => json(running, 202)],
    });
    const { user } = open(`import/${importId}`);
    const box = (await screen.findByLabelText("Create missing people")) as HTMLInputElement;
    expect(box.checked).toBe(false);
    await user.click(box);
    await user.click(screen.getByRole("button", { name: "Put 6 rows on record" }));
    const bar = await screen.findByRole("progressbar", { name: "Putting rows on record" });
    expect(bar.getAttribute("aria-valuenow")).toBe("0.4");
    expect(
      await screen.findByText(
        "Added: 3 people, 6 contact pairs, 6 tellings of contacts.",
        undefined,
        { timeout: 4000 },
      ),
    ).toBeTruthy();
    expect(screen.getByText("1 row was left out because of errors.")).toBeTruthy();
    const body = sent.find(({ call }) => call.startsWith("POST"))?.body;
    expect(JSON.parse(String(body))).toEqual({ createMissing: true });
  });

  it("that could not be finished says so and can be tried again", async () => {
    const problems = [{ line: 0, column: "file", code: "commit_clash" }, ...importOf().problems];
    const failed = importOf({ state: "failed", problems, problemCount: 4 });
    serve({ [`GET imports/${importId}`]: [() => json(failed)] });
    open(`import/${importId}`);
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("Someone recorded the same reference meanwhile");
    expect(screen.getByRole("button", { name: "Put 9 rows on record" })).toBeTruthy();
    expect(screen.getAllByRole("row")).toHaveLength(4);
  });
});

describe("rows set aside", () => {
  const idOf = (at: number) => `3d1f8a52-2a0b-4b7e-a6a9-4f1f6c2d9c0${at}`;
  const known = { personId: idOf(9), studyNumber: "P-204", name: "Corin Reedbed", phone: null };
  const item = (at: number): ImportMatchList["items"][number] => ({
    id: idOf(at),
    line: at + 3,
    matchedOn: "name",
    row: { name: `Korin ${at}`, phone: "0161 496 0811", born: null },
    other: at === 2 ? null : { ...known, born: "1980" },
  });
  const listOf = (...items: ImportMatchList["items"]): ImportMatchList => ({
    items,
    total: items.length,
    page: 1,
    pageSize: 20,
    kinds: items.length > 0 ? [{ matchedOn: "name", waiting: items.length }] : [],
  });
  const done = importOf({
    state: "committed",
    counts: { good: 9, bad: 1, setAside: 3, addedPeople: 9 },
    problems: [],
    problemCount: 0,
    committedAt: "2026-05-27T10:01:00Z",
  });

  it("are told of before, and decided one by one or all of a kind after", async () => {
    const answer = (decided: number, left: number) =>
      json({ decided, waiting: 0, left, conflicts: 1 });
    const path = `imports/${importId}/matches`;
    const sent = serve({
      [`GET imports/${importId}`]: [() => json(done)],
      [`GET ${path}`]: [
        () => json(listOf(item(0), item(1), item(2))),
        () => json(listOf(item(1), item(2))),
        () => json(listOf()),
      ],
      [`POST ${path}`]: [() => answer(1, 2), () => answer(1, 1), () => answer(1, 0)],
    });
    const { user } = open(`import/${importId}`);
    const list = await screen.findByRole("list", { name: "Rows to decide" });
    expect(within(list).getAllByRole("listitem")).toHaveLength(3);
    expect(within(list).getAllByText("P-204")).toHaveLength(2);
    const orphan = screen.getByRole("button", { name: "Same person, line 5" });
    expect((orphan as HTMLButtonElement).disabled).toBe(true);
    await user.click(screen.getByRole("button", { name: "Same person, line 3" }));
    expect(await screen.findByText(/^1 row decided\. 1 value differs/)).toBeTruthy();
    await waitFor(() => expect(within(list).getAllByRole("listitem")).toHaveLength(2));
    await user.click(screen.getByRole("button", { name: "All other people" }));
    const dialog = await screen.findByRole("alertdialog");
    await user.click(within(dialog).getByRole("button", { name: "Add them all" }));
    expect(await screen.findByText("nothing waits")).toBeTruthy();
    const bodies = sent
      .filter(({ call }) => call === `POST ${path}`)
      .map(({ body }) => JSON.parse(String(body)));
    const kind = { decision: "other", matchedOn: "name" };
    expect(bodies).toEqual([{ decision: "same", ids: [idOf(0)] }, kind, kind]);
  });

  it("are no reason to refuse a file in which there is nothing else", async () => {
    const counts = { good: 0, bad: 0, setAside: 2, new: 0 };
    serve({ [`GET imports/${importId}`]: [() => json(importOf({ rows: 2, counts }))] });
    open(`import/${importId}`);
    expect(await screen.findByText(/^2 rows may be somebody on record/)).toBeTruthy();
    expect(screen.getByRole("button", { name: "Go on to 2 rows to decide" })).toBeTruthy();
  });
});
